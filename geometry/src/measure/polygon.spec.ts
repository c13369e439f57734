import { booleanPointInPolygon, kinks, point, polygon as turfPolygon } from '@turf/turf';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { METERS_PER_FOOT } from '../units/length.js';
import { anyPoint, anyStar, at, atFeet, box, points } from './measure.testkit.js';
import { onPatch, polygonOnPatch } from './patch.js';
import {
  distanceToBoundary,
  edgeLengths,
  isInPolygon,
  polygonAreaSquareMeters,
  selfCrossing,
} from './polygon.js';

describe('polygonAreaSquareMeters', () => {
  it('measures a lot of 82 × 132 ft, either way round', () => {
    const lot = [atFeet(0, 0), atFeet(82, 0), atFeet(82, 132), atFeet(0, 132)];
    const squareFeet = polygonAreaSquareMeters(lot) / METERS_PER_FOOT ** 2;
    expect(squareFeet).toBeCloseTo(82 * 132, 3);
    expect(polygonAreaSquareMeters(lot.toReversed())).toBeCloseTo(polygonAreaSquareMeters(lot), 9);
  });

  it('measures an L, and does not mind where it lies', () => {
    const ell = (x: number, y: number) =>
      points([x, y], [x + 6, y], [x + 6, y + 2], [x + 2, y + 2], [x + 2, y + 5], [x, y + 5]);
    expect(polygonAreaSquareMeters(ell(0, 0))).toBeCloseTo(18, 8);
    expect(polygonAreaSquareMeters(ell(5000, -8000))).toBeCloseTo(18, 8);
  });

  it('is nothing for fewer than three corners', () => {
    expect(polygonAreaSquareMeters([])).toBe(0);
    expect(polygonAreaSquareMeters(points([0, 0], [3, 4]))).toBe(0);
  });
});

describe('edgeLengths', () => {
  it('gives each edge, the closing one last', () => {
    expect(edgeLengths(points([0, 0], [3, 0], [3, 4]))).toEqual([3, 4, 5]);
    expect(edgeLengths(points([0, 0]))).toEqual([]);
  });
});

describe('isInPolygon', () => {
  it('agrees with turf away from the boundary (seed 491)', () => {
    fc.assert(
      fc.property(anyStar, anyPoint, (star, p) => {
        fc.pre(distanceToBoundary(p, star) > 1e-3);
        const origin = at(0, 0);
        const ring = [...star, star[0]!].map((q) => onPatch(q, origin));
        expect(isInPolygon(p, star)).toBe(
          booleanPointInPolygon(point(onPatch(p, origin)), turfPolygon([ring])),
        );
      }),
      { seed: 491, numRuns: 500 },
    );
  });

  it('holds the boundary to be outside', () => {
    const square = box(0, 0, 2, 2);
    expect(isInPolygon(at(1, 0), square)).toBe(false);
    expect(isInPolygon(at(2, 2), square)).toBe(false);
    expect(isInPolygon(at(1, 1e-5), square)).toBe(true);
  });

  it('has no inside with fewer than three corners', () => {
    expect(isInPolygon(at(0, 0), points([-1, 0], [1, 0]))).toBe(false);
  });
});

describe('selfCrossing', () => {
  it.each([
    ['a square', box(0, 0, 2, 2), null],
    ['a triangle', points([0, 0], [2, 0], [0, 2]), null],
    [
      'an L with straight corners in its edges',
      points([0, 0], [1, 0], [2, 0], [2, 1], [1, 1], [1, 2], [0, 2]),
      null,
    ],
    ['corners clicked twice', points([0, 0], [0, 0], [2, 0], [2, 2], [2, 2], [0, 2], [0, 0]), null],
    ['a bow tie', points([0, 0], [2, 2], [2, 0], [0, 2]), { edge: 0, other: 2 }],
    ['a corner on another edge', points([0, 0], [4, 0], [4, 2], [2, 0], [0, 2]), { edge: 0, other: 2 }],
    ['a spike folded back', points([0, 0], [4, 0], [2, 0], [2, 3]), { edge: 0, other: 1 }],
    ['a spike at the start', points([2, 0], [4, 0], [4, 3], [0, 3], [0, 0], [3, 0]), { edge: 0, other: 4 }],
    [
      'edges that run over each other',
      points([0, 0], [4, 0], [4, 2], [3, 0], [1, 0], [0, 2]),
      { edge: 0, other: 2 },
    ],
    ['two corners', points([0, 0], [2, 0]), { edge: 0, other: 1 }],
    ['one corner', points([0, 0]), null],
  ])('judges %s', (_, polygon, expected) => {
    expect(selfCrossing(polygon)).toEqual(expected);
  });

  it('agrees with turf on random polygons and stars (seed 492)', () => {
    const anyPolygon = fc.array(anyPoint, { minLength: 4, maxLength: 8 });
    fc.assert(
      fc.property(fc.oneof(anyPolygon, anyStar), (polygon) => {
        // Where edges come within a millimetre the two may round differently.
        fc.pre(edgeLengths(polygon).every((length) => length > 1e-3));
        const crossed = kinks(polygonOnPatch(polygon)).features.length > 0;
        expect(selfCrossing(polygon) !== null).toBe(crossed);
      }),
      { seed: 492, numRuns: 400 },
    );
  });
});
