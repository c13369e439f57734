import type { CatalogueItem, FixtureItem, LampItem } from '../catalogue/index.js';
import { scaleOfSheet } from '../estimate/index.js';
import {
  type Aim,
  apply,
  drawCable,
  type EditResult,
  type Fields,
  type FixtureRecord,
  type PlanDocument,
  type PlanPoint,
  placeArea,
  placeFace,
  placeFixture,
  placeTransformer,
  placeTree,
  planOf,
  type RecordKind,
  recordOf,
  type SheetRecord,
  setFields,
} from '../plan/index.js';
import { cable12, choice, countedIds, must, sheet, startPlan, transformer300 } from '../plan/plan.testkit.js';
import { threeRectangles } from '../sheet/yard.testkit.js';
import { nightNotesOf, nightSceneOf } from './scene-of-plan.js';

/** A plan under edit, on a drawing of 100 pixels to the metre unless another sheet is given. */
export class Garden {
  doc: PlanDocument;
  readonly ids = countedIds();

  constructor(readonly sheet: SheetRecord = drawing()) {
    this.doc = apply(startPlan(), { put: { [sheet.id]: sheet }, remove: [] });
    this.doc = planOf([...this.doc.values()]);
  }
  do(result: EditResult): string {
    this.doc = apply(this.doc, must(result));
    return (result.kind === 'change' ? result.selected[0] : undefined) ?? '';
  }
  light(
    item: FixtureItem,
    x: number,
    y: number,
    more: Partial<FixtureRecord> & { lamp?: LampItem } = {},
  ): string {
    const { lamp, ...fields } = more;
    const id = this.do(
      placeFixture(
        this.doc,
        { sheetId: this.sheet.id, at: { x, y }, fixture: choice(item), lamp: lamp ? choice(lamp) : null },
        this.ids,
      ),
    );
    if (Object.keys(fields).length > 0) this.set('fixture', [id], fields);
    return id;
  }
  set<K extends RecordKind>(kind: K, records: string[], fields: Fields<K>): void {
    this.do(setFields(this.doc, records, kind, fields, this.ids));
  }
  transformer(x = 0, y = 0): string {
    const transformer = choice(transformer300 as CatalogueItem);
    return this.do(
      placeTransformer(this.doc, { sheetId: this.sheet.id, at: { x, y }, transformer }, this.ids),
    );
  }
  /** Cable through these records on a run of its own, whose id is given back. */
  run(...stops: string[]): string {
    const cable = this.do(
      drawCable(
        this.doc,
        {
          sheetId: this.sheet.id,
          stops: stops.map((id) => ({ on: 'record', id })),
          cable: choice(cable12),
        },
        this.ids,
      ),
    );
    return recordOf(this.doc, cable, 'cable')?.runId ?? '';
  }
  face(foot: PlanPoint[], heightMeters: number, top: PlanPoint[] | null = null): string {
    return this.do(placeFace(this.doc, { sheetId: this.sheet.id, foot, top, heightMeters }, this.ids));
  }
  tree(foot: PlanPoint, outline: PlanPoint[], heightMeters: number, crownBaseMeters: number): string {
    return this.do(
      placeTree(this.doc, { sheetId: this.sheet.id, foot, outline, heightMeters, crownBaseMeters }, this.ids),
    );
  }
  area(
    use: 'building' | 'canopy' | 'lawn' | 'lot-line',
    points: PlanPoint[],
    heightMeters: number | null = null,
  ): string {
    return this.do(placeArea(this.doc, { sheetId: this.sheet.id, use, points, heightMeters }, this.ids));
  }
  scene(volts: Record<string, number> = {}, groups?: Record<string, string | null>) {
    const scene = nightSceneOf(
      this.doc,
      this.sheet.id,
      new Map(Object.entries(volts)),
      groups && new Map(Object.entries(groups)),
    );
    if (!scene) throw new Error('the sheet has no scale');
    return scene;
  }
  source(id: string, volts: Record<string, number> = {}) {
    const source = this.scene(volts).sources.find((s) => s.id === id);
    if (!source) throw new Error(`no light of ${id} in the scene`);
    return source;
  }
  notes(volts: Record<string, number> = {}) {
    return nightNotesOf(this.doc, this.sheet.id, new Map(Object.entries(volts)));
  }
}

/** 100 pixels to the metre: ground x is to the right, ground y up, so that y on the sheet is the other way. */
export const drawing = (): SheetRecord => sheet();

/** The rendered yard, with the exact corners of its patio, first slab and pond. */
export function yardPhoto(): SheetRecord {
  return {
    ...sheet('photo1'),
    name: 'Yard',
    view: 'photo',
    widthPx: 2400,
    heightPx: 1600,
    references: threeRectangles().map(({ id, kind, corners, widthMeters, depthMeters }) => ({
      id,
      kind,
      corners: corners.map(({ x, y }) => ({ x, y })) as never,
      widthMeters,
      depthMeters,
    })),
  };
}

/** The sheet pixel of a place on the ground. */
export function pixelAt(record: SheetRecord, x: number, y: number): PlanPoint {
  const result = scaleOfSheet(record);
  if (!result.ok) throw new Error(result.message);
  const p = result.scale.sheetFromGround({ x, y } as never);
  if (!p) throw new Error('not in view');
  return { x: p.x, y: p.y };
}

export const square = (x: number, y: number, half: number): PlanPoint[] => [
  { x: x - half, y: y - half },
  { x: x + half, y: y - half },
  { x: x + half, y: y + half },
  { x: x - half, y: y + half },
];

export const tilt = (toward: PlanPoint, degreesFromDown: number): Aim => ({
  kind: 'tilt',
  toward,
  degreesFromDown,
});
