import type { CableLength } from '@lampwright/geometry/estimate';
import { type PlanDocument, recordOf, recordsOf } from '@lampwright/geometry/plan';
import type { Answers } from '../../../plan-view/answers';
import { type FixtureLook, fixtureLook } from '../../../plan-view/fixture-look';
import { tagOf, windowOf } from '../../../plan-view/names';

export interface ProfilePoint {
  readonly id: string;
  readonly tag: string;
  readonly name: string;
  /** Metres of cable from the transformer, by the shortest way. */
  readonly meters: number;
  readonly volts: number;
  readonly look: FixtureLook;
}

export interface ProfileLine {
  readonly cableId: string;
  readonly from: { readonly meters: number; readonly volts: number };
  readonly to: { readonly meters: number; readonly volts: number };
}

/** Volts along one run: its cables as lines, its fixtures as points. */
export interface Profile {
  readonly points: readonly ProfilePoint[];
  readonly lines: readonly ProfileLine[];
  readonly lengthMeters: number;
  readonly farthestMeters: number;
  /** The volts that all of its fixtures are rated for; null where they share none, or there are none. */
  readonly band: { readonly minVolts: number; readonly maxVolts: number } | null;
}

/** Null while the run has no answer, or nothing with a length. */
export function profileOf(
  doc: PlanDocument,
  runId: string,
  answers: Answers,
  lengths: ReadonlyMap<string, CableLength>,
): Profile | null {
  const run = recordOf(doc, runId, 'run');
  if (run === undefined || !answers.runs.has(runId)) return null;
  const edges: Edge[] = [];
  let lengthMeters = 0;
  for (const cable of recordsOf(doc, 'cable')) {
    const length = lengths.get(cable.id)?.totalMeters ?? null;
    const reading = answers.cables.get(cable.id);
    if (cable.runId !== runId || length === null || reading === undefined) continue;
    lengthMeters += length;
    edges.push({
      id: cable.id,
      from: sourceOr(doc, cable.fromId, run.transformerId),
      to: sourceOr(doc, cable.toId, run.transformerId),
      length,
      fromVolts: reading.fromVolts,
      toVolts: reading.toVolts,
    });
  }
  if (edges.length === 0) return null;
  const distances = shortest(run.transformerId, edges);
  const lines: ProfileLine[] = [];
  for (const edge of edges) {
    const a = distances.get(edge.from);
    const b = distances.get(edge.to);
    if (a === undefined || b === undefined) continue;
    lines.push({
      cableId: edge.id,
      from: { meters: a, volts: edge.fromVolts },
      to: { meters: b, volts: edge.toVolts },
    });
  }
  const points: ProfilePoint[] = [];
  let min = Number.NEGATIVE_INFINITY;
  let max = Number.POSITIVE_INFINITY;
  for (const [id, meters] of distances) {
    const fixture = recordOf(doc, id, 'fixture');
    const reading = answers.fixtures.get(id);
    if (fixture === undefined || reading === undefined) continue;
    const window = windowOf(doc, fixture);
    if (window !== null) {
      min = Math.max(min, window.minVolts);
      max = Math.min(max, window.maxVolts);
    }
    const item = recordOf(doc, fixture.itemId, 'item')?.item;
    points.push({
      id,
      tag: tagOf(doc, fixture),
      name: fixture.name || item?.name || 'Fixture',
      meters,
      volts: reading.volts,
      look: fixtureLook(reading, window),
    });
  }
  points.sort((a, b) => a.meters - b.meters);
  return {
    points,
    lines,
    lengthMeters,
    farthestMeters: Math.max(0, ...distances.values()),
    band: Number.isFinite(min) && min <= max ? { minVolts: min, maxVolts: max } : null,
  };
}

interface Edge {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  readonly length: number;
  readonly fromVolts: number;
  readonly toVolts: number;
}

/** A feed is its transformer, seen on another sheet. */
function sourceOr(doc: PlanDocument, id: string, transformerId: string): string {
  const feed = recordOf(doc, id, 'feed');
  return feed?.transformerId === transformerId ? transformerId : id;
}

/** Metres from the source to each node (Dijkstra; a run has few hundred nodes, so a plain scan does). */
function shortest(source: string, edges: readonly Edge[]): Map<string, number> {
  const next = new Map<string, { to: string; length: number }[]>();
  const link = (a: string, b: string, length: number): void => {
    const list = next.get(a);
    if (list === undefined) next.set(a, [{ to: b, length }]);
    else list.push({ to: b, length });
  };
  for (const edge of edges) {
    link(edge.from, edge.to, edge.length);
    link(edge.to, edge.from, edge.length);
  }
  const open = new Map<string, number>([[source, 0]]);
  const done = new Map<string, number>();
  while (open.size > 0) {
    let best: [string, number] | null = null;
    for (const entry of open) if (best === null || entry[1] < best[1]) best = entry;
    const [id, distance] = best!;
    open.delete(id);
    done.set(id, distance);
    for (const { to, length } of next.get(id) ?? []) {
      if (done.has(to)) continue;
      const through = distance + length;
      if (through < (open.get(to) ?? Number.POSITIVE_INFINITY)) open.set(to, through);
    }
  }
  return done;
}

export interface Axis {
  readonly from: number;
  readonly to: number;
  readonly ticks: readonly number[];
}

/** Whole, round steps over a range: about `wanted` of them. */
export function axisOver(low: number, high: number, wanted: number): Axis {
  const span = Math.max(high - low, 1e-6);
  const raw = span / Math.max(1, wanted);
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((k) => k * power).find((s) => s >= raw) ?? 10 * power;
  const from = Math.floor(low / step + 1e-9) * step;
  const to = Math.ceil(high / step - 1e-9) * step;
  const ticks: number[] = [];
  for (let i = 0; from + i * step <= to + step / 1000; i++) ticks.push(Number((from + i * step).toFixed(6)));
  return { from, to, ticks };
}

/** How far a window's edge may lie from the volts and still stretch the axis, in volts. */
const NEAR_EDGE = 2;

/** The volts that the profile shows: all readings, and edges of the window that are near them. */
export function voltsRange(profile: Profile, terminalVolts: number): { low: number; high: number } {
  let low = terminalVolts;
  let high = terminalVolts;
  for (const p of profile.points) {
    low = Math.min(low, p.volts);
    high = Math.max(high, p.volts);
  }
  const { band } = profile;
  if (band !== null) {
    if (low - band.minVolts < NEAR_EDGE) low = Math.min(low, band.minVolts);
    if (band.maxVolts - high < NEAR_EDGE) high = Math.max(high, band.maxVolts);
  }
  const pad = Math.max(0.2, (high - low) * 0.08);
  return { low: low - pad, high: high + pad };
}
