import {
  type CableRecord,
  cablePoints,
  type FaceRecord,
  isNode,
  type NodeRecord,
  type PlanRecord,
  type TreeRecord,
} from '@lampwright/geometry/plan';
import type { Box, Point } from '../../../plan-view/camera';
import { boxAround, contains } from '../../../plan-view/camera';
import { distance, type ToolContext } from './tool';

/** A thin line is hit within this many window pixels; a mark within its radius and a little more. */
const LINE_REACH = 7;
const MARK_REACH = 5;

/** The topmost record under a sheet point: marks over cable over measurements over trees, faces and areas. */
export function hitAt(ctx: ToolContext, at: Point): PlanRecord | null {
  return (
    nodeAt(ctx, at) ??
    noteAt(ctx, at) ??
    cableAt(ctx, at)?.cable ??
    lineAt(ctx, at) ??
    uprightAt(ctx, at) ??
    areaAt(ctx, at)
  );
}

/** The mark under a point, the nearest one where several are. */
export function nodeAt(ctx: ToolContext, at: Point): NodeRecord | null {
  let best: NodeRecord | null = null;
  let least = (ctx.markRadius() + MARK_REACH) / ctx.zoom();
  for (const record of ctx.doc().values()) {
    if (!isNode(record) || record.sheetId !== ctx.sheetId()) continue;
    const d = distance(record.at, at);
    if (d <= least) {
      best = record;
      least = d;
    }
  }
  return best;
}

function noteAt(ctx: ToolContext, at: Point): PlanRecord | null {
  const reach = (ctx.markRadius() + MARK_REACH) / ctx.zoom();
  for (const record of ctx.doc().values())
    if (record.kind === 'note' && record.sheetId === ctx.sheetId() && distance(record.at, at) <= reach)
      return record;
  return null;
}

export interface CableHit {
  readonly cable: CableRecord;
  /** The nearest place on it. */
  readonly at: Point;
}

export function cableAt(ctx: ToolContext, at: Point): CableHit | null {
  let best: CableHit | null = null;
  let least = LINE_REACH / ctx.zoom();
  for (const record of ctx.doc().values()) {
    if (record.kind !== 'cable' || record.sheetId !== ctx.sheetId()) continue;
    const points = cablePoints(ctx.doc(), record);
    if (points === undefined) continue;
    const near = nearestOn(points, at);
    if (near !== null && near.distance <= least) {
      best = { cable: record, at: near.at };
      least = near.distance;
    }
  }
  return best;
}

function lineAt(ctx: ToolContext, at: Point): PlanRecord | null {
  const reach = LINE_REACH / ctx.zoom();
  for (const record of ctx.doc().values()) {
    if (record.kind !== 'measurement' || record.sheetId !== ctx.sheetId()) continue;
    const near = nearestOn(record.points, at);
    if (near !== null && near.distance <= reach) return record;
  }
  return null;
}

/** Trees and faces are hit by their edges, and a tree by its foot: what they stand before stays within reach. */
function uprightAt(ctx: ToolContext, at: Point): PlanRecord | null {
  let best: PlanRecord | null = null;
  let least = LINE_REACH / ctx.zoom();
  for (const record of ctx.doc().values()) {
    if ((record.kind !== 'tree' && record.kind !== 'face') || record.sheetId !== ctx.sheetId()) continue;
    for (const line of edgesOf(record)) {
      const near = nearestOn(line, at);
      if (near !== null && near.distance <= least) {
        best = record;
        least = near.distance;
      }
    }
    if (record.kind === 'tree' && distance(record.foot, at) <= least) {
      best = record;
      least = distance(record.foot, at);
    }
  }
  return best;
}

/** The lines that a tree or face is drawn with. */
function edgesOf(record: FaceRecord | TreeRecord): readonly (readonly Point[])[] {
  switch (record.kind) {
    case 'tree':
      return [[...record.outline, record.outline[0]!]];
    case 'face':
      return record.top === null
        ? [record.foot]
        : [[...record.foot, ...[...record.top].reverse(), record.foot[0]!]];
  }
}

/** The smallest area around a point, so that a bed in a lawn can be chosen. */
function areaAt(ctx: ToolContext, at: Point): PlanRecord | null {
  let best: PlanRecord | null = null;
  let least = Number.POSITIVE_INFINITY;
  const reach = LINE_REACH / ctx.zoom();
  for (const record of ctx.doc().values()) {
    if (record.kind !== 'area' || record.sheetId !== ctx.sheetId()) continue;
    const closed = [...record.points, record.points[0]!];
    const onEdge = (nearestOn(closed, at)?.distance ?? Number.POSITIVE_INFINITY) <= reach;
    // A lot line is a line: what it surrounds is everything.
    if (!onEdge && (record.use === 'lot-line' || !insidePolygon(record.points, at))) continue;
    const size = Math.abs(signedArea(record.points));
    if (size < least) {
      best = record;
      least = size;
    }
  }
  return best;
}

/** Ids of the records of the sheet that lie in a box with all that is of them. */
export function idsInBox(ctx: ToolContext, box: Box): string[] {
  const ids: string[] = [];
  for (const record of ctx.doc().values()) {
    if (!('sheetId' in record) || record.sheetId !== ctx.sheetId()) continue;
    const points = extentOf(ctx, record);
    if (points.length > 0 && points.every((p) => contains(box, p))) ids.push(record.id);
  }
  return ids;
}

/** The points that a record covers on its sheet; empty for what has no place. */
export function extentOf(ctx: Pick<ToolContext, 'doc'>, record: PlanRecord): readonly Point[] {
  switch (record.kind) {
    case 'transformer':
    case 'feed':
    case 'fixture':
    case 'junction':
    case 'note':
      return [record.at];
    case 'cable':
      return cablePoints(ctx.doc(), record) ?? [];
    case 'area':
    case 'measurement':
      return record.points;
    case 'face':
      return [...record.foot, ...(record.top ?? [])];
    case 'tree':
      return [record.foot, ...record.outline];
    case 'sheet':
    case 'run':
    case 'zone':
    case 'item':
    case 'settings':
      return [];
  }
}

export function boxOfRecords(ctx: Pick<ToolContext, 'doc'>, ids: Iterable<string>): Box | null {
  const points: Point[] = [];
  for (const id of ids) {
    const record = ctx.doc().get(id);
    if (record !== undefined) points.push(...extentOf(ctx, record));
  }
  return boxAround(points);
}

export function nearestOn(points: readonly Point[], at: Point): { at: Point; distance: number } | null {
  let best: { at: Point; distance: number } | null = null;
  for (let i = 0; i + 1 < points.length; i++) {
    const a = points[i]!;
    const b = points[i + 1]!;
    const dx = b.x - a.x;
    const dy = b.y - a.y;
    const square = dx * dx + dy * dy;
    const t = square === 0 ? 0 : Math.min(1, Math.max(0, ((at.x - a.x) * dx + (at.y - a.y) * dy) / square));
    const p = { x: a.x + t * dx, y: a.y + t * dy };
    const d = distance(p, at);
    if (best === null || d < best.distance) best = { at: p, distance: d };
  }
  return best;
}

export function insidePolygon(points: readonly Point[], at: Point): boolean {
  let inside = false;
  for (let i = 0, j = points.length - 1; i < points.length; j = i++) {
    const a = points[i]!;
    const b = points[j]!;
    if (a.y > at.y !== b.y > at.y && at.x < ((b.x - a.x) * (at.y - a.y)) / (b.y - a.y) + a.x)
      inside = !inside;
  }
  return inside;
}

export function signedArea(points: readonly Point[]): number {
  let sum = 0;
  points.forEach((p, i) => {
    const q = points[(i + 1) % points.length]!;
    sum += p.x * q.y - q.x * p.y;
  });
  return sum / 2;
}
