import { describe, expect, it } from 'vitest';
import { meters } from '../units/brand.js';
import { lengthAlong, lengthBetween, type ScaleReference } from './calibration.js';
import {
  at,
  type Click,
  exactly,
  noisy,
  seeded,
  solvedPhoto,
  threeRectangles,
  type YardName,
  type YardRectangle,
  yardDistance,
  yardPixel,
  yardRectangle,
} from './yard.testkit.js';

describe('the first-order error of a photo’s lengths', () => {
  const runs = 1500;
  const lines: YardName[][] = [
    ['pond outer near left', 'pond outer near right'],
    ['pond outer near right', 'pond outer far right'],
    ['first slab near left', 'pond outer far right'],
    ['supply box foot', 'right tree foot'],
    ['patio near left', 'house right corner'],
    ['bed near right', 'pond outer near right'],
    ['supply box foot', 'patio near right', 'pond outer far left', 'first slab far right'],
  ];

  it.each<YardRectangle[][]>([[['patio']], [['pond']], [['patio', 'pond']], [['patio', 'slab', 'pond']]])(
    'agrees with 1500 calibrations at random within 20 %% on %j (seed 451)',
    (names) => {
      const random = seeded(451);
      const sums = lines.map(() => ({ first: 0, second: 0 }));
      for (let i = 0; i < runs; i++) {
        const click = noisy(random);
        const scale = solvedPhoto(names.map((name) => yardRectangle(name, click)));
        lines.forEach((line, k) => {
          // The yard's own points are clicked anew: their errors are independent of the calibration's.
          const got = lengthAlong(
            scale,
            line.map((name) => click(yardPixel(name))),
          )!.meters;
          sums[k]!.first += got;
          sums[k]!.second += got * got;
        });
      }
      const scale = solvedPhoto(names.map((name) => yardRectangle(name)));
      lines.forEach((line, k) => {
        const mean = sums[k]!.first / runs;
        const spread = Math.sqrt(sums[k]!.second / runs - mean * mean);
        const stated = lengthAlong(scale, line.map(yardPixel))!;
        expect(Math.abs(stated.sigmaMeters / spread - 1), line.join(' – ')).toBeLessThan(0.2);
      });
    },
  );

  it('agrees within 20 % with lengths beside the rectangle, one of them taped with an error (seed 452)', () => {
    const random = seeded(452);
    const pairs: [YardName, YardName][] = [
      ['pond outer near left', 'bed near right'],
      ['first slab near left', 'right tree foot'],
    ];
    const tapeSigma = 0.1;
    const references = (click: Click): ScaleReference[] => [
      yardRectangle('patio', click),
      ...pairs.map(([a, b], i): ScaleReference => {
        // The second is taped: its stated length is off too, by the same kind of chance.
        const off = i === 1 ? tapeSigma * click(at(0, 0)).x : 0;
        return {
          id: a,
          kind: 'length',
          a: click(yardPixel(a)),
          b: click(yardPixel(b)),
          meters: meters(yardDistance(a, b) + off),
          ...(i === 1 ? { sigmaMeters: meters(tapeSigma) } : {}),
        };
      }),
    ];
    const got = lines.map((): number[] => []);
    for (let i = 0; i < runs; i++) {
      const click = noisy(random);
      const scale = solvedPhoto(references(click));
      lines.forEach((line, k) => {
        got[k]!.push(
          lengthAlong(
            scale,
            line.map((name) => click(yardPixel(name))),
          )!.meters,
        );
      });
    }
    const scale = solvedPhoto(references(exactly));
    lines.forEach((line, k) => {
      const mean = got[k]!.reduce((sum, x) => sum + x, 0) / runs;
      const spread = Math.sqrt(got[k]!.reduce((sum, x) => sum + (x - mean) ** 2, 0) / runs);
      const stated = lengthAlong(scale, line.map(yardPixel))!;
      expect(Math.abs(stated.sigmaMeters / spread - 1), line.join(' – ')).toBeLessThan(0.2);
    });
  });

  it('grows in proportion to the click error', () => {
    const points = [yardPixel('bed near right'), yardPixel('pond outer far left')] as const;
    const one = lengthBetween(solvedPhoto(threeRectangles(exactly), 1), ...points)!;
    const two = lengthBetween(solvedPhoto(threeRectangles(exactly), 2), ...points)!;
    expect(two.sigmaMeters / one.sigmaMeters).toBeCloseTo(2, 6);
  });
});
