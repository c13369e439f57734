import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyPoint, points } from './measure.testkit.js';
import { distanceToSegment } from './planar.js';
import { simplifyLine, simplifyOutline } from './simplify.js';

describe('simplifyLine', () => {
  it('keeps the ends and the corners of a stroke', () => {
    const stroke = points([0, 0], [1, 0.1], [2, -0.1], [3, 0], [3.1, 1], [3, 2], [3, 3]);
    expect(simplifyLine(stroke, 0.2)).toEqual(points([0, 0], [3, 0], [3, 3]));
  });

  it('drops no point further off than the tolerance (seed 511)', () => {
    const anyStroke = fc.array(anyPoint, { minLength: 2, maxLength: 60 });
    fc.assert(
      fc.property(anyStroke, fc.double({ min: 0, max: 300, noNaN: true }), (stroke, tolerance) => {
        const kept = simplifyLine(stroke, tolerance);
        expect(kept[0]).toBe(stroke[0]);
        expect(kept.at(-1)).toBe(stroke.at(-1));
        for (const p of stroke) {
          const off = Math.min(...kept.slice(1).map((q, i) => distanceToSegment(p, kept[i]!, q)));
          expect(off).toBeLessThanOrEqual(tolerance + 1e-9);
        }
      }),
      { seed: 511, numRuns: 200 },
    );
  });

  it('copes with a stroke of 10,000 points that bends at each', () => {
    const spiral = Array.from({ length: 10_000 }, (_, i) => ({
      x: i * Math.cos(i / 50),
      y: i * Math.sin(i / 50),
    }));
    expect(simplifyLine(spiral, 0.001).length).toBeGreaterThan(8_000);
  });

  it('leaves one or two points alone', () => {
    expect(simplifyLine([], 1)).toEqual([]);
    expect(simplifyLine(points([1, 1], [1, 1]), 1)).toEqual(points([1, 1], [1, 1]));
  });
});

describe('simplifyOutline', () => {
  it('finds the corners of a square drawn by hand, its end near its start', () => {
    const side = (n: number) => Array.from({ length: 20 }, (_, i) => i / 2 + (n % 2 ? 0.02 : -0.02));
    const stroke = points(
      ...side(0).map((t): [number, number] => [t, 0.05 * Math.sin(3 * t)]),
      ...side(1).map((t): [number, number] => [10, t]),
      ...side(2).map((t): [number, number] => [10 - t, 10]),
      ...side(3).map((t): [number, number] => [0, 10 - t]),
      [0.05, 0.1],
    );
    const corners = simplifyOutline(stroke, 0.6);
    expect(corners).toHaveLength(4);
    [
      [0, 0],
      [10, 0],
      [10, 10],
      [0, 10],
    ].forEach(([x, y], i) => {
      expect(Math.hypot(corners[i]!.x - x!, corners[i]!.y - y!)).toBeLessThan(0.6);
    });
  });

  it('makes one point of a scribble smaller than the tolerance', () => {
    expect(simplifyOutline(points([0, 0], [0.1, 0], [0.1, 0.1], [0, 0.1]), 1)).toHaveLength(1);
  });

  it('keeps a triangle, and whatever has fewer points', () => {
    expect(simplifyOutline(points([0, 0], [5, 0], [0, 5]), 1)).toHaveLength(3);
    expect(simplifyOutline([], 1)).toEqual([]);
  });
});
