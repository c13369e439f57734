import { type PlanDocument, recordsOf } from '../plan/index.js';
import { type Bill, type BillLine, type QuoteInput, warningOf } from './bill-input.js';
import { combinationsOf } from './combinations.js';
import type { ManualLine } from './job-pricing.js';
import { labourOf } from './labour.js';
import { lengthsOf } from './lengths.js';
import { piecesOf } from './materials.js';
import { amountFor, percentOf, priceFor } from './money.js';
import type { SaleUnit, Tax } from './price-book.js';
import { lineSections, type Quote, type QuoteLine, type QuoteWarning } from './quote.js';
import { recordGroups } from './record-groups.js';
import { type Terms, totalsOf } from './totals.js';

/** The bill of a plan: materials and labour with their quantities and where these come from; no money. */
export function billOf(doc: PlanDocument, input: QuoteInput): Bill {
  const groups = recordGroups(doc, input.pricing);
  const pieces = piecesOf(doc, groups, input);
  const lengths = lengthsOf(doc, groups, input);
  const lines = [...pieces.lines, ...lengths.lines, ...labourOf(doc, groups, input)];
  lines.sort((a, b) => lineSections.indexOf(a.section) - lineSections.indexOf(b.section));
  return { lines, warnings: [...pieces.warnings, ...lengths.warnings] };
}

/** The tax of a job: its own, or the company's default; null where there is none or the work is exempt. */
export function taxOf({ book, pricing }: Pick<QuoteInput, 'book' | 'pricing'>): Tax | null {
  if (pricing.taxExempt) return null;
  const id = pricing.taxId ?? book.defaultTaxId;
  return book.taxes.find((tax) => tax.id === id) ?? null;
}

/**
 * The price of a plan, with costs: whoever passes it on strips them with `withoutCosts`. Sums of money in
 * whole minor units; each line is rounded once, and every sum is the sum of its lines.
 */
export function quoteOf(doc: PlanDocument, input: QuoteInput): Quote {
  const { book, pricing, currency } = input;
  const bill = billOf(doc, input);
  const tax = taxOf(input);
  const warnings: QuoteWarning[] = [...bill.warnings];
  const lines = [
    ...bill.lines.map((line) => pricedLine(line, input, tax)),
    ...pricing.manualLines.map((line) => pricedManual(line, input, tax)),
  ];
  warnings.push(...lineWarnings(lines, input));
  const terms: Terms = {
    discount: pricing.discount,
    taxPercent: tax?.percent ?? null,
    stages: pricing.stages ?? book.stages,
    depositCap: book.depositCap,
  };
  const combinations = combinationsOf(pricing).map((groups) => totalsOf(lines, groups, terms));
  const offered = combinations[0] ?? totalsOf(lines, [], terms);
  if (offered.stages.some(({ capped }) => capped))
    warnings.push(
      warningOf(
        'deposit-capped',
        'The deposit is less than its share, since the law caps it; the rest is asked for later.',
      ),
    );
  if (!tax && !pricing.taxExempt)
    warnings.push(warningOf('no-tax', 'No tax is set for this job. Choose one, or say that it is exempt.'));
  const fixtures = fixturesByGroup(doc, input);
  for (const group of pricing.groups)
    if (!fixtures.has(group.id) && !lines.some(({ groupId }) => groupId === group.id))
      warnings.push(warningOf('empty-group', `Nothing is in the group ${group.name} yet.`));
  const sum = (groupId: string | null) =>
    lines.reduce((total, line) => (line.groupId === groupId ? total + (line.priceMinor ?? 0) : total), 0);
  return {
    currency,
    locale: book.locale,
    groups: [
      {
        id: null,
        name: 'Base',
        description: '',
        on: true,
        fixtures: fixtures.get(null) ?? 0,
        priceMinor: sum(null),
      },
      ...pricing.groups.map(({ id, name, description, on }) => ({
        id,
        name,
        description,
        on,
        fixtures: fixtures.get(id) ?? 0,
        priceMinor: sum(id),
      })),
    ],
    lines,
    discountName: pricing.discount.kind === 'none' ? '' : pricing.discount.name,
    tax: tax && { name: tax.name, jurisdiction: tax.jurisdiction, percent: tax.percent },
    combinations,
    margin: marginOf(lines, offered, input),
    warnings,
  };
}

/** The quote for the eyes of those who do not see what things cost. */
export function withoutCosts(quote: Quote): Quote {
  return {
    ...quote,
    lines: quote.lines.map((line) => ({ ...line, costMinor: null })),
    margin: null,
  };
}

function pricedLine(line: BillLine, input: QuoteInput, tax: Tax | null): QuoteLine {
  const { book, pricing, prices } = input;
  const override = Object.hasOwn(pricing.overrides, line.key) ? pricing.overrides[line.key] : undefined;
  const price = line.itemId === null ? undefined : prices.get(line.itemId);
  const surcharge = {
    overheadPercent: book.overheadPercent,
    profit: line.kind === 'labour' ? book.labour : book.materials,
  };
  const money = (quantity: number): { costMinor: number | null; priceMinor: number | null } => {
    if (line.rateMinor !== null)
      return {
        costMinor: amountFor(quantity, line.rateMinor, 1),
        priceMinor: priceFor(quantity, line.rateMinor, 1, surcharge),
      };
    if (!price || price.unit !== line.unit) return { costMinor: null, priceMinor: null };
    const { costMinor, priceMinor, per } = price;
    return {
      costMinor: costMinor === null ? null : amountFor(quantity, costMinor, per),
      priceMinor:
        priceMinor !== null
          ? amountFor(quantity, priceMinor, per)
          : costMinor === null
            ? null
            : priceFor(quantity, costMinor, per, surcharge),
    };
  };
  const planned = money(line.quantity);
  const quantity = override?.quantity ?? line.quantity;
  const worked = override?.quantity == null ? planned : money(quantity);
  const { rateMinor: _, recordIds, ...rest } = line;
  return {
    ...rest,
    recordIds: [...recordIds],
    quantity,
    costMinor: worked.costMinor,
    priceMinor: override?.priceMinor ?? worked.priceMinor,
    taxable: taxed(line.kind, price?.taxable ?? true, tax),
    origin: override ? 'overridden' : 'plan',
    planned: override ? { quantity: line.quantity, priceMinor: planned.priceMinor } : null,
    note: override?.note ?? '',
  };
}

function pricedManual(line: ManualLine, { book }: QuoteInput, tax: Tax | null): QuoteLine {
  const profit = line.kind === 'labour' ? book.labour : book.materials;
  const { costMinor, priceMinor, quantity } = line;
  return {
    key: `manual:${line.id}`,
    groupId: line.groupId,
    section: line.kind === 'labour' ? 'labour' : 'other',
    kind: line.kind,
    name: line.name,
    quantity,
    unit: line.unit,
    source: 'Written by hand',
    recordIds: [],
    itemId: null,
    costMinor: costMinor === null ? null : amountFor(quantity, costMinor, 1),
    priceMinor:
      priceMinor !== null
        ? amountFor(quantity, priceMinor, 1)
        : costMinor === null
          ? null
          : priceFor(quantity, costMinor, 1, { overheadPercent: book.overheadPercent, profit }),
    taxable: taxed(line.kind, line.taxable, tax),
    origin: 'manual',
    planned: null,
    note: '',
  };
}

const taxed = (kind: QuoteLine['kind'], taxable: boolean, tax: Tax | null): boolean =>
  taxable && tax !== null && (kind === 'labour' ? tax.onLabour : tax.onMaterials);

const unitNames: Readonly<Record<SaleUnit, string>> = {
  each: 'piece',
  foot: 'foot',
  meter: 'metre',
  visit: 'visit',
};

function lineWarnings(lines: readonly QuoteLine[], { pricing, prices }: QuoteInput): QuoteWarning[] {
  const warnings: QuoteWarning[] = [];
  for (const { key, name, priceMinor, recordIds, itemId, unit, origin } of lines) {
    if (priceMinor !== null) continue;
    const price = itemId === null ? undefined : prices.get(itemId);
    if (itemId === null && origin !== 'manual')
      warnings.push(
        warningOf(
          'item-not-in-catalogue',
          `${name} is not in the catalogue any more, so it has no price.`,
          recordIds,
          key,
        ),
      );
    else if (price && price.unit !== unit)
      warnings.push(
        warningOf(
          'no-price',
          `${name} is priced by the ${unitNames[price.unit]}, but counted here by the ${unitNames[unit]}.`,
          recordIds,
          key,
        ),
      );
    else warnings.push(warningOf('no-price', `${name} has no price yet.`, recordIds, key));
  }
  const keys = new Set(lines.map(({ key }) => key));
  for (const key of Object.keys(pricing.overrides))
    if (!keys.has(key))
      warnings.push(
        warningOf(
          'override-without-line',
          'A line that was changed by hand is no longer on the plan; the change is kept in case it comes back.',
          [],
          key,
        ),
      );
  return warnings;
}

function fixturesByGroup(doc: PlanDocument, { pricing }: QuoteInput): Map<string | null, number> {
  const groups = recordGroups(doc, pricing);
  const counts = new Map<string | null, number>();
  for (const { id, quantity } of recordsOf(doc, 'fixture')) {
    const group = groups.get(id) ?? null;
    counts.set(group, (counts.get(group) ?? 0) + quantity);
  }
  return counts;
}

/** Null where the cost of a line of the offered combination is not known. */
function marginOf(
  lines: readonly QuoteLine[],
  offered: Quote['combinations'][number],
  { book }: QuoteInput,
): Quote['margin'] {
  const on = new Set(offered.groups);
  const taken = lines.filter(({ groupId }) => groupId === null || on.has(groupId));
  let costMinor = 0;
  for (const line of taken) {
    if (line.costMinor === null) return null;
    costMinor += line.costMinor;
  }
  const overheadMinor = percentOf(costMinor, book.overheadPercent);
  const price = offered.subtotalMinor - offered.discountMinor;
  const profitMinor = price - costMinor - overheadMinor;
  return {
    costMinor,
    overheadMinor,
    profitMinor,
    profitPercent: price === 0 ? null : Math.round((profitMinor / price) * 10_000) / 100,
  };
}
