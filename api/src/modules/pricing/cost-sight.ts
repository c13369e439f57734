import type { ItemPrice, JobPricing, PriceBook } from '@lampwright/geometry/price';
import type { Actor } from '../../access/actor.js';

/** Whether somebody may know what things cost the company, and with that its margin. */
export function seesCosts(
  { role }: Pick<Actor, 'role'>,
  book: Pick<PriceBook, 'designersSeeCosts'>,
): boolean {
  switch (role) {
    case 'owner':
      return true;
    case 'designer':
      return book.designersSeeCosts;
    case 'crew':
      return false;
  }
}

/** What tells nothing of where it is bought and for how much. */
export const priceWithoutCost = (price: ItemPrice): ItemPrice => ({
  ...price,
  costMinor: null,
  supplier: '',
  orderNumber: '',
});

export const pricingWithoutCosts = (pricing: JobPricing): JobPricing => ({
  ...pricing,
  manualLines: pricing.manualLines.map((line) => ({ ...line, costMinor: null })),
});

/** What somebody saved who could not see the costs of the manual lines: each line keeps the one it had. */
export function pricingWithCostsOf(pricing: JobPricing, stored: JobPricing): JobPricing {
  const costs = new Map(stored.manualLines.map(({ id, costMinor }) => [id, costMinor]));
  return {
    ...pricing,
    manualLines: pricing.manualLines.map((line) => ({ ...line, costMinor: costs.get(line.id) ?? null })),
  };
}
