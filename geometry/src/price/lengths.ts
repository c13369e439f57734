import type { CatalogueItem, Conductor } from '../catalogue/index.js';
import { type CableLength, cableLengths, conduitLengths } from '../estimate/index.js';
import { itemOf, labelOf, type PlanDocument, recordsOf } from '../plan/index.js';
import { type Bill, type BillLine, Gathered, lineKey, type QuoteInput, warningOf } from './bill-input.js';
import { itemIdentity, noPart, partFor } from './materials.js';
import { roundedUp } from './money.js';
import type { LineSection, QuoteWarning } from './quote.js';
import { inUnit, labelsInWords, lengthText, lengthUnitOf } from './words.js';

type Groups = ReadonlyMap<string, string | null>;

/** A piece of what is sold by length. */
interface Stretch {
  readonly recordId: string;
  readonly drawnMeters: number;
  /** Slack at both ends and rise. */
  readonly extraMeters: number;
}

/** What is sold by length: cable by its item, longer leads, and conduit under paving. */
export function lengthsOf(doc: PlanDocument, groups: Groups, input: QuoteInput): Bill {
  const lines: BillLine[] = [];
  const warnings: QuoteWarning[] = [];
  const lengths = cableLengths(doc);
  const groupOf = (id: string) => groups.get(id) ?? null;

  const byItem = new Map<string, { name: string; itemId: string | null; stretches: Gathered<Stretch> }>();
  const unknown: string[] = [];
  for (const cable of recordsOf(doc, 'cable')) {
    const item = itemIdentity(doc, cable.itemId);
    const length = lengths.get(cable.id);
    const stretch = length && stretchOf(cable.id, length);
    if (!stretch) unknown.push(cable.id);
    if (!item || !stretch) continue;
    const entry = byItem.get(item.identity) ?? { ...item, stretches: new Gathered<Stretch>() };
    byItem.set(item.identity, entry);
    entry.stretches.add(`cable:${item.identity}`, groupOf(cable.id), stretch);
  }
  if (unknown.length > 0)
    warnings.push(
      warningOf(
        'length-unknown',
        `${unknown.length === 1 ? 'The length of a cable is' : `The lengths of ${unknown.length} cables are`} not known, since the sheet has no scale; ${unknown.length === 1 ? 'it is' : 'they are'} not on the bill.`,
        unknown,
      ),
    );
  const waste = input.book.cableWastePercent;
  for (const item of byItem.values())
    lines.push(...soldByLength('cable', item, item.stretches, waste, input));
  const leads = longerLeads(doc, groups, input);
  lines.push(...leads.lines);
  warnings.push(...leads.warnings);

  const conduit = conduitLengths(doc);
  if (conduit.size > 0) {
    const part = partFor('conduit', input);
    if (!part) warnings.push(noPart('conduit', [...conduit.keys()]));
    else {
      const stretches = new Gathered<Stretch>();
      for (const [id, under] of conduit)
        stretches.add(`conduit:${part.id}`, groupOf(id), {
          recordId: id,
          drawnMeters: under,
          extraMeters: 0,
        });
      const item = { name: part.item.name, itemId: part.id };
      lines.push(...soldByLength('conduit', item, stretches, input.book.conduitWastePercent, input));
    }
  }
  return { lines, warnings };
}

function stretchOf(recordId: string, length: CableLength): Stretch | null {
  if (length.totalMeters === null) return null;
  const drawnMeters = length.measuredMeters ?? length.plan?.meters ?? 0;
  return { recordId, drawnMeters, extraMeters: length.totalMeters - drawnMeters };
}

/**
 * Lines of one item sold by length, each rounded up to a whole foot or metre. What is bought beyond them,
 * because it comes in whole spools or sticks, is a line of its own in the base, so that it is there once
 * whichever groups are taken.
 */
function soldByLength(
  section: LineSection,
  { name, itemId }: { readonly name: string; readonly itemId: string | null },
  stretches: Gathered<Stretch>,
  wastePercent: number,
  { prices, system }: QuoteInput,
): BillLine[] {
  const price = itemId === null ? undefined : prices.get(itemId);
  const unit = price && price.unit !== 'each' ? price.unit : lengthUnitOf(system);
  const common = { section, kind: 'material', name, unit, itemId, rateMinor: null } as const;
  const lines: BillLine[] = [];
  let needed = 0;
  for (const { key, groupId, items } of stretches.values()) {
    const drawn = items.reduce((sum, { drawnMeters }) => sum + drawnMeters, 0);
    const extra = items.reduce((sum, { extraMeters }) => sum + extraMeters, 0);
    const quantity = roundedUp(inUnit((drawn + extra) * (1 + wastePercent / 100), unit), 1);
    needed += quantity;
    lines.push({
      ...common,
      key,
      groupId,
      quantity,
      source: [
        `${lengthText(drawn, unit)} drawn`,
        ...(extra > 0 ? [`${lengthText(extra, unit)} slack and rise`] : []),
        ...(wastePercent > 0 ? [`${wastePercent} % waste`] : []),
      ].join(', '),
      recordIds: items.map(({ recordId }) => recordId),
    });
  }
  const bought = price && price.unit === unit ? roundedUp(needed, price.increment) : needed;
  const rest = Math.round((bought - needed) * 1000) / 1000;
  if (rest > 0 && price)
    lines.push({
      ...common,
      key: lineKey(`rest:${itemId}`, null),
      groupId: null,
      name: `${name}, rest of what is bought whole`,
      quantity: rest,
      source: `Bought by ${price.increment} ${unit === 'foot' ? 'ft' : 'm'}: ${bought} in all`,
      recordIds: [],
    });
  return lines;
}

/** Cable for leads that are longer than those that the fixtures come with, by conductor. */
function longerLeads(doc: PlanDocument, groups: Groups, input: QuoteInput): Bill {
  const byCable = new Map<string, { name: string; itemId: string; stretches: Gathered<Stretch> }>();
  const warnings: QuoteWarning[] = [];
  for (const fixture of recordsOf(doc, 'fixture')) {
    const own = itemOf(doc, fixture.itemId, 'fixture')?.lead;
    const { lead } = fixture;
    if (!lead || !own) continue;
    const same = JSON.stringify(lead.conductor) === JSON.stringify(own.conductor);
    const extra = (lead.lengthMeters - (same ? own.lengthMeters : 0)) * fixture.quantity;
    if (extra <= 0) continue;
    const cable = cableOf(lead.conductor, input.catalogue);
    if (!cable) {
      warnings.push(
        warningOf(
          'no-part',
          `The catalogue has no cable for the longer lead of ${labelOf(fixture, doc)}, so it is not on the bill.`,
          [fixture.id],
        ),
      );
      continue;
    }
    const entry = byCable.get(cable.id) ?? {
      name: `${cable.item.name}, for longer leads`,
      itemId: cable.id,
      stretches: new Gathered<Stretch>(),
    };
    byCable.set(cable.id, entry);
    entry.stretches.add(`lead:${cable.id}`, groups.get(fixture.id) ?? null, {
      recordId: fixture.id,
      drawnMeters: extra,
      extraMeters: 0,
    });
  }
  const lines: BillLine[] = [];
  for (const entry of byCable.values())
    for (const line of soldByLength('cable', entry, entry.stretches, input.book.cableWastePercent, input))
      lines.push(
        line.key.startsWith('rest:')
          ? { ...line, key: line.key.replace('rest:', 'rest-lead:') }
          : { ...line, source: `Leads of ${labelsInWords(labelsOf(doc, line.recordIds))}, ${line.source}` },
      );
  return { lines, warnings };
}

const labelsOf = (doc: PlanDocument, ids: readonly string[]): string[] =>
  ids.flatMap((id) => {
    const record = doc.get(id);
    return record ? [labelOf(record, doc)] : [];
  });

function cableOf(conductor: Conductor, catalogue: ReadonlyMap<string, CatalogueItem>) {
  const wanted = JSON.stringify(conductor);
  for (const [id, item] of catalogue)
    if (item.category === 'cable' && JSON.stringify(item.conductor) === wanted) return { id, item };
  return null;
}
