import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import {
  type AreaUse,
  addZone,
  apply,
  type CableStop,
  type Change,
  drawCable,
  type EditResult,
  type Fields,
  type IdSource,
  type ItemChoice,
  type LightTarget,
  type PlanDocument,
  type PlanPoint,
  placeArea,
  placeFace,
  placeFixture,
  placeJunction,
  placeMeasurement,
  placeNote,
  placeTransformer,
  placeTree,
  type RecordKind,
  type ReferenceRecord,
  recordOf,
  type Schedule,
  setFields,
  setRunTerminals,
} from '@lampwright/geometry/plan';

export type Point = readonly [x: number, y: number];
const pointOf = ([x, y]: Point): PlanPoint => ({ x, y });

/** A catalogue entry by its name: the company's own entry, so that the plan's copy knows where it came from. */
export type Catalogue = (name: string) => { readonly sourceId: string | null; readonly item: CatalogueItem };

export interface DrawnTree {
  readonly foot: Point;
  /** Its crown: on a photo the silhouette, on a drawing from above its edge. */
  readonly outline: readonly Point[];
  /** Of its top above the ground. */
  readonly heightMeters: number;
  /** Of the lower edge of the crown; a shrub's is the ground. */
  readonly crownBaseMeters?: number;
}

/** Draws a plan on one sheet by the same edits as the editor's tools, one change each. */
export class PlanBuilder {
  readonly changes: Change[] = [];
  private readonly ids: IdSource;

  constructor(
    private doc: PlanDocument,
    readonly sheetId: string,
    private readonly catalogue: Catalogue,
    prefix: string,
  ) {
    let count = 0;
    this.ids = () => {
      count += 1;
      return `${prefix}-${count}`;
    };
  }

  get plan(): PlanDocument {
    return this.doc;
  }

  calibrate(references: ReferenceRecord[], groundMetersPerPaperMeter: number | null = null): void {
    this.set([this.sheetId], 'sheet', { references, groundMetersPerPaperMeter });
  }

  area(use: AreaUse, name: string, points: readonly Point[], heightMeters: number | null = null): string {
    const { sheetId } = this;
    const ids = this.make(
      placeArea(this.doc, { sheetId, use, points: points.map(pointOf), heightMeters }, this.ids),
    );
    this.set(ids, 'area', { name });
    return one(ids);
  }

  /** An upright surface of a photo, along its foot, with its upper edge as seen there. */
  face(name: string, foot: readonly Point[], top: readonly Point[], heightMeters: number): string {
    const { sheetId } = this;
    const edges = { foot: foot.map(pointOf), top: top.map(pointOf) };
    return one(this.make(placeFace(this.doc, { sheetId, name, ...edges, heightMeters }, this.ids)));
  }

  tree(name: string, { foot, outline, heightMeters, crownBaseMeters = 0 }: DrawnTree): string {
    const { sheetId } = this;
    const tree = { sheetId, name, foot: pointOf(foot), outline: outline.map(pointOf) };
    return one(this.make(placeTree(this.doc, { ...tree, heightMeters, crownBaseMeters }, this.ids)));
  }

  /** Points lights at a place on the sheet, so high above the ground there. */
  aim(ids: readonly string[], at: Point, heightMeters: number): void {
    this.set(ids, 'fixture', { aim: { kind: 'point', at: pointOf(at), heightMeters } });
  }

  zone(name: string, schedule: Schedule, fixtureIds: readonly string[]): void {
    this.make(addZone(this.doc, { name, schedule }, fixtureIds, this.ids));
  }

  lightTarget(areaId: string, lightTarget: LightTarget): void {
    this.set([areaId], 'area', { lightTarget });
  }

  /** Gives the run of a cable a switch of its own. */
  switchRun(cableId: string, schedule: Schedule): void {
    this.set([this.runOf(cableId)], 'run', { schedule });
  }

  transformer(item: string, at: Point, name: string): string {
    const { sheetId } = this;
    const placing = { sheetId, at: pointOf(at), transformer: this.item(item) };
    const ids = this.make(placeTransformer(this.doc, placing, this.ids));
    this.set(ids, 'transformer', { name });
    return one(ids);
  }

  fixture(item: string, at: Point, lamp: string | null = null): string {
    const { sheetId } = this;
    const lit = lamp === null ? null : this.item(lamp);
    return one(
      this.make(
        placeFixture(this.doc, { sheetId, at: pointOf(at), fixture: this.item(item), lamp: lit }, this.ids),
      ),
    );
  }

  fixtures(item: string, places: readonly Point[], lamp: string | null = null): string[] {
    return places.map((at) => this.fixture(item, at, lamp));
  }

  hub(item: string, at: Point): string {
    const { sheetId } = this;
    const placing = { sheetId, at: pointOf(at), style: 'hub', item: this.item(item) } as const;
    return one(this.make(placeJunction(this.doc, placing, this.ids)));
  }

  /** Cable along stops: a record's id, or a bend. Cable that leaves a transformer begins a run. */
  cable(item: string, stops: readonly (string | Point)[]): string[] {
    const { sheetId } = this;
    const drawing = { sheetId, cable: this.item(item), stops: stops.map(stopOf) };
    return this.make(drawCable(this.doc, drawing, this.ids));
  }

  /** Lands the run of a cable on a tap and a common, and names it. */
  land(cableId: string, name: string, tapId: string, commonId: string): void {
    const runId = this.runOf(cableId);
    this.make(setRunTerminals(this.doc, runId, { tapId, commonId }, this.ids));
    this.set([runId], 'run', { name });
  }

  measure(points: readonly Point[]): void {
    const { sheetId } = this;
    this.make(placeMeasurement(this.doc, { sheetId, points: points.map(pointOf) }, this.ids));
  }

  note(at: Point, text: string): void {
    const { sheetId } = this;
    this.make(placeNote(this.doc, { sheetId, at: pointOf(at), text }, this.ids));
  }

  set<K extends RecordKind>(ids: Iterable<string>, kind: K, fields: Fields<K>): void {
    this.make(setFields(this.doc, ids, kind, fields, this.ids));
  }

  private runOf(cableId: string): string {
    const runId = recordOf(this.doc, cableId, 'cable')?.runId;
    if (!runId) throw new Error(`Cable ${cableId} belongs to no run.`);
    return runId;
  }

  private item(name: string): ItemChoice {
    return this.catalogue(name);
  }

  private make(result: EditResult): string[] {
    if (result.kind !== 'change') throw new Error(`The demo plan can't be drawn: ${result.message}`);
    this.changes.push(result.change);
    this.doc = apply(this.doc, result.change);
    return result.selected;
  }
}

function stopOf(stop: string | Point): CableStop {
  return typeof stop === 'string' ? { on: 'record', id: stop } : { on: 'sheet', at: pointOf(stop) };
}

function one(ids: readonly string[]): string {
  const [id] = ids;
  if (id === undefined || ids.length > 1) throw new Error(`One record was expected, not ${ids.length}.`);
  return id;
}
