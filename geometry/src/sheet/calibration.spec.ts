import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { meters } from '../units/brand.js';
import {
  type Calibration,
  type CalibrationFaultCode,
  lengthBetween,
  solveCalibration,
} from './calibration.js';
import type { RectangleReference, ScaleReference } from './references.js';
import { at, yardPixel, yardRectangle } from './yard.testkit.js';

const patio = yardRectangle('patio');
const [c0, c1, c2, c3] = patio.corners;
const rectangle = (...corners: [number, number][]): RectangleReference => ({
  ...patio,
  corners: corners.map(([x, y]) => at(x, y)) as unknown as RectangleReference['corners'],
});
const length = (a = at(0, 0), b = at(100, 0), m = 5): ScaleReference => ({
  id: 'l',
  kind: 'length',
  a,
  b,
  meters: meters(m),
});
const photo = (...references: ScaleReference[]): Calibration => ({ view: 'photo', references });
const plan = (...references: ScaleReference[]): Calibration => ({ view: 'plan', references });
const drawing = (ground: number, pixels: number) =>
  ({ kind: 'drawing-scale', groundMetersPerPaperMeter: ground, pixelsPerPaperMeter: pixels }) as const;

describe('a calibration that can’t be solved', () => {
  it.each<[string, Calibration, CalibrationFaultCode]>([
    ['a plan with nothing', plan(), 'no-reference'],
    ['a photo with nothing', photo(), 'needs-rectangle'],
    ['a photo with lengths only', photo(length()), 'needs-rectangle'],
    [
      'a drawing scale on a photo',
      { ...photo(patio), drawingScale: drawing(120, 7874) },
      'drawing-scale-on-photo',
    ],
    ['a drawing scale of nothing', { ...plan(), drawingScale: drawing(0, 7874) }, 'bad-number'],
    [
      'an endless drawing scale',
      { ...plan(), drawingScale: drawing(120, Number.POSITIVE_INFINITY) },
      'bad-number',
    ],
    ['a length from nowhere', plan(length(at(Number.NaN, 0))), 'bad-number'],
    ['a length of nothing', plan(length(at(0, 0), at(9, 9), 0)), 'bad-length'],
    ['a negative length', plan(length(at(0, 0), at(9, 9), -3)), 'bad-length'],
    ['a length of 20 km', plan(length(at(0, 0), at(9, 9), 20_000)), 'bad-length'],
    [
      'a length as uncertain as long',
      plan({ ...length(), sigmaMeters: meters(5) } as ScaleReference),
      'bad-length',
    ],
    ['two points at one place', plan(length(at(5, 5), at(6, 5))), 'points-coincide'],
    ['a corner from nowhere', photo(rectangle([0, 0], [9, 0], [9, 9], [0, Number.NaN])), 'bad-number'],
    ['a side of nothing', photo({ ...patio, depthMeters: meters(0) }), 'bad-length'],
    ['three corners on a line', photo(rectangle([0, 0], [50, 0.5], [100, 0], [0, 80])), 'corners-collinear'],
    ['all corners on a line', photo(rectangle([0, 0], [50, 0], [100, 0], [150, 0])), 'corners-collinear'],
    ['two corners at one place', photo(rectangle([0, 0], [0, 0], [100, 0], [0, 80])), 'corners-collinear'],
    ['crossed corners', photo({ ...patio, corners: [c0, c1, c3, c2] }), 'corners-crossed'],
    ['corners crossed the other way', photo({ ...patio, corners: [c0, c2, c1, c3] }), 'corners-crossed'],
    ['a corner folded in', photo(rectangle([0, 0], [100, 0], [30, 30], [0, 100])), 'corners-folded'],
    ['a length that ends in the sky', photo(patio, length(at(1200, 1400), at(1200, 50))), 'over-horizon'],
    ['crossed corners on a plan', plan({ ...patio, corners: [c0, c1, c3, c2] }), 'corners-crossed'],
  ])('says why: %s', (_, calibration, code) => {
    const result = solveCalibration(calibration);
    expect(result).toMatchObject({ ok: false, code });
    if (!result.ok) expect(result.message).toMatch(/^[A-Z].{20,}\.$/);
  });

  it('names the reference at fault', () => {
    const bad = { ...length(at(5, 5), at(5, 5)), id: 'the bad one' };
    expect(solveCalibration(plan(length(), bad))).toMatchObject({ referenceId: 'the bad one' });
  });

  it('is a mistake of the caller when the click error is no number of pixels', () => {
    expect(() => solveCalibration(photo(patio), { clickSigmaPixels: 0 })).toThrow(RangeError);
    expect(() => solveCalibration(photo(patio), { clickSigmaPixels: Number.NaN })).toThrow(RangeError);
  });
});

describe('any calibration', () => {
  const coordinate = fc.integer({ min: -50, max: 2450 });
  const point = fc.tuple(coordinate, coordinate).map(([x, y]) => at(x, y));
  const size = fc.double({ min: 0.2, max: 40, noNaN: true }).map(meters);
  const anyRectangle = fc
    .record({ corners: fc.tuple(point, point, point, point), widthMeters: size, depthMeters: size })
    .map((r) => ({ ...r, id: 'r', kind: 'rectangle' as const }));
  const anyLength = fc.record({ a: point, b: point, meters: size }).map((r) => ({
    ...r,
    id: 'l',
    kind: 'length' as const,
  }));

  it('is either solved with finite lengths and errors, or refused in words: never a throw or NaN (seed 461)', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('plan' as const, 'photo' as const),
        fc.array(fc.oneof(anyRectangle, anyLength, fc.constant(patio)), { maxLength: 4 }),
        (view, references) => {
          const result = solveCalibration({ view, references });
          if (!result.ok) return result.message.length > 20;
          const measured = lengthBetween(
            result.scale,
            yardPixel('patio near left'),
            yardPixel('supply box foot'),
          );
          return (
            measured === null || (Number.isFinite(measured.meters) && Number.isFinite(measured.sigmaMeters))
          );
        },
      ),
      { seed: 461, numRuns: 600 },
    );
  });
});
