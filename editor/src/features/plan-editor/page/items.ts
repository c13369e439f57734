import {
  type CatalogueCategory,
  type CatalogueItem,
  type FixtureItem,
  fixtureInitial,
} from '@lampwright/geometry/catalogue';
import { type ItemChoice, type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
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

const isTwelve = (pick: PickItem<'cable'>): boolean =>
  ('awg' in pick.item.conductor && pick.item.conductor.awg === 12) ||
  ('mm2' in pick.item.conductor && pick.item.conductor.mm2 === 4);

/** What the tools put down before anybody has chosen: the first of each kind, and everyday cable (12 AWG, 4 mm²). */
export function firstChoices(
  doc: PlanDocument,
  entries: readonly CatalogueEntry[],
  before: Choices,
): Choices {
  const lamps = pickItems(doc, entries, 'lamp');
  const fixture = pickItems(doc, entries, 'fixture')[0];
  const cables = pickItems(doc, entries, 'cable');
  const cable = cables.find(isTwelve) ?? cables[0];
  const transformer = pickItems(doc, entries, 'transformer').sort(
    (a, b) => a.item.ratedVA - b.item.ratedVA,
  )[0];
  return {
    ...before,
    fixture: before.fixture ?? (fixture === undefined ? null : fixtureChoice(fixture, lamps)),
    cable: before.cable ?? cable?.choice ?? null,
    transformer:
      before.transformer ?? (transformer === undefined ? null : { kind: 'new', item: transformer.choice }),
  };
}
