import { describe, expect, it } from 'vitest';
import { meters, type SheetPoint } from '../units/brand.js';
import { lengthAlong, lengthBetween, type RectangleReference, type ScaleReference } from './calibration.js';
import {
  at,
  exactly,
  noisy,
  seeded,
  solvedPhoto,
  threeRectangles,
  type YardName,
  type YardRectangle,
  yardDistance,
  yardNames,
  yardPixel,
  yardRectangle,
  yardRectangleNames,
} from './yard.testkit.js';

const allPairs = yardNames.flatMap((a, i) => yardNames.slice(i + 1).map((b) => [a, b] as const));

/** The largest relative error over the given pairs of the yard's known points. */
function worstError(
  references: readonly ScaleReference[],
  pairs: readonly (readonly [YardName, YardName])[],
) {
  const scale = solvedPhoto(references);
  return Math.max(
    ...pairs.map(([a, b]) => {
      const got = lengthBetween(scale, yardPixel(a), yardPixel(b));
      return got ? Math.abs(got.meters / yardDistance(a, b) - 1) : Number.POSITIVE_INFINITY;
    }),
  );
}

describe('a photo’s scale from exact pixels', () => {
  it.each(yardRectangleNames)('gives every distance of the yard within 0.1 %% from the %s alone', (name) => {
    expect(worstError([yardRectangle(name)], allPairs)).toBeLessThan(0.001);
  });

  it('gives every distance from all three rectangles, which then leave nothing over', () => {
    const references = threeRectangles(exactly);
    expect(worstError(references, allPairs)).toBeLessThan(0.0005);
    const scale = solvedPhoto(references);
    expect(scale.misfit).toBeLessThan(0.01);
    expect(scale.residuals).toHaveLength(12);
    for (const r of scale.residuals) expect(Math.abs(r.relative)).toBeLessThan(0.0005);
  });

  it('lays the ground out as seen from above: origin amid the first rectangle, x to the right, y away', () => {
    const scale = solvedPhoto([yardRectangle('patio')]);
    const supplyBox = scale.groundFromSheet(yardPixel('supply box foot'))!;
    // The patio's middle is at (−0.6, 9.8) of the yard.
    expect(supplyBox.x).toBeCloseTo(2.75 + 0.6, 2);
    expect(supplyBox.y).toBeCloseTo(11.53 - 9.8, 2);
  });

  it('goes from sheet to ground and back', () => {
    const scale = solvedPhoto(threeRectangles(exactly));
    for (const name of yardNames) {
      const p = yardPixel(name);
      const back = scale.sheetFromGround(scale.groundFromSheet(p)!)!;
      expect(Math.hypot(back.x - p.x, back.y - p.y)).toBeLessThan(1e-7);
    }
  });

  it('does not mind where the corners start or which way round they go', () => {
    const { corners, widthMeters: w, depthMeters: d, ...rest } = yardRectangle('pond');
    const [a, b, c, e] = corners;
    const asGiven = solvedPhoto([yardRectangle('pond'), yardRectangle('patio')]);
    const orders: RectangleReference[] = [
      { ...rest, corners: [b, c, e, a], widthMeters: d, depthMeters: w },
      { ...rest, corners: [c, e, a, b], widthMeters: w, depthMeters: d },
      { ...rest, corners: [b, a, e, c], widthMeters: w, depthMeters: d },
      { ...rest, corners: [a, e, c, b], widthMeters: d, depthMeters: w },
    ];
    for (const order of orders) {
      const scale = solvedPhoto([order, yardRectangle('patio')]);
      for (const name of yardNames) {
        const expected = asGiven.groundFromSheet(yardPixel(name))!;
        const got = scale.groundFromSheet(yardPixel(name))!;
        expect(Math.hypot(got.x - expected.x, got.y - expected.y)).toBeLessThan(1e-6);
      }
    }
  });

  it('keeps the first rectangle’s frame whichever rectangle the solving starts from', () => {
    const slabFirst = solvedPhoto([yardRectangle('slab'), yardRectangle('pond')]);
    const middle = slabFirst.groundFromSheet(yardPixel('first slab near left'))!;
    expect(middle.x).toBeCloseTo(-0.4, 3);
    expect(middle.y).toBeCloseTo(-0.275, 3);
  });
});

describe('a photo’s scale from clicks a pixel off', () => {
  /** Relative errors of each pair's distance over 300 noisy calibrations: root mean square, and largest. */
  function errorsOf(names: readonly YardRectangle[], pairs: typeof allPairs, seed: number) {
    const random = seeded(seed);
    const squares = pairs.map(() => 0);
    let largest = 0;
    const runs = 300;
    for (let run = 0; run < runs; run++) {
      const click = noisy(random);
      const scale = solvedPhoto(names.map((name) => yardRectangle(name, click)));
      pairs.forEach(([a, b], i) => {
        const got = lengthBetween(scale, yardPixel(a), yardPixel(b))!.meters;
        const error = Math.abs(got / yardDistance(a, b) - 1);
        squares[i]! += error ** 2 / runs;
        largest = Math.max(largest, error);
      });
    }
    return { worstPair: Math.sqrt(Math.max(...squares)), largest };
  }
  const overOneMeter = allPairs.filter(([a, b]) => yardDistance(a, b) > 1);
  const alongPond = overOneMeter.filter(([a, b]) => a.startsWith('pond') && b.startsWith('pond'));

  it('stays near 1 % everywhere with patio, slab and pond: at most 1.2 % rms for any pair (seed 441)', () => {
    const { worstPair, largest } = errorsOf(yardRectangleNames, overOneMeter, 441);
    expect(worstPair).toBeLessThan(0.012);
    expect(largest).toBeLessThan(0.04);
  });

  it('is over a tenth off by the pond, at worst, with the patio alone (seed 442)', () => {
    const { worstPair, largest } = errorsOf(['patio'], alongPond, 442);
    expect(worstPair).toBeGreaterThan(0.04);
    expect(largest).toBeGreaterThan(0.1);
  });

  it('has a misfit about 1: mean square within 10 % over 400 calibrations (seed 443)', () => {
    const random = seeded(443);
    let sum = 0;
    for (let i = 0; i < 400; i++) sum += solvedPhoto(threeRectangles(noisy(random))).misfit! ** 2;
    expect(Math.abs(sum / 400 - 1)).toBeLessThan(0.1);
  });
});

describe('lengths beside a rectangle', () => {
  const length = (a: YardName, b: YardName, sigma?: number): ScaleReference => ({
    id: `${a} to ${b}`,
    kind: 'length',
    a: yardPixel(a),
    b: yardPixel(b),
    meters: yardDistance(a, b),
    ...(sigma === undefined ? {} : { sigmaMeters: meters(sigma) }),
  });
  const pondEdge = [yardPixel('pond outer near left'), yardPixel('pond outer near right')] as const;
  const sigmaAtPond = (references: readonly ScaleReference[]) =>
    lengthBetween(solvedPhoto(references), ...pondEdge)!.sigmaMeters as number;

  it('tighten the error, the more so the better the length is known', () => {
    const patio = yardRectangle('patio');
    const near = ['first slab near left', 'pond outer near right'] as const;
    const alone = sigmaAtPond([patio]);
    const exact = sigmaAtPond([patio, length(...near)]);
    const rough = sigmaAtPond([patio, length(...near, 0.3)]);
    const useless = sigmaAtPond([patio, length(...near, 5)]);
    expect(exact).toBeLessThan(0.6 * alone);
    expect(rough).toBeGreaterThan(exact);
    expect(rough).toBeLessThan(alone);
    expect(Math.abs(useless / alone - 1)).toBeLessThan(0.01);
  });

  it('pull distorted calibrations towards the truth: half the worst error, rms of 100 (seed 444)', () => {
    const random = seeded(444);
    let alone = 0;
    let tied = 0;
    const lengths = [
      length('pond outer near left', 'bed near right'),
      length('first slab near left', 'right tree foot'),
    ];
    for (let i = 0; i < 100; i++) {
      const patio = yardRectangle('patio', noisy(random));
      alone += worstError([patio], allPairs) ** 2;
      tied += worstError([patio, ...lengths], allPairs) ** 2;
    }
    expect(Math.sqrt(tied)).toBeLessThan(Math.sqrt(alone) / 2);
  });

  it('grow the stated errors when they contradict the rest', () => {
    const wrong = { ...length('pond outer near left', 'pond outer near right'), meters: meters(5) };
    const references = [...threeRectangles(exactly), wrong] as ScaleReference[];
    const scale = solvedPhoto(references);
    expect(scale.misfit).toBeGreaterThan(3);
    expect(lengthBetween(scale, ...pondEdge)!.sigmaMeters).toBeGreaterThan(
      2 * sigmaAtPond(threeRectangles(exactly)),
    );
    const worst = scale.residuals.toSorted((a, b) => Math.abs(b.relative) - Math.abs(a.relative))[0]!;
    expect(worst.referenceId).toBe(wrong.id);
  });
});

describe('the horizon', () => {
  const scale = solvedPhoto([yardRectangle('patio')]);
  const under = (y: number): SheetPoint => at(1200, y);
  const near = yardPixel('patio near left');

  it('has no ground above it', () => {
    expect(scale.groundFromSheet(under(0))).toBeNull();
    expect(lengthBetween(scale, near, under(0))).toBeNull();
    expect(lengthAlong(scale, [near, under(0), near])).toBeNull();
  });

  it('is first distrusted, then over, as a point climbs the picture, and never trusted again', () => {
    const stages: string[] = [];
    for (let y = 1500; y >= 0; y -= 1) {
      const length = lengthBetween(scale, near, under(y));
      const stage = length === null ? 'none' : length.trusted ? 'trusted' : length.reason!;
      if (stages.at(-1) !== stage) stages.push(stage);
    }
    const afterTrust = stages.slice(stages.indexOf('trusted') + 1);
    expect(afterTrust).not.toContain('trusted');
    expect(afterTrust).toContain('near-horizon');
    expect(afterTrust.at(-1)).toBe('none');
  });

  it('is too near for a slab at the camera’s feet to say anything about the house', () => {
    const slab = solvedPhoto([yardRectangle('slab')]);
    const far = lengthBetween(slab, yardPixel('patio far left'), yardPixel('house right corner'))!;
    expect(far.trusted).toBe(false);
    const at2m = lengthBetween(slab, yardPixel('first slab near left'), yardPixel('first slab far right'))!;
    expect(at2m.trusted).toBe(true);
  });

  it('has no place on the sheet for ground behind the camera', () => {
    expect(scale.sheetFromGround({ x: meters(0), y: meters(-100) })).toBeNull();
  });
});
