import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { applyHomography, homographyFromPoints, inverse, type Matrix3, multiply } from './homography.js';

const pair = (fx: number, fy: number, tx: number, ty: number) => ({
  from: { x: fx, y: fy },
  to: { x: tx, y: ty },
});

describe('homographyFromPoints', () => {
  it('agrees with a public perspective-transform test', () => {
    const h = homographyFromPoints([
      pair(158, 64, 100, 500),
      pair(494, 69, 152, 564),
      pair(495, 404, 148, 604),
      pair(158, 404, 100, 560),
    ]);
    const image = applyHomography(h!, { x: 250, y: 120 });
    expect(image!.x).toBeCloseTo(117.27521, 5);
    expect(image!.y).toBeCloseTo(530.92024, 5);
  });

  const true3: Matrix3 = [1.2, 0.3, 40, -0.1, 0.9, 70, 1e-4, -3e-4, 1];

  it('finds a known homography from many points, and its inverse undoes it (seed 421)', () => {
    const places = fc.array(fc.tuple(fc.integer({ min: 0, max: 999 }), fc.integer({ min: 0, max: 999 })), {
      minLength: 2,
      maxLength: 12,
    });
    fc.assert(
      fc.property(places, (extra) => {
        const points = [[0, 0], [1000, 0], [1000, 1000], [0, 1000], ...extra];
        const pairs = points.map(([x, y]) => {
          const to = applyHomography(true3, { x: x!, y: y! })!;
          return pair(x!, y!, to.x, to.y);
        });
        const h = homographyFromPoints(pairs)!;
        for (const { from, to } of pairs) {
          const image = applyHomography(h, from)!;
          expect(Math.hypot(image.x - to.x, image.y - to.y)).toBeLessThan(1e-8);
          const back = applyHomography(inverse(h), image)!;
          expect(Math.hypot(back.x - from.x, back.y - from.y)).toBeLessThan(1e-7);
        }
      }),
      { seed: 421, numRuns: 100 },
    );
  });

  it('keeps its digits far from the origin, where unnormalised equations lose them', () => {
    const far = 1e6;
    const h = homographyFromPoints([
      pair(far, far, 0, 0),
      pair(far + 1, far, 1, 0),
      pair(far + 1, far + 1, 1.1, 1.2),
      pair(far, far + 1, 0, 1),
    ])!;
    const image = applyHomography(h, { x: far + 1, y: far + 1 })!;
    expect(image.x).toBeCloseTo(1.1, 7);
    expect(image.y).toBeCloseTo(1.2, 7);
  });

  it('spreads an error over all points when there are more than four', () => {
    const square = [
      pair(0, 0, 0, 0),
      pair(2, 0, 2, 0),
      pair(2, 2, 2, 2),
      pair(0, 2, 0, 2),
      pair(1, 1, 1.2, 1),
    ];
    const image = applyHomography(homographyFromPoints(square)!, { x: 1, y: 1 })!;
    expect(image.x).toBeGreaterThan(1.02);
    expect(image.x).toBeLessThan(1.18);
  });

  it.each([
    ['three points', [pair(0, 0, 0, 0), pair(1, 0, 1, 0), pair(1, 1, 1, 1)]],
    ['three points on a line', [pair(0, 0, 0, 0), pair(1, 0, 1, 0), pair(2, 0, 3, 3), pair(0, 1, 0, 1)]],
    ['four points on a line', [0, 1, 2, 3].map((n) => pair(n, n, n, n))],
    ['two points at one place', [pair(0, 0, 0, 0), pair(0, 0, 1, 0), pair(1, 1, 1, 1), pair(0, 1, 0, 1)]],
    ['one place for all', [0, 1, 2, 3].map((n) => pair(5, 5, n, n * n))],
  ])('finds none for %s', (_, pairs) => {
    expect(homographyFromPoints(pairs)).toBeNull();
  });

  it('has no image for a point beyond infinity', () => {
    expect(applyHomography([1, 0, 0, 0, 1, 0, 0, -1, 1], { x: 0, y: 1 })).toBeNull();
    expect(applyHomography([1, 0, 0, 0, 1, 0, 0, -1, 1], { x: 0, y: 2 })).toBeNull();
  });

  it('multiplies and inverts', () => {
    const unit = multiply(true3, inverse(true3));
    [1, 0, 0, 0, 1, 0, 0, 0, 1].forEach((n, i) => {
      expect(unit[i]).toBeCloseTo(n, 10);
    });
  });
});
