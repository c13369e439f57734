import { formatMoney } from '@lampwright/geometry/price';
import { MISSING } from './clean-text.js';
import type { Paper } from './paper.js';

/** Sums, dates and shares in the manner of the document's locale. */
export class Say {
  constructor(
    private readonly paper: Paper,
    private readonly currency: string,
    private readonly locale: string,
  ) {}

  /** Money in minor units. Where the typeface lacks a sign of it, the currency's code stands before the figures. */
  money(amountMinor: number): string {
    const text = formatMoney(amountMinor, this.currency, this.locale);
    if (this.sets(text)) return this.paper.clean(text);
    const plain = formatMoney(amountMinor, this.currency, 'en-US');
    const figures = plain.replace(/[^\d.,−-]/g, '');
    return `${this.currency}\u00a0${figures}`;
  }

  /** A day, from its ISO date or time in UTC. */
  date(iso: string): string {
    const day = iso.slice(0, 10);
    const text = this.format((locale) =>
      new Intl.DateTimeFormat(locale, { dateStyle: 'long', timeZone: 'UTC' }).format(
        new Date(`${day}T00:00:00Z`),
      ),
    );
    return this.sets(text) ? this.paper.clean(text) : day;
  }

  percent(percent: number): string {
    return this.figures(percent / 100, { style: 'percent', maximumFractionDigits: 4 });
  }

  number(value: number): string {
    return this.figures(value, { maximumFractionDigits: 3 });
  }

  private figures(value: number, options: Intl.NumberFormatOptions): string {
    const text = this.format((locale) => new Intl.NumberFormat(locale, options).format(value));
    return this.sets(text) ? this.paper.clean(text) : new Intl.NumberFormat('en-US', options).format(value);
  }

  /** A locale that the platform can't read is written as US English rather than not at all. */
  private format(write: (locale: string) => string): string {
    try {
      return write(this.locale);
    } catch {
      return write('en-US');
    }
  }

  private sets(text: string): boolean {
    return !this.paper.clean(text).includes(MISSING);
  }
}

/** "2026-05-04 16:20:11 UTC". */
export const utcTime = (iso: string): string => {
  const time = new Date(iso).toISOString();
  return `${time.slice(0, 10)} ${time.slice(11, 19)} UTC`;
};
