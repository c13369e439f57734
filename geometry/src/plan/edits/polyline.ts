import type { CableRecord, PlanDocument, PlanPoint } from '../records.js';

/** A polyline cut in two at a point of it. `share` is the first part's share of the length in sheet pixels. */
export interface Cut {
  readonly at: PlanPoint;
  readonly before: PlanPoint[];
  readonly after: PlanPoint[];
  readonly share: number;
}

/** The points of a cable in sheet pixels, ends included; undefined while an end is missing. */
export function cablePoints(doc: PlanDocument, cable: CableRecord): PlanPoint[] | undefined {
  const from = doc.get(cable.fromId);
  const to = doc.get(cable.toId);
  if (!from || !to || !('at' in from) || !('at' in to)) return undefined;
  return [from.at, ...cable.via, to.at];
}

/**
 * Cuts a polyline at the place on it that is nearest to `near`. `before` and `after` are the inner points on
 * either side, without the ends and without the cut itself.
 */
export function cutAt(points: readonly PlanPoint[], near: PlanPoint): Cut {
  let best = { distance: Number.POSITIVE_INFINITY, segment: 0, at: points[0] ?? near };
  const lengths: number[] = [];
  for (let i = 0; i + 1 < points.length; i += 1) {
    const a = points[i] as PlanPoint;
    const b = points[i + 1] as PlanPoint;
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    lengths.push(length);
    const along = length === 0 ? 0 : ((near.x - a.x) * (b.x - a.x) + (near.y - a.y) * (b.y - a.y)) / length;
    const t = length === 0 ? 0 : Math.min(1, Math.max(0, along / length));
    const at = { x: a.x + t * (b.x - a.x), y: a.y + t * (b.y - a.y) };
    const distance = Math.hypot(near.x - at.x, near.y - at.y);
    if (distance < best.distance) best = { distance, segment: i, at };
  }
  const { segment, at } = best;
  const start = points[segment] ?? at;
  const total = lengths.reduce((sum, length) => sum + length, 0);
  const walked =
    lengths.slice(0, segment).reduce((sum, length) => sum + length, 0) +
    Math.hypot(at.x - start.x, at.y - start.y);
  const inner = (point: PlanPoint) => point.x !== at.x || point.y !== at.y;
  return {
    at,
    before: points.slice(1, segment + 1).filter(inner),
    after: points.slice(segment + 1, -1).filter(inner),
    share: total === 0 ? 0.5 : walked / total,
  };
}
