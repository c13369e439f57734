import type { EstimateRequest, Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { fixtureAt, oneRun, solve, wire } from './feeder.testkit.js';

const draw = (amps: number): Load => ({ kind: 'current', amps });
const strong = { ratedVA: 6000 };

function warningsOf(request: EstimateRequest) {
  return solve(request).warnings.map(({ code, subject }) => [code, subject]);
}

const atSource = (amps: number, transformer: Partial<EstimateRequest['transformers'][number]>) =>
  oneRun(12, [], [fixtureAt('f', 's', draw(amps))], transformer);

describe('warnings', () => {
  it('common-over-limit: above 100 %, not at it', () => {
    const common = (amps: number) => atSource(amps, { ...strong, commons: [{ id: 'C', limitAmps: 25 }] });
    expect(warningsOf(common(25))).toEqual([]);
    expect(warningsOf(common(25.01))).toEqual([
      ['common-over-limit', { kind: 'common', id: 'C', transformerId: 'T' }],
    ]);
    // A common without a limit has nothing to be over.
    expect(warningsOf(atSource(399, strong))).toEqual([]);
  });

  it('tap-over-limit, where the tap has a limit', () => {
    const tap = (amps: number) =>
      atSource(amps, { ...strong, taps: [{ id: 'tap', volts: 12, limitAmps: 20 }] });
    expect(warningsOf(tap(20))).toEqual([]);
    expect(warningsOf(tap(20.01))).toEqual([
      ['tap-over-limit', { kind: 'tap', id: 'tap', transformerId: 'T' }],
    ]);
  });

  it('cable-over-ampacity: by the cable’s own number, else by its gauge, whichever way it flows', () => {
    const cable = (amps: number, extra: object) =>
      oneRun(
        12,
        [{ id: 'k', from: 'n', to: 's', lengthMeters: 0.1, conductor: { awg: 12 }, ...extra }],
        [fixtureAt('f', 'n', draw(amps))],
        strong,
      );
    expect(warningsOf(cable(20, {}))).toEqual([]);
    expect(warningsOf(cable(20.01, {}))).toEqual([['cable-over-ampacity', { kind: 'cable', id: 'k' }]]);
    expect(warningsOf(cable(20.01, { ampacityAmps: 25 }))).toEqual([]);
    expect(warningsOf(cable(10, { ampacityAmps: 9 }))).toEqual([
      ['cable-over-ampacity', { kind: 'cable', id: 'k' }],
    ]);
  });

  it('transformer-over-target above 80 %, -over-rating and winding-over-rating above 100 %', () => {
    const loaded = (va: number) => atSource(va / 12, { ratedVA: 300 });
    const transformer = { kind: 'transformer', id: 'T' };
    expect(warningsOf(loaded(240))).toEqual([]);
    expect(warningsOf(loaded(241))).toEqual([['transformer-over-target', transformer]]);
    expect(warningsOf(loaded(301))).toEqual([
      ['transformer-over-target', transformer],
      ['transformer-over-rating', transformer],
      ['winding-over-rating', { kind: 'winding', id: 'w1', transformerId: 'T' }],
    ]);
    const small = atSource(10, { ratedVA: 300, windings: [{ id: 'w', ratedVA: 100 }] });
    expect(warningsOf(small)).toEqual([
      ['winding-over-rating', { kind: 'winding', id: 'w', transformerId: 'T' }],
    ]);
  });

  it('weak-short: where a short at the farthest node draws less than 1.5 × the common’s limit', () => {
    const withCommon = (loopOhms: number, more: Partial<EstimateRequest['transformers'][number]> = {}) =>
      oneRun(12, [wire('k1', 's', 'a', loopOhms / 2), wire('k2', 'a', 'b', loopOhms / 2)], [], {
        ...strong,
        commons: [{ id: 'C', limitAmps: 25 }],
        ...more,
      });
    const needed = 12 / 37.5;
    expect(warningsOf(withCommon(needed * 0.999))).toEqual([]);
    expect(warningsOf(withCommon(needed * 1.001))).toEqual([['weak-short', { kind: 'run', id: 'R' }]]);
    // A soft winding sags under the short.
    expect(warningsOf(withCommon(needed * 0.999, { regulationPercent: 5, ratedVA: 300 }))).toHaveLength(1);
    expect(solve(withCommon(0.6)).warnings[0]!.message).toBe(
      'A dead short at b, the far end of run R, would draw only 20.0 A; the breaker of common C (25.0 A) may not trip.',
    );
  });

  it('weak-short takes all paths of a loop together', () => {
    const loop = (limitAmps: number) =>
      oneRun(12, [wire('k1', 's', 'a', 0.3), wire('k2', 'a', 'b', 0.3), wire('k3', 'b', 's', 0.6)], [], {
        ...strong,
        commons: [{ id: 'C', limitAmps }],
      });
    // Farthest is b: 0.6 Ω either way, 0.3 Ω together, 40 A.
    expect(warningsOf(loop(40 / 1.5 - 0.01))).toEqual([]);
    expect(warningsOf(loop(40 / 1.5 + 0.01))).toEqual([['weak-short', { kind: 'run', id: 'R' }]]);
  });

  it('unreached, for every fixture that no cable reaches', () => {
    expect(warningsOf(oneRun(12, [], [fixtureAt('f', 'x', draw(1)), fixtureAt('g', 'y', draw(1))]))).toEqual([
      ['unreached', { kind: 'fixture', id: 'f' }],
      ['unreached', { kind: 'fixture', id: 'g' }],
    ]);
  });

  it('speaks in sentences', () => {
    const request = atSource(30, { ratedVA: 300, commons: [{ id: 'C', limitAmps: 25 }] });
    for (const { message } of solve(request).warnings) expect(message).toMatch(/^[A-Z].*\.$/);
  });
});
