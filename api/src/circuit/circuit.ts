import type { NormalizedRun } from '@lampwright/geometry/estimate';
import { type Volts, volts } from '@lampwright/geometry/units';
import { NetworkFactor } from './factor.js';
import { buildLoads, evaluateLoads, type LoadTable, leastChord } from './loads.js';
import { buildNetwork, type Network, SOURCE, UNREACHED } from './network.js';
import { planElimination } from './ordering.js';

/**
 * One run as equations. The unknown of each node is its drop x below the terminal, not its volts: small drops keep
 * all their digits, and everything in the linear system is positive.
 */
export class RunCircuit {
  readonly network: Network;
  readonly loads: LoadTable;
  readonly nodeOfFixture: Int32Array;
  readonly factor: NetworkFactor;
  /** Drop by node, volts below the terminal. */
  readonly drop: Float64Array;
  /** The least drop that is proven so far: the highest answer lies at or below terminal − floor. */
  readonly floor: Float64Array;
  readonly nodeVolts: Float64Array;
  readonly nodeAmps: Float64Array;
  readonly nodeSlope: Float64Array;
  readonly atSource = { amps: 0, slope: 0 };
  private readonly excess: Float64Array;
  /** Work space: what a step takes off, and how it follows the terminal. */
  readonly step: Float64Array;
  readonly follow: Float64Array;

  /** Throws TooTangled for a network that would take too long to factorise. */
  constructor(
    readonly run: NormalizedRun,
    readonly open: Volts,
    readonly temperatureC: number,
  ) {
    const network = buildNetwork(run, temperatureC);
    const { nodeCount, edgeLow, edgeHigh, edgeSiemens } = network;
    this.network = network;
    this.nodeOfFixture = Int32Array.from(run.fixtures, ({ at }) => network.nodeOf.get(at) ?? UNREACHED);
    this.loads = buildLoads(run, this.nodeOfFixture, open, temperatureC);
    const plan = planElimination(nodeCount, edgeLow, edgeHigh);
    this.factor = new NetworkFactor(nodeCount, edgeLow, edgeHigh, edgeSiemens, plan);
    this.drop = new Float64Array(nodeCount);
    this.floor = new Float64Array(nodeCount);
    this.nodeVolts = new Float64Array(nodeCount);
    this.nodeAmps = new Float64Array(nodeCount);
    this.nodeSlope = new Float64Array(nodeCount);
    this.excess = new Float64Array(nodeCount);
    this.step = new Float64Array(nodeCount);
    this.follow = new Float64Array(nodeCount);
  }

  /** Volts of a node number, SOURCE and UNREACHED included. */
  voltsAt(node: number, share: number): Volts {
    if (node === UNREACHED) return volts(0);
    return volts(node === SOURCE ? share * this.open : share * this.open - this.drop[node]!);
  }

  /** Amps at the terminals, as the sum of all loads. */
  get amps(): number {
    let sum = this.atSource.amps;
    for (let i = 0; i < this.network.nodeCount; i++) sum += this.nodeAmps[i]!;
    return sum;
  }

  /**
   * Currents and slopes at the given drops, `share` of the open volts being left at the terminal. Returns whether
   * all loads are on parts that bend upward, or null where some volts would not be above 0.
   */
  evaluate(drop: Float64Array, share: number): boolean | null {
    const terminal = share * this.open;
    if (!(terminal > 0)) return null;
    for (let i = 0; i < drop.length; i++) {
      const u = terminal - drop[i]!;
      if (!(u > 0)) return null;
      this.nodeVolts[i] = u;
    }
    return evaluateLoads(this.loads, this.nodeVolts, terminal, this.nodeAmps, this.nodeSlope, this.atSource);
  }

  /** Amps by which Kirchhoff's law is missed at each node, at the drops and currents evaluated last, into `out`. */
  mismatch(out: Float64Array): void {
    const { edgeLow, edgeHigh, edgeSiemens, toSource } = this.network;
    const { drop, nodeAmps } = this;
    for (let i = 0; i < drop.length; i++) out[i] = toSource[i]! * drop[i]! - nodeAmps[i]!;
    for (let e = 0; e < edgeLow.length; e++) {
      const low = edgeLow[e]!;
      const high = edgeHigh[e]!;
      const amps = edgeSiemens[e]! * (drop[low]! - drop[high]!);
      out[low]! += amps;
      out[high]! -= amps;
    }
  }

  /** Factorises cables plus the given load slopes by node; false if that is not positive definite. */
  factorise(slope: Float64Array): boolean {
    const { toSource } = this.network;
    for (let i = 0; i < slope.length; i++) this.excess[i] = toSource[i]! + slope[i]!;
    return this.factor.refactor(this.excess);
  }

  /** Each load as the conductance i/u that it shows at the volts evaluated last, into nodeSlope. */
  slopesAsConductances(share: number): void {
    const { nodeSlope, nodeAmps, nodeVolts, atSource } = this;
    for (let i = 0; i < nodeSlope.length; i++) nodeSlope[i] = nodeAmps[i]! / nodeVolts[i]!;
    atSource.slope = atSource.amps / (share * this.open);
  }

  /** Lower bounds of the loads' chord slopes from the answer up to the proven upper bound, into nodeSlope. */
  slopesAsLeastChords(share: number, topShare: number): void {
    const { loads, nodeSlope, nodeVolts, atSource } = this;
    nodeSlope.fill(0);
    atSource.slope = 0;
    for (let row = 0; row < loads.count; row++) {
      const node = loads.node[row]!;
      const many = loads.quantity[row]!;
      if (node === SOURCE) {
        atSource.slope += many * leastChord(loads, row, share * this.open, topShare * this.open);
      } else {
        const top = topShare * this.open - this.floor[node]!;
        nodeSlope[node]! += many * leastChord(loads, row, nodeVolts[node]!, top);
      }
    }
  }

  /**
   * How the run's amps rise per volt of its terminal when the loads have the slopes in nodeSlope, which must be
   * factorised. Leaves in `follow` how far each node's drop follows the terminal.
   */
  inputSiemens(): number {
    const { nodeSlope, follow } = this;
    this.factor.solve(nodeSlope, follow);
    let sum = this.atSource.slope;
    for (let i = 0; i < follow.length; i++) sum += nodeSlope[i]! * (1 - follow[i]!);
    return sum;
  }
}

/** A run with its volts: `share` of its winding's open volts is left at its terminal. */
export interface SolvedRun {
  readonly circuit: RunCircuit;
  readonly share: number;
  readonly sag: number;
}
