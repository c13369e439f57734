import type { NormalizedRun } from '@lampwright/geometry/estimate';
import { type Volts, volts } from '@lampwright/geometry/units';
import { NetworkFactor } from './factor.js';
import { buildLoads, evaluateLoads, type LoadTable, leastChord } from './loads.js';
import { buildNetwork, type Network, SOURCE, UNREACHED } from './network.js';
import { planElimination } from './ordering.js';

/**
 * One run as equations. Each node has both its drop below the terminal and its volts, moved by the same steps:
 * where the drop is small it keeps all its digits, and so do volts of next to nothing at the end of an overloaded
 * chain. A difference of two doubles would lose either the one or the other.
 */
export class RunCircuit {
  readonly network: Network;
  readonly loads: LoadTable;
  readonly nodeOfFixture: Int32Array;
  readonly factor: NetworkFactor;
  /** By node: volts below the terminal, and volts. */
  readonly drop: Float64Array;
  readonly nodeVolts: Float64Array;
  /** The highest answer's drop is proven to be at least this, its volts at most that. */
  readonly leastDrop: Float64Array;
  readonly mostVolts: Float64Array;
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
    this.nodeOfFixture = new Int32Array(run.fixtures.length);
    for (let i = 0; i < run.fixtures.length; i++) this.nodeOfFixture[i] = network.nodeOf(run.fixtures[i]!.at);
    this.loads = buildLoads(run, this.nodeOfFixture, open, temperatureC);
    const plan = planElimination(nodeCount, edgeLow, edgeHigh);
    this.factor = new NetworkFactor(nodeCount, edgeLow, edgeHigh, edgeSiemens, plan);
    this.drop = new Float64Array(nodeCount);
    this.nodeVolts = new Float64Array(nodeCount);
    this.leastDrop = new Float64Array(nodeCount);
    this.mostVolts = new Float64Array(nodeCount).fill(open);
    this.nodeAmps = new Float64Array(nodeCount);
    this.nodeSlope = new Float64Array(nodeCount);
    this.excess = new Float64Array(nodeCount);
    this.step = new Float64Array(nodeCount);
    this.follow = new Float64Array(nodeCount);
  }

  /** Volts of a node number, SOURCE and UNREACHED included. */
  voltsAt(node: number, share: number): Volts {
    if (node === UNREACHED) return volts(0);
    return volts(node === SOURCE ? share * this.open : this.nodeVolts[node]!);
  }

  /** Amps at the terminals, as the sum of all loads. */
  get amps(): number {
    let sum = this.atSource.amps;
    for (let i = 0; i < this.network.nodeCount; i++) sum += this.nodeAmps[i]!;
    return sum;
  }

  /** Sets drops and volts to their proven bounds. */
  startAtBounds(): void {
    this.drop.set(this.leastDrop);
    this.nodeVolts.set(this.mostVolts);
  }

  /**
   * Currents and slopes at the present volts, `share` of the open volts being left at the terminal. Returns whether
   * all loads are on parts that bend upward, or null where some volts are below 0.
   */
  evaluate(share: number): boolean | null {
    const { nodeVolts } = this;
    if (!(share > 0)) return null;
    for (let i = 0; i < nodeVolts.length; i++) if (!(nodeVolts[i]! >= 0)) return null;
    return evaluateLoads(
      this.loads,
      nodeVolts,
      share * this.open,
      this.nodeAmps,
      this.nodeSlope,
      this.atSource,
    );
  }

  /** Volts from one node down to another, by whichever of drops and volts holds more digits there. */
  fall(from: number, to: number): number {
    const { drop, nodeVolts } = this;
    if (from < 0) return to < 0 ? 0 : drop[to]!;
    if (to < 0) return -drop[from]!;
    return drop[from]! < nodeVolts[from]! ? drop[to]! - drop[from]! : nodeVolts[from]! - nodeVolts[to]!;
  }

  /** Amps by which Kirchhoff's law is missed at each node, at the present volts and the currents evaluated last. */
  mismatch(out: Float64Array): void {
    const { edgeLow, edgeHigh, edgeSiemens, toSource } = this.network;
    const { drop, nodeAmps } = this;
    for (let i = 0; i < drop.length; i++) out[i] = toSource[i]! * drop[i]! - nodeAmps[i]!;
    for (let e = 0; e < edgeLow.length; e++) {
      const low = edgeLow[e]!;
      const high = edgeHigh[e]!;
      const amps = edgeSiemens[e]! * this.fall(low, high);
      out[low]! -= amps;
      out[high]! += amps;
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
    // At 0 V, reached only by underflow, every load is on the plain part where its slope is its conductance.
    for (let i = 0; i < nodeSlope.length; i++)
      if (nodeVolts[i]! > 0) nodeSlope[i] = nodeAmps[i]! / nodeVolts[i]!;
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
        nodeSlope[node]! += many * leastChord(loads, row, nodeVolts[node]!, this.mostVolts[node]!);
      }
    }
  }

  /** Solves the network of plain conductances in nodeSlope, which must be factorised, as the new proven bounds. */
  lowerBounds(share: number): void {
    const { leastDrop, mostVolts, nodeSlope, step } = this;
    const terminal = share * this.open;
    for (let i = 0; i < step.length; i++) step[i] = nodeSlope[i]! * terminal;
    this.factor.solve(step, leastDrop);
    for (let i = 0; i < step.length; i++) step[i] = this.network.toSource[i]! * terminal;
    this.factor.solve(step, mostVolts);
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
