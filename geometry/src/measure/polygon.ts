import { area } from '@turf/turf';
import { type GroundPoint, type Meters, meters, type SquareMeters, squareMeters } from '../units/brand.js';
import { polygonOnPatch } from './patch.js';
import { distanceToSegment, type PlanarPoint, segmentsMeet } from './planar.js';

/**
 * A polygon on the ground or on a sheet: its corners in order, either way round, the first not repeated
 * at the end. Inside is what a line from outside enters an odd number of times.
 */
export type Polygon<P extends PlanarPoint = GroundPoint> = readonly P[];

/** Below this, in metres, a point is on a boundary: rounding of coordinates a kilometre away is smaller. */
export const BOUNDARY_METERS = 1e-6;

/** Area in square metres; 0 for fewer than three corners. For polygons that don't cross themselves. */
export function polygonAreaSquareMeters(points: Polygon): SquareMeters {
  if (points.length < 3) return squareMeters(0);
  return squareMeters(area(polygonOnPatch(points)));
}

/** Lengths of the edges in metres: edge i runs from corner i to the next, the last one back to the first. */
export function edgeLengths(points: Polygon): Meters[] {
  if (points.length < 2) return [];
  return points.map((p, i) => {
    const q = points[(i + 1) % points.length]!;
    return meters(Math.hypot(q.x - p.x, q.y - p.y));
  });
}

/**
 * True inside, false outside and on the boundary. Planar rather than turf's, here and below: the ground is
 * flat already, and these run for each cable on each frame of a drag.
 */
export function isInPolygon(p: GroundPoint, points: Polygon): boolean {
  if (points.length < 3 || distanceToBoundary(p, points) <= BOUNDARY_METERS) return false;
  let inside = false;
  for (let i = 0, j = points.length - 1; i < points.length; j = i++) {
    const a = points[i]!;
    const b = points[j]!;
    if (a.y > p.y !== b.y > p.y && p.x < a.x + ((p.y - a.y) / (b.y - a.y)) * (b.x - a.x)) inside = !inside;
  }
  return inside;
}

/** Metres from a point to the polygon's edge line, from either side of it. */
export function distanceToBoundary(p: GroundPoint, points: Polygon): number {
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0, j = points.length - 1; i < points.length; j = i++) {
    least = Math.min(least, distanceToSegment(p, points[j]!, points[i]!));
  }
  return least;
}

/**
 * The first two edges of a polygon that cross, touch or run over each other, by number (edge i starts at
 * corner i); null for a simple polygon. Corners clicked twice in a row are no fault.
 */
export function selfCrossing(points: Polygon<PlanarPoint>): { edge: number; other: number } | null {
  const count = points.length;
  const corners = [...points.keys()].filter((i) => {
    const next = points[(i + 1) % count]!;
    return points[i]!.x !== next.x || points[i]!.y !== next.y;
  });
  const n = corners.length;
  const corner = (i: number) => points[corners[i % n]!]!;
  for (let i = 0; i < n; i++) {
    for (let j = i + 1; j < n; j++) {
      const follows = j === i + 1;
      const closes = (j + 1) % n === i;
      const meets =
        follows || closes
          ? follows
            ? foldsBack(corner(i), corner(j), corner(j + 1))
            : foldsBack(corner(j), corner(i), corner(i + 1))
          : segmentsMeet(corner(i), corner(i + 1), corner(j), corner(j + 1));
      if (meets) return { edge: corners[i]!, other: corners[j]! };
    }
  }
  return null;
}

/** True when the path a–b–c turns straight back at b, so that the two edges lie over each other. */
function foldsBack(a: PlanarPoint, b: PlanarPoint, c: PlanarPoint): boolean {
  const cross = (b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x);
  const dot = (b.x - a.x) * (c.x - b.x) + (b.y - a.y) * (c.y - b.y);
  return cross === 0 && dot < 0;
}
