import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { scaleOfSheet } from '@lampwright/geometry/estimate';
import {
  apply,
  type Change,
  defaultSettings,
  type ItemChoice,
  type PlanDocument,
  type PlanRecord,
  planOf,
  planProblems,
  type RecordKind,
  type RecordOf,
  recordOf,
  recordsOf,
  type SheetRecord,
} from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { Point } from '../../../plan-view/camera';
import { ToolHost } from './host';
import type { Choices, Preview, Request, ToolId } from './tool';

export const pathLight: CatalogueItem = {
  category: 'fixture',
  name: 'Brass path light, 3 W',
  kind: 'path',
  lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
  mountingHeightMeters: null,
  wetListed: false,
  light: 'integrated',
  load: { kind: 'driver', watts: 3, powerFactor: 0.9, minVolts: 9 },
  window: { minVolts: 9, maxVolts: 15 },
  target: { minVolts: 10.5, maxVolts: 13 },
  lumens: 200,
  beamDegrees: null,
  cctKelvin: 2700,
};
export const cable12: CatalogueItem = {
  category: 'cable',
  name: '12 AWG burial cable',
  conductor: { awg: 12 },
  ampacityAmps: null,
  directBurial: true,
};
export const transformer300: CatalogueItem = {
  category: 'transformer',
  name: 'Transformer, 300 VA',
  ratedVA: 300,
  nominalLineVolts: 120,
  regulationPercent: 0,
  ratedAt: 'open',
  windings: [{ id: 'w1', ratedVA: 300 }],
  terminals: [
    { type: 'tap', id: '12V', volts: 12, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'tap', id: '15V', volts: 15, winding: 'w1', limitAmps: null, maxConductors: 3 },
    { type: 'common', id: '1', winding: 'w1', limitAmps: 25, maxConductors: 3 },
    { type: 'common', id: '2', winding: 'w1', limitAmps: 25, maxConductors: 3 },
  ],
  supply: 'ac',
};

const entry = (sourceId: string, item: CatalogueItem): ItemChoice => ({ sourceId, item });

export const choices: Choices = {
  fixture: { item: entry('path', pathLight), lamp: null, initial: 'P' },
  transformer: { kind: 'new', item: entry('t300', transformer300) },
  cable: entry('c12', cable12),
  junction: 'hub',
  reference: 'length',
};

/** A sheet of 100 pixels a metre, seen from above. */
export const sheet: SheetRecord = {
  kind: 'sheet',
  id: 'sheet',
  name: 'Plot plan',
  order: 0,
  widthPx: 2000,
  heightPx: 1500,
  view: 'plan',
  pixelsPerPaperMeter: null,
  groundMetersPerPaperMeter: null,
  whiteLux: null,
  references: [{ id: 'r', kind: 'length', a: { x: 0, y: 0 }, b: { x: 1000, y: 0 }, meters: 10 }],
};

const plainMods = { shift: false, alt: false };

/** Works the tools as a hand would, without a canvas: clicks, drags and keys in sheet pixels. */
export class Driver {
  doc: PlanDocument;
  selection: ReadonlySet<string> = new Set();
  hovered: string | null = null;
  readonly labels: string[] = [];
  readonly said: string[] = [];
  readonly requests: Request[] = [];
  choices: Choices = choices;
  zoom = 1;
  readonly host: ToolHost;

  constructor(records: readonly PlanRecord[] = [sheet, defaultSettings('us')]) {
    this.doc = planOf(records);
    this.host = new ToolHost({
      doc: () => this.doc,
      sheetId: () => 'sheet',
      scale: () => this.scale,
      zoom: () => this.zoom,
      markRadius: () => 13,
      choices: () => this.choices,
      selection: () => this.selection,
      select: (ids) => {
        this.selection = new Set(ids);
      },
      hover: (id) => {
        this.hovered = id;
      },
      commit: (change, label) => this.commit(change, label),
      request: (request) => this.requests.push(request),
      say: (message) => this.said.push(message),
    });
  }

  get scale(): SolvedScale | null {
    const result = scaleOfSheet(recordOf(this.doc, 'sheet', 'sheet')!);
    return result.ok ? result.scale : null;
  }

  use(tool: ToolId): this {
    this.host.use(tool);
    return this;
  }

  get preview(): Preview | null {
    return this.host.state.getState().preview;
  }

  down(x: number, y: number, mods = plainMods): this {
    this.host.handle({ type: 'down', at: { x, y }, mods });
    return this;
  }

  move(x: number, y: number, mods = plainMods): this {
    this.host.handle({ type: 'move', at: { x, y }, mods });
    return this;
  }

  up(x: number, y: number, mods = plainMods): this {
    this.host.handle({ type: 'up', at: { x, y }, mods });
    return this;
  }

  click(x: number, y: number, mods = plainMods): this {
    return this.move(x, y, mods).down(x, y, mods).up(x, y, mods);
  }

  /** As a browser tells it: two clicks, then the double click. */
  doubleClick(x: number, y: number): this {
    this.click(x, y).click(x, y);
    this.host.handle({ type: 'double', at: { x, y } });
    return this;
  }

  drag(from: Point, to: Point): this {
    this.down(from.x, from.y);
    for (let i = 1; i <= 10; i++)
      this.move(from.x + ((to.x - from.x) * i) / 10, from.y + ((to.y - from.y) * i) / 10);
    return this.up(to.x, to.y);
  }

  cancel(): this {
    this.host.handle({ type: 'cancel' });
    return this;
  }

  key(key: string): boolean {
    return this.host.handle({ type: 'key', key, mods: plainMods });
  }

  typed(meters: number, degrees: number | null): this {
    this.host.handle({ type: 'typed', meters, degrees });
    return this;
  }

  all<K extends RecordKind>(kind: K): RecordOf<K>[] {
    return [...recordsOf(this.doc, kind)];
  }

  private commit(change: Change, label: string): void {
    this.doc = apply(this.doc, change);
    this.labels.push(label);
    const problems = planProblems(this.doc);
    if (problems.length > 0) throw new Error(`${label}: ${problems.map((p) => p.message).join(' ')}`);
  }
}

/** A transformer at 100, 100 and path lights along y = 100, 200 pixels apart. */
export function yardWith(fixtures: number): Driver {
  const driver = new Driver().use('transformer');
  driver.click(100, 100).use('fixture');
  for (let i = 1; i <= fixtures; i++) driver.click(100 + 200 * i, 100);
  driver.labels.length = 0;
  driver.selection = new Set();
  return driver.use('select');
}
