import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { GroundPoint } from '../units/brand.js';
import { distanceToPolygon, lineDistanceToPolygon, polygonCrossing } from './crossing.js';
import { anyPoint, anyStar, at, box, points } from './measure.testkit.js';
import { isInPolygon } from './polygon.js';

const patio = box(0, 0, 4, 2);

describe('polygonCrossing', () => {
  it.each<[string, GroundPoint[], [number, number][]]>([
    ['across', points([-1, 1], [6, 1]), [[1, 5]]],
    ['from inside to outside', points([1, 1], [1, 5]), [[0, 1]]],
    ['all inside', points([1, 1], [3, 1]), [[0, 2]]],
    ['all outside', points([-1, 3], [6, 3]), []],
    ['round a corner inside: one stretch', points([1, -1], [1, 1], [5, 1]), [[1, 5]]],
    ['along an edge', points([-1, 0], [6, 0]), []],
    ['along an edge, then in', points([-1, 0], [2, 0], [2, 1]), [[3, 4]]],
    ['touching a corner', points([-1, 1], [1, -1]), []],
    ['through two corners', points([-2, -1], [6, 3]), [[Math.hypot(2, 1), Math.hypot(6, 3)]]],
    [
      'in, out and in again',
      points([1, -1], [1, 1], [1, 3], [2, 3], [2, 1]),
      [
        [1, 3],
        [6, 7],
      ],
    ],
    ['a point', points([1, 1]), []],
    ['a point clicked twice', points([1, 1], [1, 1]), []],
    ['nothing', [], []],
  ])('%s', (_, line, spans) => {
    const crossing = polygonCrossing(line, patio);
    expect(crossing.spans).toHaveLength(spans.length);
    crossing.spans.forEach((span, i) => {
      expect(span.fromMeters).toBeCloseTo(spans[i]![0], 9);
      expect(span.toMeters).toBeCloseTo(spans[i]![1], 9);
    });
    expect(crossing.insideMeters).toBeCloseTo(
      spans.reduce((sum, [from, to]) => sum + to - from, 0),
      9,
    );
  });

  it('finds both arms of a U', () => {
    const u = points([0, 0], [5, 0], [5, 4], [4, 4], [4, 1], [1, 1], [1, 4], [0, 4]);
    expect(polygonCrossing(points([-1, 2], [6, 2]), u).insideMeters).toBeCloseTo(2, 12);
    // Along the inner edge of the U's foot, which is boundary, and through both arms.
    expect(polygonCrossing(points([-1, 1], [6, 1]), u).insideMeters).toBeCloseTo(2, 12);
  });

  const anyLine = fc.array(anyPoint, { minLength: 2, maxLength: 5 });

  it('agrees with 2000 samples along the line, to their spacing (seed 501)', () => {
    fc.assert(
      fc.property(anyStar, anyPoint, anyPoint, (star, a, b) => {
        const length = Math.hypot(b.x - a.x, b.y - a.y);
        let hits = 0;
        for (let i = 0; i < 2000; i++) {
          const t = (i + 0.5) / 2000;
          if (isInPolygon(at(a.x + t * (b.x - a.x), a.y + t * (b.y - a.y)), star)) hits++;
        }
        const { insideMeters, spans } = polygonCrossing([a, b], star);
        expect(Math.abs(insideMeters - (hits / 2000) * length)).toBeLessThanOrEqual(
          ((spans.length + 1) * length) / 2000 + 1e-4,
        );
      }),
      { seed: 501, numRuns: 100 },
    );
  });

  it('gives the same stretch back to front, and no more with a corner put in (seed 502)', () => {
    fc.assert(
      fc.property(anyStar, anyLine, fc.double({ min: 0, max: 1, noNaN: true }), (star, line, t) => {
        const { insideMeters } = polygonCrossing(line, star);
        expect(polygonCrossing(line.toReversed(), star).insideMeters).toBeCloseTo(insideMeters, 4);
        const [a, b, ...rest] = line as [GroundPoint, GroundPoint, ...GroundPoint[]];
        const between = at(a.x + t * (b.x - a.x), a.y + t * (b.y - a.y));
        expect(polygonCrossing([a, between, b, ...rest], star).insideMeters).toBeCloseTo(insideMeters, 4);
      }),
      { seed: 502, numRuns: 300 },
    );
  });
});

describe('distance to a polygon', () => {
  it('is 0 inside and on the boundary, else that of the nearest edge or corner', () => {
    expect(distanceToPolygon(at(1, 1), patio)).toBe(0);
    expect(distanceToPolygon(at(4, 1), patio)).toBe(0);
    expect(distanceToPolygon(at(2, 5), patio)).toBe(3);
    expect(distanceToPolygon(at(7, 6), patio)).toBe(5);
    expect(distanceToPolygon(at(7, 6), [])).toBe(Number.POSITIVE_INFINITY);
  });

  it('of a line is 0 when it crosses, lies inside or touches, else that of its nearest part', () => {
    expect(lineDistanceToPolygon(points([-1, 1], [9, 1]), patio)).toBe(0);
    expect(lineDistanceToPolygon(points([1, 1], [2, 1]), patio)).toBe(0);
    expect(lineDistanceToPolygon(points([-1, 3], [2, 2], [5, 3]), patio)).toBe(0);
    expect(lineDistanceToPolygon(points([-9, 5], [9, 5]), patio)).toBe(3);
    expect(lineDistanceToPolygon(points([7, 6]), patio)).toBe(5);
    expect(lineDistanceToPolygon(points([5, 9], [5, -9]), patio)).toBe(1);
    expect(lineDistanceToPolygon([], patio)).toBe(Number.POSITIVE_INFINITY);
  });

  it('of a line is the least over its points (seed 503)', () => {
    fc.assert(
      fc.property(anyStar, anyPoint, anyPoint, (star, a, b) => {
        const least = lineDistanceToPolygon([a, b], star);
        let sampled = Number.POSITIVE_INFINITY;
        for (let i = 0; i <= 400; i++) {
          const p = at(a.x + (i / 400) * (b.x - a.x), a.y + (i / 400) * (b.y - a.y));
          sampled = Math.min(sampled, distanceToPolygon(p, star));
        }
        const spacing = Math.hypot(b.x - a.x, b.y - a.y) / 400;
        expect(least).toBeLessThanOrEqual(sampled + 1e-9);
        expect(sampled - least).toBeLessThanOrEqual(spacing);
      }),
      { seed: 503, numRuns: 150 },
    );
  });
});
