/**
 * Money in whole minor units, worked out in integers. The rule of rounding, everywhere: a share or a product
 * is worked out exactly and rounded once, half away from nothing, to the minor unit.
 */

/** Percents are kept to a ten-thousandth: 100 % is this many. */
const WHOLE = 1_000_000n;
/** Quantities are kept to a thousandth. */
const THOUSAND = 1000n;

export const percentParts = (percent: number): bigint => BigInt(Math.round(percent * 10_000));
const thousandths = (quantity: number): bigint => BigInt(Math.round(quantity * 1000));

/** numerator ÷ denominator to the nearest whole, halves up; both are not negative, the denominator not 0. */
export function roundedQuotient(numerator: bigint, denominator: bigint): number {
  return Number((2n * numerator + denominator) / (2n * denominator));
}

/** So many percent of an amount. */
export const percentOf = (amountMinor: number, percent: number): number =>
  roundedQuotient(BigInt(amountMinor) * percentParts(percent), WHOLE);

/** The most whole minor units that are not above so many percent of an amount: for caps of the law. */
export const percentOfDown = (amountMinor: number, percent: number): number =>
  Number((BigInt(amountMinor) * percentParts(percent)) / WHOLE);

/** The part of an amount that `part` is of `whole`; nothing where the whole is nothing. */
export const proportionOf = (amountMinor: number, part: number, whole: number): number =>
  whole === 0 ? 0 : roundedQuotient(BigInt(amountMinor) * BigInt(part), BigInt(whole));

/** What a quantity comes to at a sum for so many units. */
export const amountFor = (quantity: number, sumMinor: number, per: number): number =>
  roundedQuotient(BigInt(sumMinor) * thousandths(quantity), thousandths(per));

export interface Surcharge {
  readonly overheadPercent: number;
  readonly profit: { readonly by: 'markup' | 'margin'; readonly percent: number };
}

/** As `amountFor`, with overhead and profit on top: one rounding, at the end. */
export function priceFor(quantity: number, costMinor: number, per: number, on: Surcharge): number {
  const profit = percentParts(on.profit.percent);
  const [up, down] = on.profit.by === 'markup' ? [WHOLE + profit, WHOLE] : [WHOLE, WHOLE - profit];
  const numerator =
    BigInt(costMinor) * thousandths(quantity) * (WHOLE + percentParts(on.overheadPercent)) * up;
  return roundedQuotient(numerator, thousandths(per) * WHOLE * down);
}

/** A quantity rounded up to the next multiple; what a machine's arithmetic adds in the last digits is not more. */
export function roundedUp(quantity: number, increment: number): number {
  const steps = Math.ceil((thousandthsOf(quantity) - 0.5) / thousandthsOf(increment));
  return (Math.max(0, steps) * Math.round(increment * 1000)) / Number(THOUSAND);
}
const thousandthsOf = (n: number) => n * 1000;

/** Digits after the point of a currency: 2 for dollars, 0 for yen (ISO 4217, as the platform knows it). */
export function minorDigits(currency: string): number {
  return formatterOf(currency, 'en-US').resolvedOptions().maximumFractionDigits ?? 2;
}

const formatters = new Map<string, Intl.NumberFormat>();

function formatterOf(currency: string, locale: string): Intl.NumberFormat {
  const name = `${locale} ${currency}`;
  let formatter = formatters.get(name);
  if (!formatter) {
    formatter = makeFormatter(currency, locale);
    formatters.set(name, formatter);
  }
  return formatter;
}

/** A locale that the platform can't read is written as the first one rather than not at all. */
function makeFormatter(currency: string, locale: string): Intl.NumberFormat {
  const style = { style: 'currency', currency } as const;
  try {
    return new Intl.NumberFormat(locale, style);
  } catch {
    return new Intl.NumberFormat('en-US', style);
  }
}

/** "$3,417.00", "3.417,00 €". Minus is a true minus sign. */
export function formatMoney(amountMinor: number, currency: string, locale: string): string {
  const major = Math.abs(amountMinor) / 10 ** minorDigits(currency);
  const text = formatterOf(currency, locale).format(major);
  return amountMinor < 0 ? `−${text}` : text;
}

/** As typed into a field: without sign of the currency, with all its digits. */
export function moneyInput(amountMinor: number, currency: string, locale: string): string {
  const digits = minorDigits(currency);
  return numberFormat(locale, {
    minimumFractionDigits: digits,
    maximumFractionDigits: digits,
  }).format(amountMinor / 10 ** digits);
}

function numberFormat(locale: string, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  try {
    return new Intl.NumberFormat(locale, options);
  } catch {
    return new Intl.NumberFormat('en-US', options);
  }
}

/**
 * Reads an amount that somebody typed, in the manner of the locale: "1,240", "$1,240.50". Null for what is no
 * amount, has more digits than the currency, or is negative.
 */
export function parseMoney(text: string, currency: string, locale: string): number | null {
  const parts = numberFormat(locale, { useGrouping: true }).formatToParts(1_234_567.8);
  const sign = (type: string, otherwise: string) =>
    parts.find((part) => part.type === type)?.value ?? otherwise;
  const decimal = sign('decimal', '.');
  const group = sign('group', ',');
  const digits = minorDigits(currency);
  const bare = text.replace(/[\p{Sc}\s\u00a0\u202f’']|[A-Z]{3}/gu, '');
  const [whole = '', ...fractions] = bare.split(decimal);
  if (fractions.length > 1) return null;
  const groups = whole.split(/[\s\u00a0\u202f’']/.test(group) ? '\u0000' : group);
  const wellGrouped = groups.every((part, i) => (i === 0 ? /^\d*$/ : /^\d{3}$/).test(part));
  const [fraction = ''] = fractions;
  if (!wellGrouped || !/^\d*$/.test(fraction) || fraction.length > digits) return null;
  const number = `${groups.join('')}${fraction.padEnd(digits, '0')}`;
  if (groups.join('') === '' && fraction === '') return null;
  const amount = Number(number);
  return Number.isSafeInteger(amount) && amount <= 1_000_000_000_000 ? amount : null;
}
