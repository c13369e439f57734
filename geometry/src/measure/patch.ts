import { earthRadius, polygon as turfPolygon } from '@turf/turf';
import type { GroundPoint } from '../units/brand.js';

/**
 * turf measures in longitude and latitude on a sphere; the ground is flat metres. A yard laid on the sphere
 * at 0°, 0°, with turf's own radius, is flat to within 1e-6 for a kilometre around. Working form only: these
 * are no places on Earth, and nothing in this form is stored.
 */
const DEGREES_PER_METER = 180 / (Math.PI * earthRadius);

/** Longitude and latitude of a ground point, with `origin` at 0°, 0°. */
export function onPatch(p: GroundPoint, origin: GroundPoint): [number, number] {
  return [(p.x - origin.x) * DEGREES_PER_METER, (p.y - origin.y) * DEGREES_PER_METER];
}

/** The polygon around 0°, 0°: its middle is the origin, so that its place on the ground costs no precision. */
export function polygonOnPatch(points: readonly GroundPoint[]) {
  const origin = middleOf(points);
  const ring = points.map((p) => onPatch(p, origin));
  return turfPolygon([[...ring, ring[0]!]]);
}

function middleOf(points: readonly GroundPoint[]): GroundPoint {
  const xs = points.map((p) => p.x);
  const ys = points.map((p) => p.y);
  return {
    x: ((Math.min(...xs) + Math.max(...xs)) / 2) as GroundPoint['x'],
    y: ((Math.min(...ys) + Math.max(...ys)) / 2) as GroundPoint['y'],
  };
}
