import { cablePoints, type EditResult, type PlanRecord, setFields } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';
import { nearestOn } from './hit';
import { distance, type Preview, type ToolContext } from './tool';

/** A corner or bend is taken hold of within this many window pixels. */
const GRIP = 9;

/** A point of a record in hand. */
export interface Grip {
  /** The record as it is with the point somewhere else. */
  moved(to: Point): Shape;
}

/** A record's points as they would be. */
export type Shape =
  | { readonly of: 'cable' | 'area' | 'measurement'; readonly points: readonly Point[] }
  | { readonly of: 'face'; readonly foot: readonly Point[]; readonly top: readonly Point[] | null }
  | { readonly of: 'tree'; readonly foot: Point; readonly outline: readonly Point[] };

/** The corner or bend under a press; on a cable a new bend where there is none. Null: the record moves whole. */
export function gripOf(ctx: ToolContext, record: PlanRecord, at: Point): Grip | null {
  const reach = GRIP / ctx.zoom();
  const under = (points: readonly Point[]): number => points.findIndex((p) => distance(p, at) <= reach);
  switch (record.kind) {
    case 'area':
    case 'measurement': {
      const index = under(record.points);
      const { kind, points } = record;
      return index < 0 ? null : { moved: (to) => ({ of: kind, points: replaced(points, index, to) }) };
    }
    case 'cable': {
      const points = cablePoints(ctx.doc(), record);
      if (points === undefined) return null;
      const bend = points.findIndex((p, i) => i > 0 && i < points.length - 1 && distance(p, at) <= reach);
      if (bend > 0) return { moved: (to) => ({ of: 'cable', points: replaced(points, bend, to) }) };
      const segment = nearestSegment(points, at);
      const bent = [...points.slice(0, segment + 1), at, ...points.slice(segment + 1)];
      return { moved: (to) => ({ of: 'cable', points: replaced(bent, segment + 1, to) }) };
    }
    case 'face': {
      const { foot, top } = record;
      const upper = top === null ? -1 : under(top);
      if (top !== null && upper >= 0)
        return { moved: (to) => ({ of: 'face', foot, top: replaced(top, upper, to) }) };
      const lower = under(foot);
      if (lower < 0) return null;
      const old = foot[lower]!;
      return {
        moved: (to) => ({
          of: 'face',
          foot: replaced(foot, lower, to),
          // What stands on the point goes along with it.
          top:
            top?.map((p, i) => (i === lower ? { x: p.x + to.x - old.x, y: p.y + to.y - old.y } : p)) ?? null,
        }),
      };
    }
    case 'tree': {
      const { foot, outline } = record;
      const index = under(outline);
      if (index >= 0) return { moved: (to) => ({ of: 'tree', foot, outline: replaced(outline, index, to) }) };
      if (under([foot]) < 0) return null;
      return { moved: (to) => ({ of: 'tree', foot: { x: to.x, y: to.y }, outline }) };
    }
    default:
      return null;
  }
}

export function shapePreview(id: string, shape: Shape): Preview {
  switch (shape.of) {
    case 'cable':
    case 'area':
    case 'measurement':
      return { kind: 'shape', id, points: shape.points };
    case 'face':
      return { kind: 'face', foot: shape.foot, top: shape.top, pending: null, waitsForTop: false };
    case 'tree':
      return { kind: 'tree', foot: shape.foot, outline: shape.outline, pending: null };
  }
}

/** What the history calls a new shape. */
export function shapeLabel(shape: Shape): string {
  switch (shape.of) {
    case 'cable':
      return 'Bend cable';
    case 'area':
      return 'Reshape area';
    case 'measurement':
      return 'Move measuring point';
    case 'face':
      return 'Reshape wall face';
    case 'tree':
      return 'Reshape tree';
  }
}

export function setShape(ctx: ToolContext, id: string, shape: Shape): EditResult {
  const doc = ctx.doc();
  switch (shape.of) {
    case 'cable':
      return setFields(doc, [id], 'cable', { via: shape.points.slice(1, -1) });
    case 'area':
    case 'measurement':
      return setFields(doc, [id], shape.of, { points: [...shape.points] });
    case 'face':
      return setFields(doc, [id], 'face', {
        foot: [...shape.foot],
        top: shape.top === null ? null : [...shape.top],
      });
    case 'tree':
      return setFields(doc, [id], 'tree', { foot: shape.foot, outline: [...shape.outline] });
  }
}

function nearestSegment(points: readonly Point[], at: Point): number {
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i + 1 < points.length; i++) {
    const d = nearestOn([points[i]!, points[i + 1]!], at)?.distance ?? Number.POSITIVE_INFINITY;
    if (d < least) {
      best = i;
      least = d;
    }
  }
  return best;
}

function replaced(points: readonly Point[], index: number, at: Point): Point[] {
  return points.map((p, i) => (i === index ? { x: at.x, y: at.y } : p));
}
