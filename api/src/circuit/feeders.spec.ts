import type { Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { chain, fixtureAt, fixtureVolts, oneRun, solve, wire } from './feeder.testkit.js';

const amps = (value: number): Load => ({ kind: 'current', amps: value });
const power = (watts: number): Load => ({ kind: 'driver', watts, minVolts: 0.01 });

describe('feeders with several loads', () => {
  it('Mehta, Principles of Power System, 13.1: 300 V, 0.02 Ω/km, four loads', () => {
    const at = [500, 1000, 1600, 2000];
    const sections = at.map((meter, i) => ((meter - (at[i - 1] ?? 0)) * 0.02) / 1000);
    const volts = fixtureVolts(solve(chain(300, sections, [100, 150, 200, 50].map(amps))));
    [295.0, 291.0, 288.0, 287.6].forEach((wanted, i) => {
      expect(volts[i]).toBeCloseTo(wanted, 9);
    });
  });

  it('Mehta, Principles of Power System, 13.4: 250 V, three sections', () => {
    const volts = fixtureVolts(solve(chain(250, [0.099, 0.132, 0.066], [12, 15, 20].map(amps))));
    [245.35, 240.73, 239.41].forEach((wanted, i) => {
      expect(Math.abs(volts[i]! - wanted)).toBeLessThan(0.006);
    });
  });

  it('Mehta, Principles of Power System, 13.22: a ring at 240 V with two loads', () => {
    const perMeter = (2 * 0.03) / 100;
    const request = oneRun(
      240,
      [
        wire('AB', 's', 'B', 150 * perMeter),
        wire('CB', 'C', 'B', 50 * perMeter),
        wire('AC', 's', 'C', 100 * perMeter),
      ],
      [fixtureAt('B', 'B', amps(120)), fixtureAt('C', 'C', amps(80))],
    );
    const { cables, fixtures } = solve(request);
    [86.67, 33.33, 113.33].forEach((wanted, i) => {
      expect(Math.abs(cables[i]!.amps - wanted)).toBeLessThan(0.005);
    });
    expect(fixtures[0]!.volts).toBeCloseTo(232.2, 9);
    expect(fixtures[1]!.volts).toBeCloseTo(233.2, 9);
  });

  it('Mehta, Principles of Power System, 13.5: 2 A/m spread over 200 m drops 24 V; many small loads converge to it', () => {
    const dropWith = (count: number) => {
      const section = (2 * 0.3 * 200) / 1000 / count;
      const request = chain(
        400,
        Array.from({ length: count }, () => section),
        Array.from({ length: count }, () => amps(400 / count)),
      );
      return 400 - fixtureVolts(solve(request)).at(-1)!;
    };
    const errors = [10, 100, 1000].map((count) => Math.abs(dropWith(count) - 24));
    expect(errors[0]).toBeCloseTo(2.4, 6);
    expect(errors[1]).toBeCloseTo(0.24, 6);
    expect(errors[2]).toBeCloseTo(0.024, 6);
  });
});

describe('constant power', () => {
  const behind = (volts: number, loopOhms: number, watts: number) =>
    fixtureVolts(solve(chain(volts, [loopOhms], [power(watts)])))[0]!;

  it('is [Vs + √(Vs² − 4RP)] / 2', () => {
    expect(behind(12, 0.3176, 60)).toBeCloseTo((12 + Math.sqrt(144 - 4 * 0.3176 * 60)) / 2, 10);
    expect(behind(12, 0.3176, 60)).toBeCloseTo(10.1163, 4); // computed
    expect(behind(12, 0.3176, 100)).toBeCloseTo(8.0591, 4); // computed
  });

  it.each([
    ['30 V behind 1.5 Ω gives at most 150 W', 30, 1.5, 150],
    ['6 V behind 2.5 Ω gives at most 3.6 W', 6, 2.5, 3.6],
  ])('%s (Bird, Electrical Circuit Theory, ch. 13)', (_, volts, loopOhms, most) => {
    expect(behind(volts, loopOhms, most * 0.999999)).toBeCloseTo(volts / 2, 1);
    // At and past the most, no constant-power answer exists: the driver drops out and is a resistance, near nothing.
    expect(behind(volts, loopOhms, most * 1.000001)).toBeLessThan(0.01);
    expect(Math.abs(behind(volts, loopOhms, most) - volts / 2)).toBeLessThan(1e-3);
  });

  it('feeds four 5 W loads on 12 V (computed with a general circuit simulator)', () => {
    const volts = fixtureVolts(
      solve(chain(12, [0.1588, 0.06352, 0.06352, 0.06352], [5, 5, 5, 5].map(power))),
    );
    [11.7269, 11.6448, 11.5899, 11.5624].forEach((wanted, i) => {
      expect(volts[i]).toBeCloseTo(wanted, 4);
    });
  });
});

describe('lamps', () => {
  it('filament current goes as volts^0.55 (lamp rerating, handbook exponent)', () => {
    const load: Load = { kind: 'filament', watts: 20, ratedVolts: 12 };
    const { fixtures } = solve(oneRun(10.8, [], [fixtureAt('f', 's', load)]));
    expect(fixtures[0]!.amps).toBeCloseTo((20 / 12) * 0.9 ** 0.55, 12);
    expect(fixtures[0]!.voltAmps).toBeCloseTo(20 * 0.9 ** 1.55, 12);
  });

  it('a 4 W driver of power factor 0.73 draws 5.5 VA (common practice)', () => {
    const load: Load = { kind: 'driver', watts: 4, powerFactor: 4 / 5.5, minVolts: 9 };
    const { fixtures } = solve(oneRun(12, [], [fixtureAt('f', 's', load)]));
    expect(fixtures[0]!.voltAmps).toBeCloseTo(5.5, 12);
  });

  it('a resistive load obeys Ohm', () => {
    const load: Load = { kind: 'resistive', watts: 20, ratedVolts: 12 };
    const { fixtures } = solve(chain(12, [7.2], [load]));
    expect(fixtures[0]!.volts).toBeCloseTo(6, 12);
  });
});
