import { formatMoney } from '@lampwright/geometry/price';

/** The currency and the manner of writing that an answer of the server came with. */
export interface MoneyManner {
  readonly currency: string;
  readonly locale: string;
}

/** Writes minor units as this answer's money. */
export const moneyOf =
  ({ currency, locale }: MoneyManner) =>
  (amountMinor: number): string =>
    formatMoney(amountMinor, currency, locale);
