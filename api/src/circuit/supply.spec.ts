import type { EstimateRequest, Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { fixtureAt, oneRun, solve, wire } from './feeder.testkit.js';
import { missesOf } from './kirchhoff.testkit.js';

const heater = (watts: number): Load => ({ kind: 'resistive', watts, ratedVolts: 12 });

/** A load at the source that takes `va` at 12 V. */
function atSource(va: number, transformer: Partial<EstimateRequest['transformers'][number]>) {
  return oneRun(12, [], [fixtureAt('f', 's', { kind: 'driver', watts: va, minVolts: 1 })], {
    ratedVA: 300,
    ...transformer,
  });
}

describe('supply', () => {
  it('does not sag without regulation', () => {
    expect(solve(atSource(300, {})).runs[0]!.terminalVolts).toBe(12);
  });

  it('rated open: sags by g % at full load', () => {
    expect(solve(atSource(300, { regulationPercent: 5 })).runs[0]!.terminalVolts).toBeCloseTo(11.4, 10);
    expect(solve(atSource(150, { regulationPercent: 5 })).runs[0]!.terminalVolts).toBeCloseTo(11.7, 10);
  });

  it('rated at load: gives its nameplate volts at full load, g % more without load', () => {
    const atLoad = { regulationPercent: 5, ratedAt: 'load' } as const;
    expect(solve(atSource(300, atLoad)).runs[0]!.terminalVolts).toBeCloseTo(12, 10);
    const idle = oneRun(12, [], [fixtureAt('f', 's', { kind: 'off' })], { ratedVA: 300, ...atLoad });
    expect(solve(idle).runs[0]!.terminalVolts).toBeCloseTo(12.6, 12);
  });

  it('follows the line', () => {
    const answer = solve(atSource(10, { lineVolts: 114 }));
    expect(answer.runs[0]!.terminalVolts).toBeCloseTo(11.4, 12);
    expect(solve(atSource(10, { lineVolts: 207, nominalLineVolts: 230 })).runs[0]!.terminalVolts).toBeCloseTo(
      10.8,
      12,
    );
  });

  it('sags all taps of a winding together, and no other winding', () => {
    const run = (
      id: string,
      tapId: string,
      commonId: string,
      watts: number,
    ): EstimateRequest['runs'][number] => ({
      id,
      transformerId: 'T',
      tapId,
      commonId,
      source: 's',
      cables: [wire(`k${id}`, 's', 'n', 0.1)],
      fixtures: [fixtureAt(`f${id}`, 'n', heater(watts))],
    });
    const request: EstimateRequest = {
      transformers: [
        {
          id: 'T',
          ratedVA: 300,
          regulationPercent: 8,
          windings: [
            { id: 'w1', ratedVA: 150 },
            { id: 'w2', ratedVA: 150 },
          ],
          taps: [
            { id: 'a', volts: 12 },
            { id: 'b', volts: 14, winding: 'w1' },
            { id: 'c', volts: 12, winding: 'w2' },
          ],
          commons: [{ id: 'C1' }, { id: 'C2', winding: 'w2' }],
        },
      ],
      runs: [run('1', 'a', 'C1', 50), run('2', 'b', 'C1', 50), run('3', 'c', 'C2', 10)],
    };
    const answer = solve(request);
    const [a, b, c] = answer.runs.map(({ terminalVolts }) => terminalVolts);
    expect(a! / 12).toBeCloseTo(b! / 14, 12);
    const supplied = answer.runs[0]!.voltAmps + answer.runs[1]!.voltAmps;
    expect(a!).toBeCloseTo(12 * (1 - (0.08 * supplied) / 150), 10);
    expect(c!).toBeCloseTo(12 * (1 - (0.08 * answer.runs[2]!.voltAmps) / 150), 10);
    expect(c! / 12).toBeGreaterThan(a! / 12);
    expect(answer.transformers[0]!.voltAmps).toBeCloseTo(supplied + answer.runs[2]!.voltAmps, 10);
    expect(answer.taps.map(({ id }) => id)).toEqual(['a', 'b', 'c']);
    expect(answer.commons[0]!.amps).toBeCloseTo(answer.runs[0]!.amps + answer.runs[1]!.amps, 12);
    expect(missesOf(request, answer).terminalVolts).toBeLessThan(1e-9);
  });

  it('browns out as the line sinks: volts fall, drivers draw more, then drop out', () => {
    const request = (lineVolts: number) =>
      oneRun(
        12,
        [wire('k', 's', 'n', 0.3)],
        [fixtureAt('f', 'n', { kind: 'driver', watts: 40, minVolts: 9 })],
        { ratedVA: 150, regulationPercent: 5, lineVolts },
      );
    const at = (lineVolts: number) => solve(request(lineVolts)).fixtures[0]!;
    expect(at(110).volts).toBeLessThan(at(120).volts);
    expect(at(110).amps).toBeGreaterThan(at(120).amps);
    expect(at(110).voltAmps).toBeCloseTo(40, 9);
    expect(at(90).volts).toBeLessThan(9);
    expect(at(90).voltAmps).toBeLessThan(40);
    expect(at(40).state).toBe('dark');
  });
});
