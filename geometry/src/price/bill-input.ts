import type { CatalogueItem } from '../catalogue/index.js';
import type { UnitSystem } from '../units/index.js';
import type { JobPricing } from './job-pricing.js';
import type { ItemPrice, PriceBook } from './price-book.js';
import type { LineSection, QuoteWarning } from './quote.js';

/** What a price is made from, beside the plan. */
export interface QuoteInput {
  /** The company's catalogue by entry id; archived ones too where the plan still uses them. */
  readonly catalogue: ReadonlyMap<string, CatalogueItem>;
  /** The price that holds now, by entry id. */
  readonly prices: ReadonlyMap<string, ItemPrice>;
  readonly book: PriceBook;
  readonly pricing: JobPricing;
  readonly currency: string;
  /** How lengths are told where an item's price does not say its unit. */
  readonly system: UnitSystem;
}

/** A line of the bill of materials or of labour, before prices. */
export interface BillLine {
  readonly key: string;
  readonly groupId: string | null;
  readonly section: LineSection;
  readonly kind: 'material' | 'labour';
  readonly name: string;
  readonly quantity: number;
  readonly unit: 'each' | 'foot' | 'meter' | 'visit';
  readonly source: string;
  readonly recordIds: readonly string[];
  /** Catalogue entry that prices it. */
  readonly itemId: string | null;
  /** Cost of one unit by the rate card; null for materials. */
  readonly rateMinor: number | null;
}

export interface Bill {
  readonly lines: readonly BillLine[];
  readonly warnings: readonly QuoteWarning[];
}

/** The key of a line: what it is, and in which group. */
export const lineKey = (what: string, groupId: string | null): string => `${what}@${groupId ?? 'base'}`;

export const warningOf = (
  code: QuoteWarning['code'],
  message: string,
  recordIds: readonly string[] = [],
  key: string | null = null,
): QuoteWarning => ({ code, message, lineKey: key, recordIds: [...recordIds] });

/** Gathers what belongs on one line, group by group, in the order in which it is first met. */
export class Gathered<T> {
  private readonly byKey = new Map<string, { key: string; groupId: string | null; items: T[] }>();

  add(what: string, groupId: string | null, item: T): void {
    const key = lineKey(what, groupId);
    const found = this.byKey.get(key);
    if (found) found.items.push(item);
    else this.byKey.set(key, { key, groupId, items: [item] });
  }

  values(): Iterable<{
    readonly key: string;
    readonly groupId: string | null;
    readonly items: readonly T[];
  }> {
    return this.byKey.values();
  }
}
