import {
  type EstimateAnswer,
  type EstimateRequest,
  type Load,
  normalizeEstimateRequest,
} from '@lampwright/geometry/estimate';
import { solveEstimate } from './solve.js';

/** A cable given by its loop ohms alone. */
export function wire(id: string, from: string, to: string, loopOhms: number) {
  return { id, from, to, lengthMeters: 0, conductor: { ohmsPerKm: 1 }, extraOhms: loopOhms };
}

/** A fixture without lead whose window is as wide as it goes. */
export function fixtureAt(id: string, at: string, load: Load) {
  return { id, at, load, window: { minVolts: 1e-9, maxVolts: 60 } };
}

type Run = EstimateRequest['runs'][number];
type Transformer = EstimateRequest['transformers'][number];

/** One run on a one-tap transformer at 20 °C; parts may be replaced. */
export function oneRun(
  volts: number,
  cables: Run['cables'],
  fixtures: Run['fixtures'],
  transformer: Partial<Transformer> = {},
): EstimateRequest {
  return {
    conductorTemperatureC: 20,
    transformers: [
      { id: 'T', ratedVA: 600, taps: [{ id: 'tap', volts }], commons: [{ id: 'C' }], ...transformer },
    ],
    runs: [{ id: 'R', transformerId: 'T', tapId: 'tap', commonId: 'C', source: 's', cables, fixtures }],
  };
}

/** A chain s–n1–n2–… of sections by loop ohms with a load at each node's end. */
export function chain(volts: number, sections: readonly number[], loads: readonly Load[]): EstimateRequest {
  const node = (i: number) => (i === 0 ? 's' : `n${i}`);
  return oneRun(
    volts,
    sections.map((loopOhms, i) => wire(`k${i + 1}`, node(i), node(i + 1), loopOhms)),
    loads.map((load, i) => fixtureAt(`f${i + 1}`, node(i + 1), load)),
  );
}

export function solve(request: EstimateRequest): EstimateAnswer {
  return solveEstimate(normalizeEstimateRequest(request));
}

export function fixtureVolts(answer: EstimateAnswer): number[] {
  return answer.fixtures.map(({ volts }) => volts);
}
