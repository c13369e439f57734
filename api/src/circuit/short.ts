import type { NormalizedEstimateRequest } from '@lampwright/geometry/estimate';
import type { SolvedRun } from './circuit.js';
import { shareLeft } from './supply.js';

/** A short must draw this many times the common's limit for its breaker to trip reliably. */
const TRIPPING_FACTOR = 1.5;

/** A dead short at the node of a run that is farthest from the source, with nothing else on the winding. */
export interface WeakShort {
  readonly node: string;
  readonly amps: number;
  readonly commonId: string;
  readonly limitAmps: number;
}

/**
 * The short that draws too little to trip the common's breaker, or null. Farthest is the node with the highest loop
 * resistance back to the source (all paths of a mesh together); the winding sags under the short as under any load.
 * Null too where the run reaches no node or its common has no limit. Uses up the circuit's factorisation.
 */
export function weakShort({ circuit, sag }: SolvedRun, request: NormalizedEstimateRequest): WeakShort | null {
  const { run, network, open, step, nodeSlope } = circuit;
  const transformer = request.transformers.find(({ id }) => id === run.transformerId);
  const common = transformer?.commons.find(({ id }) => id === run.commonId);
  if (common?.limitAmps === undefined || network.nodeCount === 0) return null;
  const needed = TRIPPING_FACTOR * common.limitAmps;
  const drawn = (ohms: number) => (shareLeft(sag, open ** 2 / ohms) * open) / ohms;
  // One path alone is never better than all: where even the worst of these trips, nothing more need be worked out.
  if (drawn(highest(network.pathOhms).value) >= needed) return null;
  nodeSlope.fill(0);
  if (!circuit.factorise(nodeSlope)) return null;
  circuit.factor.inverseDiagonal(step);
  const { index, value } = highest(step);
  const amps = drawn(value);
  if (amps >= needed) return null;
  return { node: network.nameOf(index), amps, commonId: common.id, limitAmps: common.limitAmps };
}

function highest(values: Float64Array): { index: number; value: number } {
  let index = 0;
  for (let i = 1; i < values.length; i++) if (values[i]! > values[index]!) index = i;
  return { index, value: values[index]! };
}
