import type { NormalizedRun } from '@lampwright/geometry/estimate';
import { celsius, meters, ohms } from '@lampwright/geometry/units';
import { loopOhms } from './conductors.js';

/** Stands for the run's source in arrays of node numbers; the source's volts are given, so it is no unknown. */
export const SOURCE = -1;
/** Stands for a node that no cable joins to the source. */
export const UNREACHED = -2;

/**
 * A run's cables as a graph of the reached nodes, numbered 0 … nodeCount − 1 outward from the source (breadth
 * first). Parallel cables are one edge; cables at the source are conductances to it, in `toSource`.
 */
export interface Network {
  readonly nodeCount: number;
  /** SOURCE, UNREACHED (also for a name that no cable knows) or a node number. */
  nodeOf(name: string): number;
  /** The name of a node number. */
  nameOf(node: number): string;
  readonly cableFrom: Int32Array;
  readonly cableTo: Int32Array;
  /** Siemens of each cable's loop, in the order of the run's cables. */
  readonly cableSiemens: Float64Array;
  /** Edges between unknowns: lower number, higher number, siemens. */
  readonly edgeLow: Int32Array;
  readonly edgeHigh: Int32Array;
  readonly edgeSiemens: Float64Array;
  readonly toSource: Float64Array;
  /** Ohms from each node back to the source along one path: an upper bound of what all paths together have. */
  readonly pathOhms: Float64Array;
}

export function buildNetwork(run: NormalizedRun, temperatureC: number): Network {
  const { cables } = run;
  const count = cables.length;
  const numberOf = new Map<string, number>([[run.source, 0]]);
  const from = new Int32Array(count);
  const to = new Int32Array(count);
  const siemens = new Float64Array(count);
  const temperature = celsius(temperatureC);
  const register = (name: string): number => {
    const known = numberOf.get(name);
    if (known !== undefined) return known;
    numberOf.set(name, numberOf.size);
    return numberOf.size - 1;
  };
  for (let k = 0; k < count; k++) {
    const cable = cables[k]!;
    from[k] = register(cable.from);
    to[k] = register(cable.to);
    siemens[k] =
      1 / loopOhms(cable.conductor, meters(cable.lengthMeters), ohms(cable.extraOhms), temperature);
  }
  const incidence = incidentCables(numberOf.size, from, to);
  const { numbering, reached, pathOhms } = numberOutward(numberOf.size, from, to, siemens, incidence);
  const edges = mergeEdges(reached, from, to, siemens, numbering, incidence);
  for (let k = 0; k < count; k++) {
    from[k] = numbering[from[k]!]!;
    to[k] = numbering[to[k]!]!;
  }
  return {
    nodeCount: reached.length - 1,
    nodeOf: (name) => numbering[numberOf.get(name) ?? -1] ?? UNREACHED,
    nameOf: (node) => [...numberOf.keys()][reached[node + 1]!]!,
    pathOhms,
    cableFrom: from,
    cableTo: to,
    cableSiemens: siemens,
    ...edges,
  };
}

/** Cables by node, packed: those of node i are cable[start[i]] … cable[start[i + 1] − 1]. */
interface Incidence {
  readonly start: Int32Array;
  readonly cable: Int32Array;
}

function incidentCables(nodes: number, from: Int32Array, to: Int32Array): Incidence {
  const start = new Int32Array(nodes + 1);
  for (let k = 0; k < from.length; k++) {
    start[from[k]! + 1]!++;
    start[to[k]! + 1]!++;
  }
  for (let i = 0; i < nodes; i++) start[i + 1]! += start[i]!;
  const fill = start.slice(0, nodes);
  const cable = new Int32Array(2 * from.length);
  for (let k = 0; k < from.length; k++) {
    cable[fill[from[k]!]!++] = k;
    cable[fill[to[k]!]!++] = k;
  }
  return { start, cable };
}

/** `reached` lists nodes in the order of the walk, the source (node 0) first. */
function numberOutward(
  nodes: number,
  from: Int32Array,
  to: Int32Array,
  siemens: Float64Array,
  { start, cable }: Incidence,
) {
  const numbering = new Int32Array(nodes).fill(UNREACHED);
  const walk = new Int32Array(nodes);
  const pathOhms = new Float64Array(nodes);
  let length = 1;
  numbering[0] = SOURCE;
  for (let head = 0; head < length; head++) {
    const node = walk[head]!;
    for (let p = start[node]!; p < start[node + 1]!; p++) {
      const k = cable[p]!;
      const other = from[k]! === node ? to[k]! : from[k]!;
      if (numbering[other]! !== UNREACHED) continue;
      numbering[other] = length - 1;
      pathOhms[length - 1] = (head === 0 ? 0 : pathOhms[head - 1]!) + 1 / siemens[k]!;
      walk[length++] = other;
    }
  }
  return { numbering, reached: walk.subarray(0, length), pathOhms: pathOhms.subarray(0, length - 1) };
}

function mergeEdges(
  reached: Int32Array,
  from: Int32Array,
  to: Int32Array,
  siemens: Float64Array,
  numbering: Int32Array,
  { start, cable }: Incidence,
) {
  const nodeCount = reached.length - 1;
  const low = new Int32Array(from.length);
  const high = new Int32Array(from.length);
  const weight = new Float64Array(from.length);
  const toSource = new Float64Array(nodeCount);
  const edgeTo = new Int32Array(nodeCount).fill(-1);
  let edges = 0;
  for (let i = 0; i < nodeCount; i++) {
    const node = reached[i + 1]!;
    const firstOfNode = edges;
    for (let p = start[node]!; p < start[node + 1]!; p++) {
      const k = cable[p]!;
      const j = numbering[from[k]! === node ? to[k]! : from[k]!]!;
      if (j === SOURCE) toSource[i]! += siemens[k]!;
      if (j <= i) continue;
      const known = edgeTo[j]!;
      if (known >= firstOfNode) {
        weight[known]! += siemens[k]!;
        continue;
      }
      edgeTo[j] = edges;
      low[edges] = i;
      high[edges] = j;
      weight[edges++] = siemens[k]!;
    }
  }
  return {
    edgeLow: low.subarray(0, edges),
    edgeHigh: high.subarray(0, edges),
    edgeSiemens: weight.subarray(0, edges),
    toSource,
  };
}
