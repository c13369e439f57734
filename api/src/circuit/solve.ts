import type {
  EstimateAnswer,
  NormalizedEstimateRequest,
  NormalizedRun,
  NormalizedTransformer,
} from '@lampwright/geometry/estimate';
import { voltAmperes } from '@lampwright/geometry/units';
import { buildAnswer } from './answer.js';
import { RunCircuit, type SolvedRun } from './circuit.js';
import { NoConvergence } from './no-convergence.js';
import { TooTangled } from './ordering.js';
import { openVolts, sagPerVoltAmpere } from './supply.js';
import { solveWinding } from './winding.js';

/** Counted while solving, for the bench. */
export interface SolveStatistics {
  /** Newton steps with a new factorisation, over all windings, proofs included. */
  iterations: number;
}

interface WindingRuns {
  readonly sag: number;
  readonly members: { readonly index: number; readonly circuit: RunCircuit }[];
}

/**
 * Volts everywhere for a request whose references hold (see `parseEstimateRequest`); any positive volts are taken,
 * not only low ones. Exact for the model of the contract, for any connected network. Throws NoConvergence where no
 * answer could be found and verified against Kirchhoff's laws; never answers numbers that do not satisfy them.
 */
export function solveEstimate(
  request: NormalizedEstimateRequest,
  statistics: SolveStatistics = { iterations: 0 },
): EstimateAnswer {
  const solved: SolvedRun[] = new Array(request.runs.length);
  for (const { sag, members } of groupByWinding(request)) {
    // Without sag nothing ties the runs of a winding together.
    const groups = sag === 0 ? members.map((member) => [member]) : [members];
    for (const group of groups) {
      const state = solveWinding(
        group.map(({ circuit }) => circuit),
        sag,
      );
      statistics.iterations += state.iterations;
      for (const { index, circuit } of group) solved[index] = { circuit, share: state.share, sag };
    }
  }
  return buildAnswer(request, solved);
}

function groupByWinding(request: NormalizedEstimateRequest): Iterable<WindingRuns> {
  const transformers = new Map(request.transformers.map((transformer) => [transformer.id, transformer]));
  const windings = new Map<string, WindingRuns>();
  request.runs.forEach((run, index) => {
    const transformer = found(transformers.get(run.transformerId), 'transformer', run.transformerId);
    const tap = found(
      transformer.taps.find(({ id }) => id === run.tapId),
      'tap',
      run.tapId,
    );
    const key = JSON.stringify([transformer.id, tap.winding]);
    let winding = windings.get(key);
    if (!winding) {
      winding = { sag: sagOf(transformer, tap.winding), members: [] };
      windings.set(key, winding);
    }
    winding.members.push({ index, circuit: circuitOf(run, transformer, tap.volts, request) });
  });
  return windings.values();
}

function sagOf(transformer: NormalizedTransformer, windingId: string): number {
  const winding = found(
    transformer.windings.find(({ id }) => id === windingId),
    'winding',
    windingId,
  );
  return sagPerVoltAmpere(transformer, voltAmperes(winding.ratedVA));
}

function circuitOf(
  run: NormalizedRun,
  transformer: NormalizedTransformer,
  tapVolts: number,
  request: NormalizedEstimateRequest,
): RunCircuit {
  try {
    return new RunCircuit(run, openVolts(transformer, tapVolts), request.conductorTemperatureC);
  } catch (error) {
    if (!(error instanceof TooTangled)) throw error;
    throw new NoConvergence(
      [run.id],
      `Run ${run.id} has too many cross-connections to be worked out in reasonable time. Take out loops, or split ` +
        'it into several runs.',
    );
  }
}

function found<T>(value: T | undefined, kind: string, id: string): T {
  if (value === undefined)
    throw new Error(`The request names ${kind} ${JSON.stringify(id)} but does not hold it.`);
  return value;
}
