import type { Discount } from './job-pricing.js';
import { percentOf, percentOfDown, proportionOf } from './money.js';
import type { PaymentStage, PriceBook } from './price-book.js';
import type { QuoteLine, StageAmount, Totals } from './quote.js';

/** What the sums of a combination are made from. */
export interface Terms {
  readonly discount: Discount;
  /** Null: no tax. Which lines it is on, the lines say themselves. */
  readonly taxPercent: number | null;
  readonly stages: readonly PaymentStage[];
  readonly depositCap: PriceBook['depositCap'];
}

type PricedLine = Pick<QuoteLine, 'groupId' | 'priceMinor' | 'taxable'>;

/**
 * The sums of a combination of groups; the base is always in. A line without a price counts as nothing.
 * The discount is taken off taxed and untaxed lines alike, in proportion.
 */
export function totalsOf(lines: readonly PricedLine[], groups: readonly string[], terms: Terms): Totals {
  const on = new Set(groups);
  const taken = lines.filter(({ groupId }) => groupId === null || on.has(groupId));
  const subtotalMinor = sumOf(taken);
  const discountMinor = discountOf(subtotalMinor, terms.discount);
  const taxed = terms.taxPercent === null ? 0 : sumOf(taken.filter(({ taxable }) => taxable));
  const taxableMinor = taxed - proportionOf(discountMinor, taxed, subtotalMinor);
  const taxMinor = percentOf(taxableMinor, terms.taxPercent ?? 0);
  const totalMinor = subtotalMinor - discountMinor + taxMinor;
  return {
    groups: [...groups],
    subtotalMinor,
    discountMinor,
    taxableMinor,
    taxMinor,
    totalMinor,
    stages: stagesOf(totalMinor, terms.stages, terms.depositCap),
  };
}

const sumOf = (lines: readonly PricedLine[]): number =>
  lines.reduce((sum, { priceMinor }) => sum + (priceMinor ?? 0), 0);

function discountOf(subtotalMinor: number, discount: Discount): number {
  switch (discount.kind) {
    case 'none':
      return 0;
    case 'percent':
      return percentOf(subtotalMinor, discount.percent);
    case 'amount':
      return Math.min(discount.amountMinor, subtotalMinor);
  }
}

/**
 * The total in stages that add up to it: the last takes the rest. What is asked for at approval stays within
 * the cap; should the last stage itself be due then, what is above the cap becomes a balance at the end.
 */
export function stagesOf(
  totalMinor: number,
  stages: readonly PaymentStage[],
  cap: PriceBook['depositCap'],
): StageAmount[] {
  let deposit = depositLimit(totalMinor, cap);
  let rest = totalMinor;
  const amounts = stages.map(({ id, name, due, percent }, i): StageAmount => {
    const last = i === stages.length - 1;
    const share = last ? rest : Math.min(rest, percentOf(totalMinor, percent));
    const amountMinor = due === 'approval' ? Math.min(share, deposit) : share;
    if (due === 'approval') deposit -= amountMinor;
    rest -= amountMinor;
    return { id, name, due, percent: last ? null : percent, amountMinor, capped: amountMinor < share };
  });
  if (rest > 0)
    amounts.push({
      id: 'balance',
      name: 'Balance',
      due: 'finish',
      percent: null,
      amountMinor: rest,
      capped: false,
    });
  return amounts;
}

function depositLimit(totalMinor: number, { percent, amountMinor }: PriceBook['depositCap']): number {
  return Math.min(
    totalMinor,
    percent === null ? totalMinor : percentOfDown(totalMinor, percent),
    amountMinor ?? totalMinor,
  );
}
