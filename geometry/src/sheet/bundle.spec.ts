import { describe, expect, it } from 'vitest';
import { meters } from '../units/brand.js';
import { bundleProblem, parameterOffsets } from './bundle.js';
import type { ScaleReference } from './references.js';
import { rigidShape } from './rigid-shape.js';
import { seeded, yardPixel, yardRectangle } from './yard.testkit.js';

describe('bundleProblem', () => {
  it('has the gradient that its cost has, for rectangles, lengths and uncertain lengths (seed 471)', () => {
    const uncertain: ScaleReference = {
      id: 'u',
      kind: 'length',
      a: yardPixel('bed near right'),
      b: yardPixel('right tree foot'),
      meters: meters(14),
      sigmaMeters: meters(0.2),
    };
    const references: ScaleReference[] = [
      yardRectangle('pond'),
      yardRectangle('patio'),
      uncertain,
      { ...uncertain, sigmaMeters: undefined },
    ];
    const shapes = references.map((r) =>
      rigidShape(r, 3, (p) => ({ x: (p.x - 1300) / 500, y: (p.y - 900) / 500 })),
    );
    const { count } = parameterOffsets(shapes);
    expect(count).toBe(8 + 3 + 4 + 3);
    const random = seeded(471);
    // Near the unit homography, so that every shape stays before the camera.
    const x = Float64Array.from({ length: count }, (_, i) =>
      [0, 4].includes(i) ? 1 : 0.05 * (random() - 0.5),
    );
    const linearise = bundleProblem(shapes, 0.002);
    const { gradient } = linearise(x)!;
    const step = 1e-6;
    for (let i = 0; i < count; i++) {
      const costAt = (d: number) => linearise(x.map((v, k) => (k === i ? v + d : v)))!.cost;
      const slope = (costAt(step) - costAt(-step)) / (2 * step);
      expect(2 * gradient.get(i, 0)).toBeCloseTo(slope, 5);
    }
  });

  it('has no value where a point would be behind the camera', () => {
    const shape = rigidShape(yardRectangle('pond'), 3, (p) => ({ x: p.x / 500, y: p.y / 500 }));
    expect(bundleProblem([shape], 0.002)(Float64Array.of(1, 0, 0, 0, 1, 0, 0, 5))).toBeNull();
  });
});
