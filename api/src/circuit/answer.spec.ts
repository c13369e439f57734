import { type EstimateRequest, estimateAnswerSchema, type Load } from '@lampwright/geometry/estimate';
import { describe, expect, it } from 'vitest';
import { chain, fixtureAt, oneRun, solve, wire } from './feeder.testkit.js';

const driver: Load = { kind: 'driver', watts: 4, powerFactor: 0.9, minVolts: 9 };

/** One 4 W driver on 12.4 m of 12 AWG and 0.9 m of 18 AWG lead, everything said. */
function wholeRequest(): EstimateRequest {
  return {
    conductorTemperatureC: 25,
    transformers: [
      {
        id: 'T',
        ratedVA: 300,
        lineVolts: 120,
        nominalLineVolts: 120,
        regulationPercent: 0,
        ratedAt: 'open',
        windings: [{ id: 'w1', ratedVA: 300 }],
        taps: [
          { id: '12V', volts: 12, winding: 'w1' },
          { id: '13V', volts: 13, winding: 'w1' },
        ],
        commons: [
          { id: 'C1', limitAmps: 25, winding: 'w1' },
          { id: 'C2', limitAmps: 25, winding: 'w1' },
        ],
      },
    ],
    runs: [
      {
        id: 'R1',
        transformerId: 'T',
        tapId: '12V',
        commonId: 'C1',
        source: 's',
        cables: [
          {
            id: 'k1',
            from: 's',
            to: 'p1',
            lengthMeters: 12.4,
            conductor: { awg: 12 },
            extraOhms: 0,
            ampacityAmps: 20,
          },
        ],
        fixtures: [
          {
            id: 'f1',
            at: 'p1',
            quantity: 1,
            load: driver,
            lead: { conductor: { awg: 18 }, lengthMeters: 0.9 },
            window: { minVolts: 9, maxVolts: 15 },
            target: { minVolts: 10.5, maxVolts: 13 },
          },
        ],
      },
    ],
  };
}

describe('the answer', () => {
  it('holds every figure of one fixture on one cable', () => {
    const answer = solve(wholeRequest());
    expect(estimateAnswerSchema.parse(answer)).toEqual(answer);
    const [fixture] = answer.fixtures;
    const [cable] = answer.cables;
    // Worked by hand: loop ohms of cable and lead, then the constant-power root.
    const perMeter = (awg: number) =>
      ((1.02 / 58) * (1 + 0.00393 * 5)) / ((Math.PI / 4) * (0.127 * 92 ** ((36 - awg) / 39)) ** 2);
    const cableOhms = 2 * perMeter(12) * 12.4;
    const leadOhms = 2 * perMeter(18) * 0.9;
    const va = 4 / 0.9;
    const volts = (12 + Math.sqrt(144 - 4 * (cableOhms + leadOhms) * va)) / 2;
    const amps = va / volts;
    expect(fixture).toEqual({
      id: 'f1',
      volts: expect.closeTo(volts, 10),
      amps: expect.closeTo(amps, 10),
      voltAmps: expect.closeTo(va, 10),
      dropPercent: expect.closeTo(((12 - volts) / 12) * 100, 8),
      state: 'in-window',
      aim: 'inside',
    });
    expect(cable).toEqual({
      id: 'k1',
      amps: expect.closeTo(amps, 10),
      fromVolts: 12,
      toVolts: expect.closeTo(12 - amps * cableOhms, 10),
      dropVolts: expect.closeTo(amps * cableOhms, 10),
      lossWatts: expect.closeTo(amps ** 2 * cableOhms, 10),
      ampacityPercent: expect.closeTo(amps * 5, 8),
    });
    expect(answer.runs).toEqual([
      {
        id: 'R1',
        terminalVolts: 12,
        amps: expect.closeTo(amps, 10),
        voltAmps: expect.closeTo(12 * amps, 10),
        lowestVolts: fixture!.volts,
        highestVolts: fixture!.volts,
        lengthMeters: 12.4,
      },
    ]);
    expect(answer.commons).toEqual([
      {
        transformerId: 'T',
        id: 'C1',
        amps: expect.closeTo(amps, 10),
        loadPercent: expect.closeTo(amps * 4, 8),
      },
    ]);
    expect(answer.taps).toEqual([{ transformerId: 'T', id: '12V', amps: expect.closeTo(amps, 10) }]);
    expect(answer.transformers).toEqual([
      {
        id: 'T',
        voltAmps: expect.closeTo(12 * amps, 10),
        loadPercent: expect.closeTo(4 * amps, 8),
        lossWatts: expect.closeTo(amps ** 2 * (cableOhms + leadOhms), 10),
      },
    ]);
    expect(answer.warnings).toEqual([]);
    // Rounded: 11.935 V and 0.372 A.
    expect(fixture!.volts).toBeCloseTo(11.935, 3);
    expect(fixture!.amps).toBeCloseTo(0.3724, 4);
  });

  it('signs cable amps by the cable’s own direction', () => {
    const request = wholeRequest();
    const cable = request.runs[0]!.cables[0]!;
    [cable.from, cable.to] = [cable.to, cable.from];
    const [backward] = solve(request).cables;
    const [forward] = solve(wholeRequest()).cables;
    expect(backward!.amps).toBeCloseTo(-forward!.amps, 12);
    expect(backward!.dropVolts).toBeCloseTo(-forward!.dropVolts, 12);
    expect(backward!.lossWatts).toBeCloseTo(forward!.lossWatts, 12);
    expect(backward!.ampacityPercent).toBeCloseTo(forward!.ampacityPercent!, 10);
  });

  it('takes quantity as so many alike, each on its own lead', () => {
    const single = wholeRequest();
    const fixture = single.runs[0]!.fixtures[0]!;
    single.runs[0]!.fixtures = [1, 2, 3].map((i) => ({ ...fixture, id: `f${i}` }));
    const together = wholeRequest();
    together.runs[0]!.fixtures = [{ ...fixture, quantity: 3 }];
    const apart = solve(single);
    const joined = solve(together);
    expect(joined.fixtures[0]!.volts).toBeCloseTo(apart.fixtures[0]!.volts, 11);
    expect(joined.fixtures[0]!.amps).toBeCloseTo(3 * apart.fixtures[0]!.amps, 11);
    expect(joined.fixtures[0]!.voltAmps).toBeCloseTo(3 * (4 / 0.9), 11);
    expect(joined.transformers[0]!.lossWatts).toBeCloseTo(apart.transformers[0]!.lossWatts, 11);
  });

  it('answers dead ends, bare runs and off loads with no current and full volts', () => {
    const bare = solve(oneRun(12, [wire('k1', 's', 'a', 0.5), wire('k2', 'a', 'b', 0.5)], []));
    expect(bare.runs[0]).toMatchObject({ amps: 0, voltAmps: 0, lowestVolts: null, highestVolts: null });
    expect(bare.cables.map(({ amps, toVolts, lossWatts }) => [amps, toVolts, lossWatts])).toEqual([
      [0, 12, 0],
      [0, 12, 0],
    ]);
    const off = solve(chain(12, [0.5], [{ kind: 'off' }]));
    expect(off.fixtures[0]).toMatchObject({ volts: 12, amps: 0, voltAmps: 0, state: 'off' });
    expect(off.runs[0]).toMatchObject({ amps: 0, lowestVolts: null, highestVolts: null });
    const deadEnd = solve(
      oneRun(12, [wire('k1', 's', 'a', 0.5), wire('k2', 'a', 'b', 0.5)], [fixtureAt('f', 'a', driver)]),
    );
    expect(deadEnd.cables[1]).toMatchObject({ amps: 0, fromVolts: deadEnd.cables[0]!.toVolts, lossWatts: 0 });
    expect(Object.is(deadEnd.cables[1]!.amps, -0)).toBe(false);
  });

  it('gives fixtures that no cable reaches 0 V, and islands of cable no current', () => {
    const cables = [wire('k1', 's', 'a', 0.5), wire('k2', 'x', 'y', 0.5)];
    const answer = solve(
      oneRun(12, cables, [
        fixtureAt('f1', 'y', driver),
        fixtureAt('f2', 'nowhere', driver),
        fixtureAt('f3', 'a', driver),
      ]),
    );
    expect(
      answer.fixtures
        .map(({ volts, amps, state, dropPercent }) => [volts, amps, state, dropPercent])
        .slice(0, 2),
    ).toEqual([
      [0, 0, 'unwired', 100],
      [0, 0, 'unwired', 100],
    ]);
    expect(answer.cables[1]).toMatchObject({ amps: 0, fromVolts: 0, toVolts: 0, dropVolts: 0, lossWatts: 0 });
    expect(answer.warnings.map(({ code, subject }) => [code, subject])).toEqual([
      ['unreached', { kind: 'fixture', id: 'f1' }],
      ['unreached', { kind: 'fixture', id: 'f2' }],
    ]);
    expect(answer.runs[0]!.lowestVolts).toBe(answer.fixtures[2]!.volts);
  });

  it('takes fixtures at the source, and runs without cable', () => {
    const answer = solve(oneRun(12, [], [fixtureAt('f', 's', driver)]));
    expect(answer.fixtures[0]).toMatchObject({
      volts: 12,
      dropPercent: 0,
      amps: expect.closeTo(4 / 0.9 / 12, 12),
    });
    expect(answer.runs[0]!.amps).toBeCloseTo(4 / 0.9 / 12, 12);
  });

  it('shares current between parallel cables by their conductance', () => {
    const load: Load = { kind: 'current', amps: 3 };
    const answer = solve(
      oneRun(12, [wire('k1', 's', 'a', 1), wire('k2', 'a', 's', 0.5)], [fixtureAt('f', 'a', load)]),
    );
    expect(answer.cables.map(({ amps }) => amps)).toEqual([expect.closeTo(1, 12), expect.closeTo(-2, 12)]);
  });

  it('knows no ampacity for bare ohms, lists all transformers, and answers an empty request', () => {
    expect(solve(chain(12, [0.5], [driver])).cables[0]!.ampacityPercent).toBeNull();
    const request = wholeRequest();
    request.transformers.push({
      id: 'U',
      ratedVA: 150,
      taps: [{ id: 'x', volts: 12 }],
      commons: [{ id: 'C' }],
    });
    expect(solve(request).transformers[1]).toEqual({ id: 'U', voltAmps: 0, loadPercent: 0, lossWatts: 0 });
    expect(solve({ transformers: [], runs: [] })).toEqual({
      fixtures: [],
      cables: [],
      runs: [],
      commons: [],
      taps: [],
      transformers: [],
      warnings: [],
    });
  });

  it('keeps the micro-ohm joints of zero length apart from the rest', () => {
    const sections = [0, 0.4, 0, 0, 0.2, 0];
    const answer = solve(
      chain(
        12,
        sections,
        sections.map(() => driver),
      ),
    );
    const amps = answer.fixtures.map((fixture) => fixture.amps);
    answer.cables.forEach((cable, i) => {
      const beyond = amps.slice(i).reduce((sum, one) => sum + one, 0);
      expect(Math.abs(cable.amps - beyond)).toBeLessThan(1e-7);
    });
  });
});
