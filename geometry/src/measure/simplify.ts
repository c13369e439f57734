import { distanceToSegment, type PlanarPoint } from './planar.js';

/**
 * Thins a freehand line (Douglas and Peucker, 1973): keeps both ends, and no dropped point is further than
 * `tolerance` from the line that stays. The tolerance has the unit of the points: sheet pixels for strokes,
 * which is why turf's, made for degrees, is not used.
 */
export function simplifyLine<P extends PlanarPoint>(points: readonly P[], tolerance: number): P[] {
  if (points.length < 3) return [...points];
  const keep = new Uint8Array(points.length);
  keep[0] = 1;
  keep[points.length - 1] = 1;
  // A stack of its own: a long stroke would nest calls thousands deep.
  const open: [number, number][] = [[0, points.length - 1]];
  for (let span = open.pop(); span; span = open.pop()) {
    const [from, to] = span;
    const { index, distance } = furthest(points, from, to, (p) =>
      distanceToSegment(p, points[from]!, points[to]!),
    );
    if (distance > tolerance) {
      keep[index] = 1;
      open.push([from, index], [index, to]);
    }
  }
  return points.filter((_, i) => keep[i] === 1);
}

/**
 * Thins a freehand outline to a polygon's corners (first not repeated at the end). It is split at its first
 * point and the one furthest from it, which both stay.
 */
export function simplifyOutline<P extends PlanarPoint>(points: readonly P[], tolerance: number): P[] {
  const first = points[0];
  if (first === undefined || points.length < 4) return [...points];
  const far = furthest(points, 0, points.length, (p) => Math.hypot(p.x - first.x, p.y - first.y));
  if (far.distance <= tolerance) return [first];
  const out = simplifyLine(points.slice(0, far.index + 1), tolerance);
  const back = simplifyLine([...points.slice(far.index), first], tolerance);
  const corners = [...out, ...back.slice(1, -1)];
  // A stroke seldom ends just where it began: what lies that near the start is the start.
  while (corners.length > 3) {
    const last = corners.at(-1)!;
    if (Math.hypot(last.x - first.x, last.y - first.y) > tolerance) break;
    corners.pop();
  }
  return corners;
}

/** The point strictly between two indices for which `measure` is largest. */
function furthest<P>(
  points: readonly P[],
  from: number,
  to: number,
  measure: (p: P) => number,
): { index: number; distance: number } {
  let index = from;
  let distance = -1;
  for (let i = from + 1; i < to; i++) {
    const d = measure(points[i]!);
    if (d > distance) {
      distance = d;
      index = i;
    }
  }
  return { index, distance };
}
