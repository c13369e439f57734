import { type GroundPoint, type Meters, meters } from '../units/brand.js';
import { distanceBetweenSegments } from './planar.js';
import { BOUNDARY_METERS, distanceToBoundary, isInPolygon, type Polygon } from './polygon.js';

/** A stretch of a line, in metres along it from its start. */
export interface Span {
  readonly fromMeters: Meters;
  readonly toMeters: Meters;
}

/** How a line and a polygon go together: the stretches that lie inside, in order, and their sum. */
export interface PolygonCrossing {
  readonly insideMeters: Meters;
  readonly spans: readonly Span[];
}

/**
 * The stretches of a polyline inside a polygon (cable under paving, through a building, through water).
 * Running along the boundary, or touching it from outside, is outside.
 */
export function polygonCrossing(line: readonly GroundPoint[], polygon: Polygon): PolygonCrossing {
  const spans: { fromMeters: number; toMeters: number }[] = [];
  let start = 0;
  for (let i = 1; i < line.length; i++) {
    const a = line[i - 1]!;
    const b = line[i]!;
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    if (length === 0) continue;
    for (const [from, to] of insideParts(a, b, polygon)) {
      const last = spans.at(-1);
      const fromMeters = start + from * length;
      const toMeters = start + to * length;
      // A corner of the line, or an edge's end on it, may split one stretch in two.
      if (last && fromMeters - last.toMeters <= BOUNDARY_METERS) last.toMeters = toMeters;
      else spans.push({ fromMeters, toMeters });
    }
    start += length;
  }
  const inside = spans.reduce((sum, s) => sum + s.toMeters - s.fromMeters, 0);
  return {
    insideMeters: meters(inside),
    spans: spans.map((s) => ({ fromMeters: meters(s.fromMeters), toMeters: meters(s.toMeters) })),
  };
}

/** The parts of the segment a–b (not a point) inside the polygon, as shares of the segment, in order. */
function insideParts(a: GroundPoint, b: GroundPoint, polygon: Polygon): [number, number][] {
  const cuts = [0, ...cutsAt(a, b, polygon), 1].sort((p, q) => p - q);
  const parts: [number, number][] = [];
  for (let i = 1; i < cuts.length; i++) {
    const from = cuts[i - 1]!;
    const to = cuts[i]!;
    if (to > from && isInPolygon(pointAt(a, b, (from + to) / 2), polygon)) parts.push([from, to]);
  }
  return parts;
}

/** A line through a corner must cut one of its two edges, whatever rounding says; a cut too many is harmless. */
const SLACK = 1e-9;

/** Where along a–b the polygon's edges cross it or touch it, as shares of the segment. */
function cutsAt(a: GroundPoint, b: GroundPoint, polygon: Polygon): number[] {
  const dx = b.x - a.x;
  const dy = b.y - a.y;
  const square = dx * dx + dy * dy;
  const cuts: number[] = [];
  for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
    const c = polygon[j]!;
    const d = polygon[i]!;
    const ex = d.x - c.x;
    const ey = d.y - c.y;
    const cross = dx * ey - dy * ex;
    if (cross === 0) {
      // Parallel: where the edge lies over the segment, its ends are where that begins and stops.
      cuts.push(((c.x - a.x) * dx + (c.y - a.y) * dy) / square);
      cuts.push(((d.x - a.x) * dx + (d.y - a.y) * dy) / square);
    } else {
      const onEdge = ((c.x - a.x) * dy - (c.y - a.y) * dx) / cross;
      if (onEdge >= -SLACK && onEdge <= 1 + SLACK) cuts.push(((c.x - a.x) * ey - (c.y - a.y) * ex) / cross);
    }
  }
  return cuts.filter((t) => t > 0 && t < 1);
}

function pointAt(a: GroundPoint, b: GroundPoint, t: number): GroundPoint {
  return { x: meters(a.x + t * (b.x - a.x)), y: meters(a.y + t * (b.y - a.y)) };
}

/** Metres from a point to a polygon: 0 inside and on its boundary. Infinite for a polygon without corners. */
export function distanceToPolygon(p: GroundPoint, polygon: Polygon): Meters {
  return meters(isInPolygon(p, polygon) ? 0 : distanceToBoundary(p, polygon));
}

/** Least distance in metres from a polyline to a polygon: 0 when any of it is inside or touches. */
export function lineDistanceToPolygon(line: readonly GroundPoint[], polygon: Polygon): Meters {
  const first = line[0];
  if (first === undefined) return meters(Number.POSITIVE_INFINITY);
  let least: number = distanceToPolygon(first, polygon);
  for (let k = 1; k < line.length && least > 0; k++) {
    for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
      least = Math.min(least, distanceBetweenSegments(line[k - 1]!, line[k]!, polygon[j]!, polygon[i]!));
    }
  }
  return meters(least);
}
