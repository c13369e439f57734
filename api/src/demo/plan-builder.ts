import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import {
  type AreaUse,
  apply,
  type CableStop,
  type Change,
  drawCable,
  type EditResult,
  type Fields,
  type IdSource,
  type ItemChoice,
  type PlanDocument,
  type PlanPoint,
  placeArea,
  placeFixture,
  placeJunction,
  placeMeasurement,
  placeNote,
  placeTransformer,
  type RecordKind,
  type ReferenceRecord,
  recordOf,
  setFields,
  setRunTerminals,
} from '@lampwright/geometry/plan';

export type Point = readonly [x: number, y: number];
const pointOf = ([x, y]: Point): PlanPoint => ({ x, y });

/** A catalogue entry by its name: the company's own entry, so that the plan's copy knows where it came from. */
export type Catalogue = (name: string) => { readonly sourceId: string | null; readonly item: CatalogueItem };

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

  area(use: AreaUse, name: string, points: readonly Point[], heightMeters: number | null = null): void {
    const { sheetId } = this;
    const ids = this.make(
      placeArea(this.doc, { sheetId, use, points: points.map(pointOf), heightMeters }, this.ids),
    );
    this.set(ids, 'area', { name });
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
    const runId = recordOf(this.doc, cableId, 'cable')?.runId;
    if (!runId) throw new Error(`Cable ${cableId} belongs to no run.`);
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
