import {
  type EstimateAnswer,
  type EstimateFixture,
  type EstimateRequest,
  type FixtureState,
  normalizeEstimateRequest,
} from '@lampwright/geometry/estimate';
import { NoConvergence, solveEstimate } from '../circuit/index.js';

/** Something that may become of a yard after it was estimated. Volts in per cent of the line's, °C, VA. */
export type WhatIf =
  | { readonly kind: 'line'; readonly percent: number }
  | { readonly kind: 'cable'; readonly temperatureC: number }
  /** Each lamp of a run in turn goes out: the others get more. */
  | { readonly kind: 'one-lamp-out' }
  /** Lamps changed for weaker ones: every load at this share of its watts. */
  | { readonly kind: 'lighter'; readonly share: number }
  /** Added later at a node of a run. */
  | { readonly kind: 'addition'; readonly runId: string; readonly at: string; readonly voltAmps: number };

/** Lowest or highest volts of a fixture over all cases, and in which of them. */
export interface Extreme {
  readonly volts: number;
  /** Index of the case; null: as estimated. */
  readonly caseIndex: number | null;
}

export interface FixtureExtremes {
  readonly id: string;
  readonly nominalVolts: number;
  readonly lowest: Extreme;
  readonly highest: Extreme;
  /**
   * `fault`: what the fixture is rated for is left in some case, and it has a driver, which must hold in all of them.
   * `advice`: the same with a filament, which is judged as estimated. `holds`: never.
   */
  readonly verdict: 'holds' | 'advice' | 'fault';
  readonly state: FixtureState;
}

export interface WhatIfAnswer {
  readonly fixtures: readonly FixtureExtremes[];
  /** Cases in which no steady voltage was found: the supply would collapse. */
  readonly collapsed: readonly number[];
}

/** Every fixture's worst and best volts over the cases. Throws NoConvergence where the request itself has no answer. */
export function whatIf(request: EstimateRequest, cases: readonly WhatIf[]): WhatIfAnswer {
  const nominal = solveEstimate(normalizeEstimateRequest(request));
  const extremes = new Map(
    nominal.fixtures.map(({ id, volts }) => [
      id,
      {
        lowest: { volts, caseIndex: null as number | null },
        highest: { volts, caseIndex: null as number | null },
      },
    ]),
  );
  const collapsed: number[] = [];
  cases.forEach((one, caseIndex) => {
    for (const { changed, without } of variantsOf(request, one)) {
      const answer = answerTo(changed);
      if (!answer) {
        if (!collapsed.includes(caseIndex)) collapsed.push(caseIndex);
        continue;
      }
      for (const { id, volts } of answer.fixtures) {
        const known = extremes.get(id);
        // A lamp that is out has no volts to judge.
        if (!known || id === without) continue;
        if (volts < known.lowest.volts) known.lowest = { volts, caseIndex };
        if (volts > known.highest.volts) known.highest = { volts, caseIndex };
      }
    }
  });
  const asked = new Map(request.runs.flatMap(({ fixtures }) => fixtures.map((f) => [f.id, f] as const)));
  return {
    collapsed,
    fixtures: nominal.fixtures.map(({ id, volts, state }) => {
      const { lowest, highest } = extremes.get(id)!;
      return {
        id,
        nominalVolts: volts,
        lowest,
        highest,
        verdict: verdictOn(asked.get(id)!, state, lowest, highest),
        state,
      };
    }),
  };
}

function verdictOn(
  { load, window }: EstimateFixture,
  state: FixtureState,
  lowest: Extreme,
  highest: Extreme,
) {
  if (state === 'off' || state === 'unwired') return 'holds';
  if (lowest.volts >= window.minVolts && highest.volts <= window.maxVolts) return 'holds';
  switch (load.kind) {
    case 'driver':
    case 'current':
      return 'fault';
    case 'filament':
    case 'resistive':
      return 'advice';
    case 'off':
      return 'holds';
  }
}

interface Variant {
  readonly changed: EstimateRequest;
  /** The fixture that is out in it. */
  readonly without: string | null;
}

function* variantsOf(request: EstimateRequest, one: WhatIf): Generator<Variant> {
  switch (one.kind) {
    case 'line':
      yield {
        without: null,
        changed: {
          ...request,
          transformers: request.transformers.map((transformer) => ({
            ...transformer,
            lineVolts: ((transformer.lineVolts ?? 120) * one.percent) / 100,
          })),
        },
      };
      return;
    case 'cable':
      yield { without: null, changed: { ...request, conductorTemperatureC: one.temperatureC } };
      return;
    case 'one-lamp-out':
      for (const run of request.runs)
        for (const fixture of run.fixtures)
          if (fixture.load.kind !== 'off')
            yield {
              without: fixture.id,
              changed: withFixtures(request, (f) =>
                f.id === fixture.id ? { ...f, load: { kind: 'off' } } : f,
              ),
            };
      return;
    case 'lighter':
      yield { without: null, changed: withFixtures(request, (fixture) => lighter(fixture, one.share)) };
      return;
    case 'addition':
      yield {
        without: null,
        changed: {
          ...request,
          runs: request.runs.map((run) =>
            run.id === one.runId ? { ...run, fixtures: [...run.fixtures, additionAt(one)] } : run,
          ),
        },
      };
  }
}

function withFixtures(
  request: EstimateRequest,
  change: (fixture: EstimateFixture) => EstimateFixture,
): EstimateRequest {
  return { ...request, runs: request.runs.map((run) => ({ ...run, fixtures: run.fixtures.map(change) })) };
}

function lighter(fixture: EstimateFixture, share: number): EstimateFixture {
  const { load } = fixture;
  switch (load.kind) {
    case 'driver':
    case 'filament':
    case 'resistive':
      return { ...fixture, load: { ...load, watts: load.watts * share } };
    case 'current':
      return { ...fixture, load: { ...load, amps: load.amps * share } };
    case 'off':
      return fixture;
  }
}

function additionAt({ at, voltAmps }: Extract<WhatIf, { kind: 'addition' }>): EstimateFixture {
  return {
    id: 'addition',
    at,
    // A driver that regulates down to the lowest volts any of them takes draws the most where volts are low.
    load: { kind: 'driver', watts: voltAmps, minVolts: 9 },
    window: { minVolts: 9, maxVolts: 60 },
  };
}

function answerTo(request: EstimateRequest): EstimateAnswer | null {
  try {
    return solveEstimate(normalizeEstimateRequest(request));
  } catch (error) {
    if (error instanceof NoConvergence) return null;
    throw error;
  }
}
