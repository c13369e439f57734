import {
  type CatalogueCategory,
  type CatalogueItem,
  type FixtureItem,
  fixtureInitial,
} from '@lampwright/geometry/catalogue';
import { type ItemChoice, type PlanDocument, recordsOf, settingsOf } from '@lampwright/geometry/plan';
import type { Choices } from '../tools/tool';

/** An entry of the company's catalogue, as far as the plan needs it. */
export interface CatalogueEntry {
  readonly id: string;
  readonly item: CatalogueItem;
}

export type ItemOf<C extends CatalogueCategory> = Extract<CatalogueItem, { category: C }>;

export interface PickItem<C extends CatalogueCategory = CatalogueCategory> {
  readonly key: string;
  readonly item: ItemOf<C>;
  readonly choice: ItemChoice;
}

/** What can be placed: the catalogue, and the plan's own copies of items that are no longer in it. */
export function pickItems<C extends CatalogueCategory>(
  doc: PlanDocument,
  entries: readonly CatalogueEntry[],
  category: C,
): PickItem<C>[] {
  const is = (item: CatalogueItem): item is ItemOf<C> => item.category === category;
  const listed = new Set(entries.map((e) => e.id));
  const picks: PickItem<C>[] = [];
  for (const { id, item } of entries)
    if (is(item)) picks.push({ key: id, item, choice: { sourceId: id, item } });
  for (const record of recordsOf(doc, 'item'))
    if (is(record.item) && (record.sourceId === null || !listed.has(record.sourceId)))
      picks.push({ key: record.id, item: record.item, choice: { itemId: record.id } });
  return picks.sort((a, b) => a.item.name.localeCompare(b.item.name));
}

/** Which of the picks a choice is. */
export function pickOf<C extends CatalogueCategory>(
  picks: readonly PickItem<C>[],
  choice: ItemChoice | null,
): PickItem<C> | undefined {
  if (choice === null) return undefined;
  const key = 'itemId' in choice ? choice.itemId : choice.sourceId;
  return picks.find((p) => p.key === key);
}

/** Lamps that go into a fixture: of its base, and no stronger than it takes. */
export function lampsFor(item: FixtureItem, lamps: readonly PickItem<'lamp'>[]): PickItem<'lamp'>[] {
  if (item.light !== 'lamp') return [];
  return lamps.filter(
    (lamp) => lamp.item.base === item.base && (item.maxWatts === null || wattsOf(lamp.item) <= item.maxWatts),
  );
}

/** Nominal watts of something that gives light; 0 where it has none to say. */
export function wattsOf(item: Pick<ItemOf<'lamp'>, 'load'>): number {
  switch (item.load.kind) {
    case 'driver':
    case 'filament':
    case 'resistive':
      return item.load.watts;
    case 'current':
    case 'off':
      return 0;
  }
}

export function fixtureChoice(
  pick: PickItem<'fixture'>,
  lamps: readonly PickItem<'lamp'>[],
): NonNullable<Choices['fixture']> {
  return {
    item: pick.choice,
    lamp: lampsFor(pick.item, lamps)[0]?.choice ?? null,
    initial: fixtureInitial(pick.item.kind),
  };
}

/** Below this the mains are American, and cable is sold by gauge. */
const GAUGE_BELOW_VOLTS = 180;

/** The cable that the plan uses most; before it uses any, everyday cable: 12 AWG, or 4 mm² where cable is metric. */
function usualCable(doc: PlanDocument, cables: readonly PickItem<'cable'>[]): ItemChoice | undefined {
  const uses = new Map<string, number>();
  for (const cable of recordsOf(doc, 'cable')) uses.set(cable.itemId, (uses.get(cable.itemId) ?? 0) + 1);
  const [most] = [...uses].sort((a, b) => b[1] - a[1]);
  if (most !== undefined) {
    const copy = doc.get(most[0]);
    const pick = cables.find((c) => copy?.kind === 'item' && c.key === (copy.sourceId ?? copy.id));
    return pick?.choice ?? { itemId: most[0] };
  }
  const byGauge = settingsOf(doc).lineVolts < GAUGE_BELOW_VOLTS;
  const everyday = cables.find(({ item: { conductor } }) =>
    byGauge ? 'awg' in conductor && conductor.awg === 12 : 'mm2' in conductor && conductor.mm2 === 4,
  );
  return (everyday ?? cables[0])?.choice;
}

/** What the tools put down before anybody has chosen: a path light, the smallest transformer for the line, the usual cable. */
export function firstChoices(
  doc: PlanDocument,
  entries: readonly CatalogueEntry[],
  before: Choices,
): Choices {
  const lamps = pickItems(doc, entries, 'lamp');
  const fixtures = pickItems(doc, entries, 'fixture');
  const fixture = fixtures.find((f) => f.item.kind === 'path') ?? fixtures[0];
  const cables = pickItems(doc, entries, 'cable');
  const transformer = transformerPicks(doc, entries)[0];
  return {
    ...before,
    fixture: before.fixture ?? (fixture === undefined ? null : fixtureChoice(fixture, lamps)),
    cable: before.cable ?? usualCable(doc, cables) ?? null,
    transformer:
      before.transformer ?? (transformer === undefined ? null : { kind: 'new', item: transformer.choice }),
  };
}

/** Line volts differ this much from the nameplate's by tolerance; more is another country's line. */
const SAME_LINE = 0.2;

/** Transformers for the plan's line volts, smallest first, then those for another line. */
export function transformerPicks(
  doc: PlanDocument,
  entries: readonly CatalogueEntry[],
): PickItem<'transformer'>[] {
  const { lineVolts } = settingsOf(doc);
  const foreign = ({ item }: PickItem<'transformer'>) =>
    Math.abs(item.nominalLineVolts / lineVolts - 1) > SAME_LINE ? 1 : 0;
  return pickItems(doc, entries, 'transformer').sort(
    (a, b) => foreign(a) - foreign(b) || a.item.ratedVA - b.item.ratedVA,
  );
}
