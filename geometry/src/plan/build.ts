import { type CatalogueCategory, type CatalogueItem, fixtureInitial } from '../catalogue/index.js';
import {
  type FixtureRecord,
  type ItemRecord,
  type PlanDocument,
  type PlanRecord,
  type RecordKind,
  type RecordOf,
  SETTINGS_ID,
  type SettingsRecord,
} from './records.js';
import { usualSchedule } from './schedule.js';

/** Where new ids come from: random in the product, counted in tests. */
export type IdSource = () => string;

/** A random record or change id. */
export const newId: IdSource = () => globalThis.crypto.randomUUID();

/** What the company's region sets by default; conductors in warm ground count as 25 °C. */
export type PlanRegion = 'us' | 'iec';

/**
 * Settings of a new plan. Slack is common practice (a hand's breadth more than the splice needs at each
 * fixture, more at the transformer, where cable is dressed inside the box). Clearance to water: 10 ft, the
 * usual least distance for low-voltage fixtures in US practice; 2 m, the outside edge of zone 1 around a
 * basin, elsewhere. Local code decides, and each plan may set its own.
 */
export function defaultSettings(region: PlanRegion): SettingsRecord {
  return {
    kind: 'settings',
    id: SETTINGS_ID,
    lineVolts: region === 'us' ? 120 : 230,
    conductorTemperatureC: 25,
    slackAtFixtureMeters: region === 'us' ? 0.6096 : 0.6,
    slackAtTransformerMeters: region === 'us' ? 0.9144 : 0.9,
    slackAtJunctionMeters: region === 'us' ? 0.3048 : 0.3,
    waterClearanceMeters: region === 'us' ? 3.048 : 2,
    schedule: usualSchedule,
  };
}

/** The plan's settings; a plan that has none yet works with those of the US. */
export function settingsOf(doc: PlanDocument): SettingsRecord {
  const record = doc.get(SETTINGS_ID);
  return record?.kind === 'settings' ? record : defaultSettings('us');
}

export function recordOf<K extends RecordKind>(
  doc: PlanDocument,
  id: string | null,
  kind: K,
): RecordOf<K> | undefined {
  if (id === null) return undefined;
  const record = doc.get(id);
  return record !== undefined && isKind(record, kind) ? record : undefined;
}

export function isKind<K extends RecordKind>(record: PlanRecord, kind: K): record is RecordOf<K> {
  return record.kind === kind;
}

export function* recordsOf<K extends RecordKind>(doc: PlanDocument, kind: K): Generator<RecordOf<K>> {
  for (const record of doc.values()) if (isKind(record, kind)) yield record;
}

/** The plan's copy of an item, if it is of the wanted category. */
export function itemOf<C extends CatalogueCategory>(
  doc: PlanDocument,
  id: string | null,
  category: C,
): Extract<CatalogueItem, { category: C }> | undefined {
  const item = recordOf(doc, id, 'item')?.item;
  return item !== undefined && isCategory(item, category) ? item : undefined;
}

function isCategory<C extends CatalogueCategory>(
  item: CatalogueItem,
  category: C,
): item is Extract<CatalogueItem, { category: C }> {
  return item.category === category;
}

export type NumberedKind = 'transformer' | 'junction' | 'run';

/** One more than the highest number of that kind, so that a number once printed is not given again lightly. */
export function nextNumber(doc: PlanDocument, kind: NumberedKind): number {
  let highest = 0;
  for (const record of recordsOf(doc, kind)) highest = Math.max(highest, record.number);
  return highest + 1;
}

/** The letter that a fixture wears on the plan, by its item's kind; ? while the item is missing. */
export function initialOf(doc: PlanDocument, fixture: FixtureRecord): string {
  const item = itemOf(doc, fixture.itemId, 'fixture');
  return item === undefined ? '?' : fixtureInitial(item.kind);
}

/** One more than the highest number among the fixtures that wear the same letter. */
export function nextFixtureNumber(doc: PlanDocument, initial: string): number {
  let highest = 0;
  for (const fixture of recordsOf(doc, 'fixture'))
    if (fixture.number > highest && initialOf(doc, fixture) === initial) highest = fixture.number;
  return highest + 1;
}

/** What a person reads for a numbered record: T1, run 2, P4 (or the name it was given). */
export function labelOf(record: PlanRecord, doc: PlanDocument): string {
  switch (record.kind) {
    case 'transformer':
      return record.name || `T${record.number}`;
    case 'fixture':
      return record.name || `${initialOf(doc, record)}${record.number}`;
    case 'junction':
      return record.name || `${record.style} ${record.number}`;
    case 'run':
      return record.name || `run ${record.number}`;
    case 'feed':
      return record.name || 'feed';
    case 'sheet':
      return record.name || 'sheet';
    case 'area':
      return record.name || record.use;
    case 'face':
      return record.name || 'wall face';
    case 'tree':
      return record.name || 'tree';
    case 'zone':
      return record.name;
    case 'item':
      return record.item.name;
    case 'cable':
    case 'measurement':
    case 'note':
    case 'settings':
      return record.kind;
  }
}

export type NodeRecord = RecordOf<'transformer' | 'feed' | 'fixture' | 'junction'>;

/** Records that cable can end at. */
export function isNode(record: PlanRecord | undefined): record is NodeRecord {
  switch (record?.kind) {
    case 'transformer':
    case 'feed':
    case 'fixture':
    case 'junction':
      return true;
    default:
      return false;
  }
}

/** The transformer that a node is the terminals of, if it is one: itself, or the one that feeds the sheet here. */
export function sourceTransformerId(record: PlanRecord | undefined): string | null {
  if (record?.kind === 'transformer') return record.id;
  return record?.kind === 'feed' ? record.transformerId : null;
}

/** Item records ready to be found by the catalogue entry they came from. */
export function findItemCopy(
  doc: PlanDocument,
  match: (record: ItemRecord) => boolean,
): ItemRecord | undefined {
  for (const record of recordsOf(doc, 'item')) if (match(record)) return record;
  return undefined;
}
