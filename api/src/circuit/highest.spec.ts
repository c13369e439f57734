import type { Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { chain, fixtureAt, fixtureVolts, oneRun, solve, wire } from './feeder.testkit.js';
import { loadCurrent, missesOf } from './kirchhoff.testkit.js';
import { seeded } from './random.testkit.js';

interface Feeder {
  readonly open: number;
  readonly sag: number;
  readonly sections: readonly number[];
  readonly loads: readonly Load[];
}

/**
 * Volts along a chain by brute force: the volts at its end fix everything back to the terminal, so that a scan of
 * end volts from the open volts down, then bisection, finds the highest at which the terminal fits the supply.
 */
function scannedVolts({ open, sag, sections, loads }: Feeder): number[] {
  const walkBack = (end: number) => {
    const volts: number[] = [];
    let v = end;
    let amps = 0;
    for (let i = loads.length - 1; i >= 0; i--) {
      volts.unshift(v);
      amps += loadCurrent(loads[i]!, v, open);
      v += sections[i]! * amps;
    }
    return { volts, excess: v - open * (1 - sag * v * amps) };
  };
  const steps = 100_000;
  let high = open;
  let low = open;
  for (let i = 1; i <= steps; i++) {
    low = open * (1 - i / steps);
    if (walkBack(low).excess <= 0) break;
    high = low;
  }
  for (let i = 0; i < 100; i++) {
    const middle = (low + high) / 2;
    if (walkBack(middle).excess <= 0) low = middle;
    else high = middle;
  }
  return walkBack(high).volts;
}

function randomFeeder(seed: number): Feeder {
  const random = seeded(seed);
  const count = 1 + Math.floor(random() * 5);
  const heavy = 4 + 60 * random();
  const loads = Array.from({ length: count }, (): Load => {
    const watts = heavy * random();
    const kind = random();
    if (kind < 0.6) return { kind: 'driver', watts, minVolts: 1 + 10 * random() };
    if (kind < 0.75) return { kind: 'filament', watts, ratedVolts: 12 };
    if (kind < 0.9) return { kind: 'current', amps: watts / 12 };
    return { kind: 'resistive', watts, ratedVolts: 12 };
  });
  return {
    open: 12,
    sag: random() < 0.4 ? (0.1 * random()) / 100 : 0,
    sections: Array.from({ length: count }, () => 0.02 + random() ** 2),
    loads,
  };
}

function solved({ open, sag, sections, loads }: Feeder) {
  const request = chain(open, sections, loads);
  request.transformers[0] = { ...request.transformers[0]!, ratedVA: 100, regulationPercent: sag * 100 * 100 };
  return { request, answer: solve(request) };
}

describe('the highest of several answers', () => {
  const seeds = Array.from({ length: 150 }, (_, i) => i + 1);

  it.each(seeds)('chain of seed %i agrees with a scan from the open volts down', (seed) => {
    const feeder = randomFeeder(seed);
    const { request, answer } = solved(feeder);
    const wanted = scannedVolts(feeder);
    fixtureVolts(answer).forEach((volts, i) => {
      expect(Math.abs(volts - wanted[i]!)).toBeLessThan(1e-6);
    });
    expect(missesOf(request, answer).power).toBeLessThan(1e-7);
  });

  it('these chains hold brown-outs, and volts on both sides of the drivers’ minimum', () => {
    const below = seeds.map((seed) => {
      const feeder = randomFeeder(seed);
      const volts = fixtureVolts(solved(feeder).answer);
      return feeder.loads.map((load, i) => (load.kind === 'driver' ? volts[i]! < load.minVolts : null));
    });
    expect(below.filter((chainOf) => chainOf.includes(true)).length).toBeGreaterThan(20);
    expect(below.filter((chainOf) => chainOf.includes(false)).length).toBeGreaterThan(20);
    expect(
      below.filter((chainOf) => chainOf.includes(true) && chainOf.includes(false)).length,
    ).toBeGreaterThan(5);
  });

  it('takes the high one where a driver could also sit below its minimum', () => {
    // 12 V behind 1 Ω, 35 W from 2 V up: 7 V and 5 V satisfy constant power, and a third answer lies below 2 V.
    const [volts] = fixtureVolts(solve(chain(12, [1], [{ kind: 'driver', watts: 35, minVolts: 2 }])));
    expect(volts).toBeCloseTo(7, 10);
  });

  it('settles past the nose, where the driver is a resistance', () => {
    // 12 V behind 1 Ω feeds at most 36 W; 40 W from 4 V up leaves 4² / 40 = 0.4 Ω on the lower branch.
    const [volts] = fixtureVolts(solve(chain(12, [1], [{ kind: 'driver', watts: 40, minVolts: 4 }])));
    expect(volts).toBeCloseTo((12 * 0.4) / 1.4, 10);
  });

  it('takes the high one on a weak lead too', () => {
    const lead = { conductor: { ohmsPerKm: 500 }, lengthMeters: 1 };
    const driver = (watts: number) => ({
      ...fixtureAt('f', 'n', { kind: 'driver', watts, minVolts: 2 } as const),
      lead,
    });
    const [high] = fixtureVolts(solve(oneRun(12, [wire('k', 's', 'n', 1e-6)], [driver(35)])));
    expect(high).toBeCloseTo(7, 4);
    const [low] = fixtureVolts(solve(oneRun(12, [wire('k', 's', 'n', 1e-6)], [driver(37)])));
    expect(low).toBeCloseTo((12 * (4 / 37)) / (1 + 4 / 37), 4);
  });

  it('lets only those drop out that must', () => {
    // The far driver alone is past its nose; the near one keeps its power.
    const answer = solve(
      chain(
        12,
        [0.1, 3],
        [
          { kind: 'driver', watts: 10, minVolts: 9 },
          { kind: 'driver', watts: 20, minVolts: 9 },
        ],
      ),
    );
    expect(answer.fixtures.map(({ state }) => state)).toEqual(['in-window', 'dark']);
    expect(answer.fixtures[0]!.voltAmps).toBeCloseTo(10, 9);
  });
});
