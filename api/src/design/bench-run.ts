import {
  type EstimateFixture,
  type EstimateRequest,
  normalizeEstimateRequest,
} from '@lampwright/geometry/estimate';
import { conductorAmpacity, NoConvergence, solveEstimate } from '../circuit/index.js';
import type { CableChoice, DesignRun } from './problem.js';

/** A run in one cable, fed with stiff volts: what its lamps get and what it draws. */
export interface RunReading {
  readonly volts: readonly number[];
  /** Of each fixture, all of its quantity together. */
  readonly fixtureAmps: readonly number[];
  readonly amps: number;
  readonly voltAmps: number;
  /** A cable of it carries more than it may. */
  readonly overAmpacity: boolean;
}

/** Limits on a fixture's volts, both included; null: none, since it is off. */
export interface VoltLimits {
  readonly minVolts: number;
  readonly maxVolts: number;
}

/** What a fixture must get: inside of what it is rated for and of what the company aims at. */
export function limitsOf({ load, window, target }: EstimateFixture): VoltLimits | null {
  if (load.kind === 'off') return null;
  return {
    minVolts: Math.max(window.minVolts, target?.minVolts ?? 0),
    maxVolts: Math.min(window.maxVolts, target?.maxVolts ?? Number.POSITIVE_INFINITY),
  };
}

/** One run in one cable, read at any terminal volts. Null where the volts would collapse. */
export class RunOnBench {
  readonly limits: readonly (VoltLimits | null)[];
  private readonly request: EstimateRequest;

  constructor(
    readonly run: DesignRun,
    readonly cable: CableChoice,
    conductorTemperatureC: number,
  ) {
    this.limits = run.fixtures.map(limitsOf);
    this.request = {
      conductorTemperatureC,
      transformers: [],
      runs: [
        {
          id: run.id,
          transformerId: 'bench',
          tapId: 'tap',
          commonId: 'common',
          source: run.source,
          cables: run.cables.map((drawn) => ({ ...drawn, conductor: cable.conductor })),
          fixtures: [...run.fixtures],
        },
      ],
    };
  }

  at(terminalVolts: number): RunReading | null {
    const transformers = [
      {
        id: 'bench',
        ratedVA: 1e9,
        taps: [{ id: 'tap', volts: terminalVolts }],
        commons: [{ id: 'common' }],
      },
    ];
    try {
      const answer = solveEstimate(normalizeEstimateRequest({ ...this.request, transformers }));
      const limit = ampacityOf(this.cable);
      const run = answer.runs[0]!;
      return {
        volts: answer.fixtures.map(({ volts }) => volts),
        fixtureAmps: answer.fixtures.map(({ amps }) => amps),
        amps: run.amps,
        voltAmps: run.voltAmps,
        overAmpacity: limit !== null && answer.cables.some(({ amps }) => Math.abs(amps) > limit),
      };
    } catch (error) {
      if (error instanceof NoConvergence) return null;
      throw error;
    }
  }
}

export function ampacityOf({ conductor, ampacityAmps }: CableChoice): number | null {
  return ampacityAmps ?? conductorAmpacity(conductor);
}
