import { area, distance, earthRadius, point } from '@turf/turf';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyPoint, anyStar, at } from './measure.testkit.js';
import { onPatch, polygonOnPatch } from './patch.js';

const origin = at(0, 0);

function shoelace(corners: readonly { x: number; y: number }[]): number {
  const from = corners[0]!;
  return Math.abs(
    corners.reduce((sum, p, i) => {
      const q = corners[(i + 1) % corners.length]!;
      return sum + ((p.x - from.x) * (q.y - from.y) - (q.x - from.x) * (p.y - from.y)) / 2;
    }, 0),
  );
}

describe('the patch on turf’s sphere', () => {
  it('keeps distances to within 1e-6 inside a kilometre (seed 481)', () => {
    fc.assert(
      fc.property(anyPoint, anyPoint, (a, b) => {
        const flat = Math.hypot(a.x - b.x, a.y - b.y);
        fc.pre(flat > 0.01);
        const onSphere = distance(point(onPatch(a, origin)), point(onPatch(b, origin)), { units: 'meters' });
        expect(Math.abs(onSphere / flat - 1)).toBeLessThan(1e-6);
      }),
      { seed: 481, numRuns: 500 },
    );
  });

  it('keeps areas to within 1e-6 inside a kilometre (seed 482)', () => {
    fc.assert(
      fc.property(anyStar, (star) => {
        expect(Math.abs(area(polygonOnPatch(star)) / shoelace(star) - 1)).toBeLessThan(1e-6);
      }),
      { seed: 482, numRuns: 500 },
    );
  });

  it('goes by turf’s own radius: a degree is a 360th of its equator', () => {
    expect(onPatch(at((2 * Math.PI * earthRadius) / 360, 0), origin)).toEqual([1, 0]);
  });
});
