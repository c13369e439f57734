import type { NormalizedEstimateRequest } from '@lampwright/geometry/estimate';
import type { SolvedRun } from './circuit.js';
import { shareLeft } from './supply.js';

/** A dead short at the node of a run that is farthest from the source, with nothing else on the winding. */
export interface FarthestShort {
  readonly node: string;
  readonly amps: number;
  readonly commonId: string;
  readonly limitAmps: number;
}

/**
 * What such a short would draw: farthest is the node with the highest loop resistance back to the source (all
 * paths of a mesh together), and the winding sags under the short as under any load. Null where the run reaches no
 * node or its common has no limit to compare with. Uses up the circuit's factorisation.
 */
export function farthestShort(
  { circuit, sag }: SolvedRun,
  request: NormalizedEstimateRequest,
): FarthestShort | null {
  const { run, network, open, step, nodeSlope } = circuit;
  const transformer = request.transformers.find(({ id }) => id === run.transformerId);
  const common = transformer?.commons.find(({ id }) => id === run.commonId);
  if (common?.limitAmps === undefined || network.nodeCount === 0) return null;
  nodeSlope.fill(0);
  if (!circuit.factorise(nodeSlope)) return null;
  circuit.factor.inverseDiagonal(step);
  let farthest = 0;
  for (let node = 1; node < step.length; node++) if (step[node]! > step[farthest]!) farthest = node;
  const ohms = step[farthest]!;
  const amps = (shareLeft(sag, open ** 2 / ohms) * open) / ohms;
  for (const [name, node] of network.nodeOf) {
    if (node === farthest) return { node: name, amps, commonId: common.id, limitAmps: common.limitAmps };
  }
  return null;
}
