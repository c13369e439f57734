import type { CableItem, CatalogueItem, FixtureItem, LampItem, TransformerItem } from '../catalogue/index.js';
import { defaultSettings, type IdSource } from './build.js';
import { type Change, planOf } from './change.js';
import {
  addZone,
  deleteRecords,
  drawCable,
  duplicate,
  type EditResult,
  moveRecords,
  placeArea,
  placeFace,
  placeFixture,
  placeJunction,
  placeNote,
  placeTransformer,
  placeTree,
  setFields,
  setRunTerminals,
  splitCable,
  tapsOf,
} from './edits/index.js';
import type { PlanDocument, PlanRecord, RecordKind, SheetRecord } from './records.js';
import { usualSchedule } from './schedule.js';

/** Ids counted up, so that a test reads the same every time. */
export function countedIds(prefix = 'id'): IdSource {
  let n = 0;
  return () => `${prefix}${++n}`;
}

/** Mulberry32: small, good enough to shuffle tests, the same everywhere for a seed. */
export function seeded(seed: number): () => number {
  let a = seed >>> 0;
  return () => {
    a = (a + 0x6d2b79f5) >>> 0;
    let t = Math.imul(a ^ (a >>> 15), 1 | a);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}

export const pathLight: FixtureItem = {
  category: 'fixture',
  name: 'Brass path light, 3 W',
  kind: 'path',
  light: 'integrated',
  lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
  mountingHeightMeters: 0.5,
  wetListed: false,
  load: { kind: 'driver', watts: 3, powerFactor: 0.9, minVolts: 9 },
  window: { minVolts: 9, maxVolts: 15 },
  target: { minVolts: 10.5, maxVolts: 13 },
  lumens: 180,
  beamDegrees: null,
  cctKelvin: 2700,
};

export const upLight: FixtureItem = {
  category: 'fixture',
  name: 'Bronze up light',
  kind: 'up',
  light: 'lamp',
  base: 'MR16',
  maxWatts: 35,
  lead: { conductor: { awg: 16 }, lengthMeters: 1.2 },
  mountingHeightMeters: null,
  wetListed: false,
};

export const halogenLamp: LampItem = {
  category: 'lamp',
  name: 'Halogen reflector lamp, 35 W',
  base: 'MR16',
  technology: 'halogen',
  load: { kind: 'filament', watts: 35, ratedVolts: 12 },
  window: { minVolts: 10, maxVolts: 12.6 },
  target: { minVolts: 10.8, maxVolts: 12 },
  lumens: 600,
  beamDegrees: 36,
  cctKelvin: 2900,
  lifeHours: 4000,
};

export const cable12: CableItem = {
  category: 'cable',
  name: 'Two-wire cable, 12 AWG',
  conductor: { awg: 12 },
  ampacityAmps: 20,
  directBurial: true,
};
export const cable16: CableItem = {
  ...cable12,
  name: 'Two-wire cable, 16 AWG',
  conductor: { awg: 16 },
  ampacityAmps: 10,
};

export const transformer300: TransformerItem = {
  category: 'transformer',
  name: 'Transformer, 300 VA, two commons',
  ratedVA: 300,
  nominalLineVolts: 120,
  regulationPercent: 3,
  ratedAt: 'open',
  windings: [{ id: 'w1', ratedVA: 300 }],
  terminals: [
    { type: 'common', id: 'C1', winding: 'w1', limitAmps: 25, maxConductors: 3 },
    { type: 'tap', id: '11V', volts: 11, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'tap', id: '12V', volts: 12, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'tap', id: '13V', volts: 13, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'common', id: 'C2', winding: 'w1', limitAmps: 25, maxConductors: 3 },
  ],
  supply: 'ac',
};

/** Two windings, each with a tap and a common of its own. */
export const transformerSplit: TransformerItem = {
  ...transformer300,
  name: 'Transformer, two windings of 150 VA',
  windings: [
    { id: 'w1', ratedVA: 150 },
    { id: 'w2', ratedVA: 150 },
  ],
  terminals: [
    { type: 'tap', id: '12A', volts: 12, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'common', id: 'CA', winding: 'w1', limitAmps: 12.5, maxConductors: 3 },
    { type: 'tap', id: '12B', volts: 12, winding: 'w2', limitAmps: null, maxConductors: 3 },
    { type: 'common', id: 'CB', winding: 'w2', limitAmps: 12.5, maxConductors: 3 },
  ],
};

export const choice = (item: CatalogueItem) => ({ sourceId: `cat-${item.name.length}`, item });

/** A plan drawing at 100 sheet pixels to the metre. */
export function sheet(id = 'sheet1', order = 0): SheetRecord {
  return {
    kind: 'sheet',
    id,
    name: 'Plot plan',
    order,
    widthPx: 4000,
    heightPx: 3000,
    view: 'plan',
    pixelsPerPaperMeter: null,
    references: [{ id: 'r1', kind: 'length', a: { x: 0, y: 0 }, b: { x: 1000, y: 0 }, meters: 10 }],
    groundMetersPerPaperMeter: null,
    whiteLux: null,
  };
}

export function startPlan(): PlanDocument {
  return planOf([sheet(), defaultSettings('us')]);
}

/** The change of an edit that must have been made. */
export function must(result: EditResult): Change {
  if (result.kind === 'change') return result.change;
  throw new Error(`expected a change, got ${result.kind}: ${result.message}`);
}

export function first<K extends RecordKind>(doc: PlanDocument, kind: K): Extract<PlanRecord, { kind: K }> {
  for (const record of doc.values())
    if (record.kind === kind) return record as Extract<PlanRecord, { kind: K }>;
  throw new Error(`no ${kind} on the plan`);
}

/** One random edit of the plan, of any kind that makes sense on it; null where the dice gave a refused one. */
export function randomEdit(doc: PlanDocument, random: () => number, ids: IdSource): Change | null {
  const all = [...doc.values()];
  const pick = <T>(list: readonly T[]): T | undefined => list[Math.floor(random() * list.length)];
  const at = () => ({ x: Math.round(random() * 4000), y: Math.round(random() * 3000) });
  const nodes = all.filter((r) => ['transformer', 'fixture', 'junction'].includes(r.kind));
  const cables = all.filter((r) => r.kind === 'cable');
  const movable = all.filter((r) => !['sheet', 'settings', 'item', 'run'].includes(r.kind));
  const sheetId = 'sheet1';
  const edits: (() => EditResult | undefined)[] = [
    () =>
      placeFixture(
        doc,
        {
          sheetId,
          at: at(),
          fixture: choice(pathLight),
          lamp: null,
          onCableId: random() < 0.3 ? pick(cables)?.id : undefined,
        },
        ids,
      ),
    () => placeFixture(doc, { sheetId, at: at(), fixture: choice(upLight), lamp: choice(halogenLamp) }, ids),
    () => placeTransformer(doc, { sheetId, at: at(), transformer: choice(transformer300) }, ids),
    () => placeJunction(doc, { sheetId, at: at(), style: 'hub', item: null }, ids),
    () => placeNote(doc, { sheetId, at: at(), text: `note ${Math.floor(random() * 100)}` }, ids),
    () => placeArea(doc, { sheetId, use: 'lawn', points: [at(), at(), at()] }, ids),
    () => randomMark(doc, at, random, nodes, ids),
    () =>
      drawCable(
        doc,
        {
          sheetId,
          stops: Array.from({ length: 2 + Math.floor(random() * 3) }, () => {
            const node = pick(nodes);
            const cable = pick(cables);
            const dice = random();
            if (node && dice < 0.75) return { on: 'record' as const, id: node.id };
            if (cable && dice < 0.9) return { on: 'cable' as const, id: cable.id, at: at() };
            return { on: 'sheet' as const, at: at() };
          }),
          cable: choice(random() < 0.7 ? cable12 : cable16),
          markedToMarked: random() < 0.5,
        },
        ids,
      ),
    () =>
      moveRecords(
        doc,
        [pick(movable), pick(movable)].flatMap((r) => (r ? [r.id] : [])),
        7,
        -3,
        ids,
      ),
    () =>
      deleteRecords(
        doc,
        [pick(movable)].flatMap((r) => (r ? [r.id] : [])),
        ids,
      ),
    () =>
      duplicate(
        doc,
        [pick(movable), pick(movable), pick(cables)].flatMap((r) => (r ? [r.id] : [])),
        { dx: 20, dy: 20 },
        ids,
      ),
    () => {
      const cable = pick(cables);
      return cable && splitCable(doc, cable.id, at(), ids);
    },
    () => {
      const run = pick(all.filter((r) => r.kind === 'run'));
      return run && setRunTerminals(doc, run.id, { tapId: pick(tapsOf(transformer300))?.id }, ids);
    },
    () =>
      setFields(
        doc,
        [pick(cables)].flatMap((r) => (r ? [r.id] : [])),
        'cable',
        { measuredMeters: random() * 20 },
        ids,
      ),
  ];
  const result = pick(edits)?.();
  return result?.kind === 'change' ? result.change : null;
}

/** One of the marks of light, at random: they share one face of the die, so that edits of old records stay as likely. */
function randomMark(
  doc: PlanDocument,
  at: () => { x: number; y: number },
  random: () => number,
  nodes: readonly PlanRecord[],
  ids: IdSource,
): EditResult {
  const sheetId = 'sheet1';
  const dice = random();
  if (dice < 1 / 3) return placeFace(doc, { sheetId, foot: [at(), at()], top: null, heightMeters: 3 }, ids);
  if (dice < 2 / 3) {
    const tree = { sheetId, foot: at(), outline: [at(), at(), at()], heightMeters: 6, crownBaseMeters: 2 };
    return placeTree(doc, tree, ids);
  }
  const lights = nodes.filter((r) => r.kind === 'fixture' && random() < 0.3).map(({ id }) => id);
  return addZone(doc, { name: 'Zone', schedule: usualSchedule }, lights, ids);
}
