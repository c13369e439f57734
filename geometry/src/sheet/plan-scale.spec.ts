import { describe, expect, it } from 'vitest';
import { meters } from '../units/brand.js';
import { METERS_PER_FOOT, METERS_PER_INCH } from '../units/length.js';
import {
  type Calibration,
  type LengthReference,
  lengthAlong,
  lengthBetween,
  solveCalibration,
} from './calibration.js';
import { at, noisy, seeded } from './yard.testkit.js';

const reference = (id: string, pixels: number, length: number, sigma?: number): LengthReference => ({
  id,
  kind: 'length',
  a: at(100, 100),
  b: at(100 + pixels, 100),
  meters: meters(length),
  ...(sigma === undefined ? {} : { sigmaMeters: meters(sigma) }),
});

function solved(calibration: Omit<Calibration, 'view'>, clickSigmaPixels?: number) {
  const result = solveCalibration({ view: 'plan', ...calibration }, { clickSigmaPixels });
  if (!result.ok) throw new Error(result.message);
  return result.scale;
}

describe('a plan with two points and a length', () => {
  // (σL/L)² is the sum of the squared relative errors: 0.002² + 0.005² + 0.002², so 25.00 ± 0.14 m (computed).
  // ± 1 px is there the error of a pixel length, which is √2 times the error in each coordinate of a click.
  it('carries the errors of the stated length, of its clicks and of the new clicks', () => {
    const scale = solved({ references: [reference('r', 200, 10, 0.02)] }, Math.SQRT1_2);
    const length = lengthBetween(scale, at(0, 300), at(300, 700))!;
    expect(length.meters).toBeCloseTo(25, 10);
    expect(length.sigmaMeters).toBeCloseTo(25 * Math.sqrt(0.002 ** 2 + 0.005 ** 2 + 0.002 ** 2), 10);
    expect(length.sigmaMeters).toBeCloseTo(0.14, 2);
    expect(length.trusted).toBe(true);
  });

  it('takes one pixel in each coordinate when nothing else is said', () => {
    const scale = solved({ references: [reference('r', 200, 10)] });
    const length = lengthBetween(scale, at(0, 0), at(500, 0))!;
    expect(length.sigmaMeters / length.meters).toBeCloseTo(
      Math.hypot(Math.SQRT2 / 200, Math.SQRT2 / 500),
      10,
    );
  });

  it('maps to the ground with y away from the viewer, and back', () => {
    const scale = solved({ references: [reference('r', 200, 10)] });
    const ground = scale.groundFromSheet(at(40, 60))!;
    expect(ground.x).toBeCloseTo(2, 12);
    expect(ground.y).toBeCloseTo(-3, 12);
    const back = scale.sheetFromGround(ground)!;
    expect(back.x).toBeCloseTo(40, 10);
    expect(back.y).toBeCloseTo(60, 10);
  });

  it('trusts no length whose error passes 10 %', () => {
    const scale = solved({ references: [reference('r', 200, 10)] });
    expect(lengthBetween(scale, at(0, 0), at(10, 0))).toMatchObject({
      trusted: false,
      reason: 'error-over-10-percent',
    });
    expect(lengthBetween(scale, at(0, 0), at(20, 0))).toMatchObject({ trusted: true });
  });
});

describe('a plan with several references', () => {
  it('weighs each by its click error: a long one counts as its length squared', () => {
    // 30 px per metre on 30 m, 33 px per metre on 10 m: (30·900 + 33·100) / 1000.
    const scale = solved({ references: [reference('long', 900, 30), reference('short', 330, 10)] });
    expect(1 / lengthBetween(scale, at(0, 0), at(1, 0))!.meters).toBeCloseTo(30.3, 10);
  });

  it('says how far each is off, and that they do not fit', () => {
    const scale = solved({ references: [reference('long', 900, 30), reference('short', 330, 10)] });
    expect(scale.residuals.map((r) => r.referenceId)).toEqual(['long', 'short']);
    expect(scale.residuals[0]!.relative).toBeCloseTo(30 / 30.3 - 1, 10);
    expect(scale.residuals[1]!.gotMeters).toBeCloseTo(330 / 30.3, 10);
    expect(scale.misfit).toBeGreaterThan(3);
  });

  it('gets surer with each reference, as the square root of their number', () => {
    const one = solved({ references: [reference('a', 200, 10)] });
    const four = solved({ references: ['a', 'b', 'c', 'd'].map((id) => reference(id, 200, 10)) });
    expect(Math.sqrt(one.covariance[0]! / four.covariance[0]!)).toBeCloseTo(2, 10);
  });

  it('grows the errors when the references contradict one another beyond their clicks', () => {
    const fits = solved({ references: [reference('a', 900, 30), reference('b', 300, 10)] });
    const fights = solved({ references: [reference('a', 900, 30), reference('b', 400, 10)] });
    expect(fights.covariance[0]! / fits.covariance[0]!).toBeGreaterThan(9);
  });

  it('takes a rectangle as its four sides', () => {
    const scale = solved({
      references: [
        {
          id: 'patio',
          kind: 'rectangle',
          corners: [at(0, 0), at(300, 0), at(300, 140), at(0, 140)],
          widthMeters: meters(15),
          depthMeters: meters(7),
        },
      ],
    });
    expect(lengthBetween(scale, at(0, 0), at(100, 0))!.meters).toBeCloseTo(5, 10);
    expect(scale.residuals).toHaveLength(4);
    expect(scale.misfit).toBeCloseTo(0, 10);
  });
});

describe('a plan with a drawing scale', () => {
  const oneInchIsTenFeet = {
    kind: 'drawing-scale',
    groundMetersPerPaperMeter: 120,
    pixelsPerPaperMeter: 200 / METERS_PER_INCH,
  } as const;

  it('reads 22 ft along 2.2 in of paper at 200 dots per inch, 1 in = 10 ft', () => {
    const scale = solved({ references: [], drawingScale: oneInchIsTenFeet });
    const pool = lengthBetween(scale, at(700, 900), at(700 + 2.2 * 200, 900))!;
    expect(pool.meters / METERS_PER_FOOT).toBeCloseTo(22, 10);
    expect(pool.sigmaMeters / METERS_PER_FOOT).toBeLessThan(0.1);
  });

  it('shows a length beside it that disagrees', () => {
    const references = [reference('r', 200, 11 * METERS_PER_FOOT)];
    const scale = solved({ references, drawingScale: oneInchIsTenFeet });
    expect(scale.residuals.map((r) => r.referenceId)).toEqual(['r', 'drawing-scale']);
    expect(scale.residuals[0]!.relative).toBeLessThan(-0.08);
    expect(scale.misfit).toBeGreaterThan(3);
  });
});

describe('the error of a plan’s lengths', () => {
  const polyline = [at(50, 60), at(400, 90), at(420, 500), at(90, 480)];
  const references = [reference('a', 300, 15, 0.05), reference('b', 500, 25)];

  it('agrees with 4000 clicks at random within 5 % (seed 431)', () => {
    const random = seeded(431);
    const scale = solved({ references });
    const got: number[] = [];
    for (let i = 0; i < 4000; i++) {
      const click = noisy(random);
      const tape = 15 + (click(at(0, 0)).x as number) * 0.05;
      const noisyReferences = references.map((r) => ({ ...r, a: click(r.a), b: click(r.b) }));
      noisyReferences[0] = { ...noisyReferences[0]!, meters: meters(tape) };
      got.push(lengthAlong(solved({ references: noisyReferences }), polyline.map(click))!.meters);
    }
    const mean = got.reduce((sum, x) => sum + x, 0) / got.length;
    const spread = Math.sqrt(got.reduce((sum, x) => sum + (x - mean) ** 2, 0) / got.length);
    const { sigmaMeters } = lengthAlong(scale, polyline)!;
    expect(Math.abs(sigmaMeters / spread - 1)).toBeLessThan(0.05);
  });

  it('counts a point clicked twice once, and a line without length as nothing', () => {
    const scale = solved({ references });
    const [a, b, c, d] = polyline as [never, never, never, never];
    expect(lengthAlong(scale, [a, b, b, c, c, d])).toEqual(lengthAlong(scale, polyline));
    expect(lengthAlong(scale, [])).toEqual({ meters: 0, sigmaMeters: 0, trusted: true });
    expect(lengthAlong(scale, [a, a])).toMatchObject({ meters: 0, trusted: true });
  });
});
