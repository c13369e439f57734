import { fixtureInitial } from '../../catalogue/index.js';
import { type IdSource, itemOf, labelOf, newId, nextFixtureNumber, nextNumber, recordsOf } from '../build.js';
import type {
  Aim,
  AreaUse,
  FaceRecord,
  PlanDocument,
  PlanPoint,
  SheetRecord,
  TreeRecord,
  ZoneRecord,
} from '../records.js';
import { Draft } from './draft.js';
import { ensureItem, type ItemChoice } from './items.js';
import { assignRuns } from './network.js';
import { type EditResult, made, missing, refuse } from './result.js';
import { splitInDraft } from './split.js';

/** Where something is placed: sheet pixels of one sheet. */
export interface Place {
  readonly sheetId: string;
  readonly at: PlanPoint;
}

export interface FixturePlacing extends Place {
  readonly fixture: ItemChoice;
  /** The lamp, for fixtures that take one. */
  readonly lamp: ItemChoice | null;
  readonly quantity?: number;
  readonly aim?: Aim | null;
  /** Places it on this cable, which then runs through it. */
  readonly onCableId?: string;
}

export function placeFixture(doc: PlanDocument, placing: FixturePlacing, ids: IdSource = newId): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(placing.sheetId, 'sheet')) return missing('sheet');
  const itemId = ensureItem(draft, placing.fixture);
  const item = itemOf(draft.plan, itemId, 'fixture');
  if (!item) return refuse('wrong-item', 'That item is no fixture.');
  const takesLamp = item.light === 'lamp';
  const lampId = takesLamp && placing.lamp ? ensureItem(draft, placing.lamp) : null;
  const lamp = lampId === null ? undefined : itemOf(draft.plan, lampId, 'lamp');
  if (lampId !== null && !lamp) return refuse('wrong-item', 'That item is no lamp.');
  if (takesLamp && lamp && lamp.base !== item.base)
    return refuse('wrong-item', `${item.name} takes ${item.base} lamps; ${lamp.name} has ${lamp.base}.`);
  const id = draft.ids();
  let { at } = placing;
  if (placing.onCableId !== undefined) {
    const cable = draft.of(placing.onCableId, 'cable');
    const split = cable && splitInDraft(draft, cable, at, { id });
    if (!split) return missing('cable');
    at = split.at;
  }
  draft.put({
    kind: 'fixture',
    id,
    sheetId: placing.sheetId,
    at,
    number: nextFixtureNumber(doc, fixtureInitial(item.kind)),
    name: '',
    itemId,
    lampId,
    quantity: placing.quantity ?? 1,
    lead: null,
    aim: placing.aim ?? null,
    mountingHeightMeters: null,
    zoneId: null,
    note: '',
  });
  if (placing.onCableId !== undefined) assignRuns(draft);
  return made(draft, [id]);
}

export function placeTransformer(
  doc: PlanDocument,
  placing: Place & { readonly transformer: ItemChoice },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(placing.sheetId, 'sheet')) return missing('sheet');
  const itemId = ensureItem(draft, placing.transformer);
  if (!itemOf(draft.plan, itemId, 'transformer')) return refuse('wrong-item', 'That item is no transformer.');
  const record = draft.put({
    kind: 'transformer',
    id: draft.ids(),
    sheetId: placing.sheetId,
    at: placing.at,
    number: nextNumber(doc, 'transformer'),
    name: '',
    itemId,
    lineVolts: null,
    schedule: null,
    note: '',
  });
  return made(draft, [record.id]);
}

/** Brings the feed of a transformer onto another sheet than its own. */
export function placeFeed(
  doc: PlanDocument,
  placing: Place & { readonly transformerId: string },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(placing.sheetId, 'sheet')) return missing('sheet');
  const transformer = draft.of(placing.transformerId, 'transformer');
  if (!transformer) return missing('transformer');
  if (transformer.sheetId === placing.sheetId)
    return refuse('wrong-kind', `${labelOf(transformer, doc)} is on this sheet itself; draw cable from it.`);
  const { sheetId, at, transformerId } = placing;
  const record = draft.put({ kind: 'feed', id: draft.ids(), sheetId, at, transformerId, name: '' });
  return made(draft, [record.id]);
}

export interface JunctionPlacing extends Place {
  readonly style: 'hub' | 'splice';
  readonly item: ItemChoice | null;
  /** Places it on this cable, which then runs through it. */
  readonly onCableId?: string;
}

export function placeJunction(
  doc: PlanDocument,
  placing: JunctionPlacing,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(placing.sheetId, 'sheet')) return missing('sheet');
  const itemId = placing.item ? ensureItem(draft, placing.item) : null;
  const category = placing.style === 'hub' ? 'hub' : 'connector';
  if (itemId !== null && !itemOf(draft.plan, itemId, category))
    return refuse('wrong-item', `The item of a ${placing.style} is a ${category}.`);
  const id = draft.ids();
  let { at } = placing;
  if (placing.onCableId !== undefined) {
    const cable = draft.of(placing.onCableId, 'cable');
    const split = cable && splitInDraft(draft, cable, at, { id });
    if (!split) return missing('cable');
    at = split.at;
  }
  draft.put({
    kind: 'junction',
    id,
    sheetId: placing.sheetId,
    at,
    style: placing.style,
    number: nextNumber(doc, 'junction'),
    name: '',
    itemId,
  });
  return made(draft, [id]);
}

export function placeArea(
  doc: PlanDocument,
  area: {
    readonly sheetId: string;
    readonly use: AreaUse;
    readonly points: readonly PlanPoint[];
    readonly heightMeters?: number | null;
  },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(area.sheetId, 'sheet')) return missing('sheet');
  if (area.points.length < 3) return refuse('too-few-points', 'An area needs at least three corners.');
  const record = draft.put({
    kind: 'area',
    id: draft.ids(),
    sheetId: area.sheetId,
    use: area.use,
    name: '',
    points: [...area.points],
    heightMeters: area.heightMeters ?? null,
    lightTarget: null,
  });
  return made(draft, [record.id]);
}

/** Marks an upright surface: along its foot, with its upper edge on a photo. */
export function placeFace(
  doc: PlanDocument,
  face: Pick<FaceRecord, 'sheetId' | 'foot' | 'top' | 'heightMeters'> & { readonly name?: string },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(face.sheetId, 'sheet')) return missing('sheet');
  if (face.foot.length < 2)
    return refuse('too-few-points', 'A wall face needs two points along its foot at least.');
  const record = draft.put({ kind: 'face', id: draft.ids(), name: '', ...face });
  return made(draft, [record.id]);
}

/** Marks a tree or shrub by its foot and its crown. */
export function placeTree(
  doc: PlanDocument,
  tree: Pick<TreeRecord, 'sheetId' | 'foot' | 'outline' | 'heightMeters' | 'crownBaseMeters'> & {
    readonly name?: string;
  },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(tree.sheetId, 'sheet')) return missing('sheet');
  if (tree.outline.length < 3) return refuse('too-few-points', 'A crown needs at least three corners.');
  const record = draft.put({ kind: 'tree', id: draft.ids(), name: '', ...tree });
  return made(draft, [record.id]);
}

/** Makes a zone of its own for lights with smart lamps, with these lights in it. */
export function addZone(
  doc: PlanDocument,
  zone: Pick<ZoneRecord, 'name' | 'schedule'>,
  fixtureIds: Iterable<string>,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (zone.name.trim() === '') return refuse('no-name', 'Give the zone a name.');
  const { id } = draft.put({ kind: 'zone', id: draft.ids(), ...zone, name: zone.name.trim() });
  for (const fixtureId of fixtureIds) {
    const fixture = draft.of(fixtureId, 'fixture');
    if (fixture) draft.put({ ...fixture, zoneId: id });
  }
  return made(draft, [id]);
}

export function placeMeasurement(
  doc: PlanDocument,
  measurement: { readonly sheetId: string; readonly points: readonly PlanPoint[] },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(measurement.sheetId, 'sheet')) return missing('sheet');
  if (measurement.points.length < 2)
    return refuse('too-few-points', 'Measuring needs a start and an end: click both.');
  const points = [...measurement.points];
  const record = draft.put({
    kind: 'measurement',
    id: draft.ids(),
    sheetId: measurement.sheetId,
    points,
    lightTarget: null,
  });
  return made(draft, [record.id]);
}

export function placeNote(
  doc: PlanDocument,
  note: Place & { readonly text: string },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  if (!draft.of(note.sheetId, 'sheet')) return missing('sheet');
  const { sheetId, at, text } = note;
  const record = draft.put({ kind: 'note', id: draft.ids(), sheetId, at, text });
  return made(draft, [record.id]);
}

/** Puts a stored sheet on the plan, last in order; its record has the id of the stored sheet. */
export function addSheet(
  doc: PlanDocument,
  sheet: Omit<SheetRecord, 'kind' | 'order' | 'references' | 'groundMetersPerPaperMeter' | 'whiteLux'>,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  let order = 0;
  for (const other of recordsOf(doc, 'sheet')) order = Math.max(order, other.order + 1);
  draft.put({
    ...sheet,
    kind: 'sheet',
    order,
    references: [],
    groundMetersPerPaperMeter: null,
    whiteLux: null,
  });
  return made(draft, [sheet.id]);
}
