import type { FixtureKind } from '../catalogue/index.js';
import { cableLengths, conduitLengths } from '../estimate/index.js';
import { itemOf, labelOf, type PlanDocument, recordsOf } from '../plan/index.js';
import { type BillLine, Gathered, lineKey, type QuoteInput } from './bill-input.js';
import { mountOf } from './materials.js';
import { roundedUp } from './money.js';
import { counted, inUnit, labelsInWords, lengthText } from './words.js';

const kindNames: Readonly<Record<FixtureKind, string>> = {
  path: 'path light',
  up: 'up-light',
  down: 'down-light',
  flood: 'flood light',
  'wall-wash': 'wall wash',
  step: 'step light',
  'in-grade': 'in-grade light',
  bollard: 'bollard',
  linear: 'linear light',
  underwater: 'underwater light',
};

/** "5 path lights": for homeowners and labour lines. */
export const lightsInWords = (kind: FixtureKind, count: number): string =>
  counted(count, kindNames[kind], kind === 'wall-wash' ? 'wall washes' : undefined);

interface Work {
  readonly recordId: string;
  readonly label: string;
  readonly count: number;
}

/**
 * Work by the rate card. Trenches are as long as the cable that is drawn outside of paving: two cables in
 * one trench count twice, which the line says, so that whoever prices can put it right. A rate of nothing
 * makes no line.
 */
export function labourOf(
  doc: PlanDocument,
  groups: ReadonlyMap<string, string | null>,
  { book, pricing }: QuoteInput,
): BillLine[] {
  const { rates } = book;
  const lines: BillLine[] = [];
  const groupOf = (id: string) => groups.get(id) ?? null;
  const put = (name: string, rateMinor: number, unit: BillLine['unit'], line: Partial<BillLine>) => {
    if (rateMinor > 0)
      lines.push({
        key: '',
        groupId: null,
        quantity: 0,
        source: '',
        recordIds: [],
        ...line,
        section: 'labour',
        kind: 'labour',
        name,
        unit,
        itemId: null,
        rateMinor,
      });
  };
  const putWork = (name: string, rateMinor: number, work: Gathered<Work>) => {
    for (const { key, groupId, items } of work.values())
      put(name, rateMinor, 'each', {
        key,
        groupId,
        quantity: items.reduce((sum, { count }) => sum + count, 0),
        source: labelsInWords(items.map(({ label }) => label)),
        recordIds: items.map(({ recordId }) => recordId),
      });
  };

  const byKind = new Map<FixtureKind, Gathered<Work>>();
  const trees = new Gathered<Work>();
  for (const fixture of recordsOf(doc, 'fixture')) {
    const kind = itemOf(doc, fixture.itemId, 'fixture')?.kind;
    if (!kind) continue;
    const work = { recordId: fixture.id, label: labelOf(fixture, doc), count: fixture.quantity };
    const gathered = byKind.get(kind) ?? new Gathered<Work>();
    byKind.set(kind, gathered);
    gathered.add(`labour:fixture-${kind}`, groupOf(fixture.id), work);
    if (mountOf(kind) === 'tree-mount') trees.add('labour:tree-mount', groupOf(fixture.id), work);
  }
  for (const [kind, work] of byKind)
    putWork(`Placing and wiring, ${kindNames[kind]}`, rates.perFixture[kind], work);
  putWork('Mounting in a tree', rates.perTreeMount, trees);

  const unit = rates.lengthUnit;
  const conduit = conduitLengths(doc);
  const trench = new Gathered<{ recordId: string; meters: number }>();
  const bore = new Gathered<{ recordId: string; meters: number }>();
  for (const [id, length] of cableLengths(doc)) {
    const drawn = length.measuredMeters ?? length.plan?.meters;
    if (drawn === undefined || drawn === null) continue;
    const under = Math.min(conduit.get(id) ?? 0, drawn);
    if (under > 0) bore.add('labour:bore', groupOf(id), { recordId: id, meters: under });
    if (drawn > under) trench.add('labour:trench', groupOf(id), { recordId: id, meters: drawn - under });
  }
  const putLengths = (name: string, rateMinor: number, work: typeof trench, note: string) => {
    for (const { key, groupId, items } of work.values()) {
      const total = items.reduce((sum, { meters }) => sum + meters, 0);
      put(name, rateMinor, unit, {
        key,
        groupId,
        quantity: roundedUp(inUnit(total, unit), 1),
        source: `${lengthText(total, unit)} ${note}`,
        recordIds: items.map(({ recordId }) => recordId),
      });
    }
  };
  putLengths('Trenching and burying cable', rates.perTrenched, trench, 'of cable outside of paving');
  putLengths('Boring under paving', rates.perBored, bore, 'under paving');

  const boxes = [...recordsOf(doc, 'transformer')];
  if (boxes.length > 0)
    put('Mounting and connecting the transformer', rates.perTransformer, 'each', {
      key: lineKey('labour:transformer', null),
      quantity: boxes.length,
      source: labelsInWords(boxes.map((t) => labelOf(t, doc))),
      recordIds: boxes.map(({ id }) => id),
    });
  const visits = pricing.aimingVisits ?? rates.aimingVisits;
  if (visits > 0 && byKind.size > 0)
    put('Aiming after dark', rates.perAimingVisit, 'visit', {
      key: lineKey('labour:aiming', null),
      quantity: visits,
      source: pricing.aimingVisits === null ? 'By the price book' : 'Set for this job',
    });
  return lines;
}
