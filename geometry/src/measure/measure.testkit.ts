import fc from 'fast-check';
import { type GroundPoint, meters } from '../units/brand.js';
import { METERS_PER_FOOT } from '../units/length.js';

export const at = (x: number, y: number): GroundPoint => ({ x: meters(x), y: meters(y) });
export const atFeet = (x: number, y: number): GroundPoint => at(x * METERS_PER_FOOT, y * METERS_PER_FOOT);
export const points = (...list: [number, number][]): GroundPoint[] => list.map(([x, y]) => at(x, y));

/** A rectangle with its near left corner at (x, y). */
export const box = (x: number, y: number, width: number, depth: number): GroundPoint[] =>
  points([x, y], [x + width, y], [x + width, y + depth], [x, y + depth]);

/** Ground within half a kilometre of the origin. */
export const anyPoint = fc
  .tuple(fc.double({ min: -500, max: 500, noNaN: true }), fc.double({ min: -500, max: 500, noNaN: true }))
  .map(([x, y]) => at(x, y));

/** Polygons that are stars about a point: never crossing themselves, mostly not convex. */
export const anyStar = fc
  .record({
    middle: anyPoint,
    spokes: fc.array(fc.double({ min: 1, max: 500, noNaN: true }), { minLength: 3, maxLength: 14 }),
  })
  .map(({ middle, spokes }) =>
    spokes.map((r, i) => {
      const angle = (2 * Math.PI * i) / spokes.length;
      return at(middle.x + r * Math.cos(angle), middle.y + r * Math.sin(angle));
    }),
  );
