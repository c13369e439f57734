import type { Locator } from '@playwright/test';

/** The amount beside a term, in the sums that screens show as lists of terms. */
export const sumOf = (scope: Locator, term: RegExp): Locator =>
  scope
    .locator('dl > div')
    .filter({ has: scope.page().locator('dt').filter({ hasText: term }) })
    .locator('dd');

/** "$3,231.17" in cents. */
export function centsIn(text: string | null): number {
  const [, sign, whole, cents] = /([−-]?)\$([\d,]+)\.(\d\d)/.exec(text ?? '') ?? [];
  if (whole === undefined) throw new Error(`There is no sum of dollars in “${text}”.`);
  const amount = Number(whole.replaceAll(',', '')) * 100 + Number(cents);
  return sign === '' ? amount : -amount;
}

export const centsOf = async (sum: Locator): Promise<number> => centsIn(await textOf(sum));

export const dollars = (cents: number): string =>
  (cents / 100).toLocaleString('en-US', { style: 'currency', currency: 'USD' });

/** What stands in an element, once it is there. */
export const textOf = async (element: Locator): Promise<string> => (await element.textContent()) ?? '';
