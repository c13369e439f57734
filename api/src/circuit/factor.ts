import type { Elimination } from './ordering.js';

/**
 * Factorisation of a network's nodal equations. The matrix is a graph of conductances plus a diagonal: `excess`,
 * what each row sums to (conductance to the source, and the slopes of the loads). Eliminating a node turns its
 * neighbours into a mesh (the star–mesh transformation), so weights and excess are added up and never subtracted:
 * a micro-ohm beside hundreds of ohms loses no digits, as it would in the plain L·D·Lᵀ form of the same numbers.
 *
 * The pattern and all work space are made once; `refactor` and `solve` allocate nothing.
 */
export class NetworkFactor {
  private readonly start: Int32Array;
  private readonly row: Int32Array;
  private readonly position: Int32Array;
  /** Weights before any elimination, in the factor's pattern: zero where only elimination joins two nodes. */
  private readonly plain: Float64Array;
  private readonly weight: Float64Array;
  private readonly pivot: Float64Array;
  private readonly rest: Float64Array;
  private readonly work: Float64Array;
  private readonly right: Float64Array;
  private readonly cursor: Int32Array;
  private readonly firstWaiting: Int32Array;
  private readonly nextWaiting: Int32Array;

  constructor(
    private readonly nodeCount: number,
    edgeLow: Int32Array,
    edgeHigh: Int32Array,
    edgeSiemens: Float64Array,
    elimination: Elimination,
  ) {
    const { position, start, row } = elimination;
    this.position = position;
    this.start = start;
    this.row = row;
    this.plain = new Float64Array(row.length);
    this.weight = new Float64Array(row.length);
    this.pivot = new Float64Array(nodeCount);
    this.rest = new Float64Array(nodeCount);
    this.work = new Float64Array(nodeCount);
    this.right = new Float64Array(nodeCount);
    this.cursor = new Int32Array(nodeCount);
    this.firstWaiting = new Int32Array(nodeCount);
    this.nextWaiting = new Int32Array(nodeCount);
    for (let e = 0; e < edgeLow.length; e++) {
      const a = position[edgeLow[e]!]!;
      const b = position[edgeHigh[e]!]!;
      this.plain[this.slotOf(Math.min(a, b), Math.max(a, b))] = edgeSiemens[e]!;
    }
  }

  /** Weights and pivots held: what one factorisation or solution works through at the least. */
  get entries(): number {
    return this.nodeCount + this.row.length;
  }

  private slotOf(column: number, row: number): number {
    let low = this.start[column]!;
    let high = this.start[column + 1]! - 1;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (this.row[middle]! < row) low = middle + 1;
      else high = middle;
    }
    return low;
  }

  /**
   * Factorises with the given excess by node. False if the matrix is not positive definite (or not finite): then
   * the factor must not be used.
   */
  refactor(excess: Float64Array): boolean {
    const { nodeCount, start, row, plain, weight, pivot, rest, work, cursor, firstWaiting, nextWaiting } =
      this;
    const { position } = this;
    for (let node = 0; node < nodeCount; node++) rest[position[node]!] = excess[node]!;
    firstWaiting.fill(-1);
    for (let j = 0; j < nodeCount; j++) {
      const begin = start[j]!;
      const end = start[j + 1]!;
      let restOfJ = rest[j]!;
      for (let p = begin; p < end; p++) work[row[p]!] = plain[p]!;
      let k = firstWaiting[j]!;
      while (k !== -1) {
        const following = nextWaiting[k]!;
        const at = cursor[k]!;
        const last = start[k + 1]!;
        const share = weight[at]! / pivot[k]!;
        restOfJ += share * rest[k]!;
        for (let p = at + 1; p < last; p++) work[row[p]!]! += share * weight[p]!;
        if (at + 1 < last) {
          cursor[k] = at + 1;
          const waitFor = row[at + 1]!;
          nextWaiting[k] = firstWaiting[waitFor]!;
          firstWaiting[waitFor] = k;
        }
        k = following;
      }
      rest[j] = restOfJ;
      let sum = restOfJ;
      for (let p = begin; p < end; p++) {
        const w = work[row[p]!]!;
        weight[p] = w;
        sum += w;
      }
      if (!(sum > 0 && sum < Number.POSITIVE_INFINITY)) return false;
      pivot[j] = sum;
      if (begin < end) {
        cursor[j] = begin;
        const waitFor = row[begin]!;
        nextWaiting[j] = firstWaiting[waitFor]!;
        firstWaiting[waitFor] = j;
      }
    }
    return true;
  }

  /** Solves for the right-hand side by node into `out`, which may be the same array. */
  solve(rightHandSide: Float64Array, out: Float64Array): void {
    const { nodeCount, start, row, weight, pivot, right, position } = this;
    for (let node = 0; node < nodeCount; node++) right[position[node]!] = rightHandSide[node]!;
    for (let j = 0; j < nodeCount; j++) {
      const value = right[j]! / pivot[j]!;
      right[j] = value;
      for (let p = start[j]!; p < start[j + 1]!; p++) right[row[p]!]! += weight[p]! * value;
    }
    for (let j = nodeCount - 1; j >= 0; j--) {
      let sum = 0;
      for (let p = start[j]!; p < start[j + 1]!; p++) sum += weight[p]! * right[row[p]!]!;
      right[j]! += sum / pivot[j]!;
    }
    for (let node = 0; node < nodeCount; node++) out[node] = right[position[node]!]!;
  }

  /**
   * The diagonal of the inverse into `out` by node: with the excess that of the cables alone, each node's loop
   * resistance back to the source. Works down the factor's own pattern (Takahashi's recurrence), so it costs no
   * more than a factorisation.
   */
  inverseDiagonal(out: Float64Array): void {
    const { nodeCount, start, row, weight, pivot, position } = this;
    const inverse = new Float64Array(row.length);
    const diagonal = new Float64Array(nodeCount);
    const share = new Float64Array(nodeCount);
    const sum = new Float64Array(nodeCount);
    const owner = new Int32Array(nodeCount).fill(-1);
    for (let j = nodeCount - 1; j >= 0; j--) {
      const begin = start[j]!;
      const end = start[j + 1]!;
      for (let p = begin; p < end; p++) {
        const r = row[p]!;
        owner[r] = j;
        share[r] = weight[p]! / pivot[j]!;
        sum[r] = 0;
      }
      const lastRow = begin < end ? row[end - 1]! : -1;
      for (let p = begin; p < end; p++) {
        const k = row[p]!;
        const shareOfK = share[k]!;
        let sumOfK = shareOfK * diagonal[k]!;
        const stop = start[k + 1]!;
        for (let q = start[k]!; q < stop; q++) {
          const r = row[q]!;
          if (r > lastRow) break;
          if (owner[r] !== j) continue;
          sum[r]! += shareOfK * inverse[q]!;
          sumOfK += share[r]! * inverse[q]!;
        }
        sum[k]! += sumOfK;
      }
      let own = 1 / pivot[j]!;
      for (let p = begin; p < end; p++) {
        const r = row[p]!;
        inverse[p] = sum[r]!;
        own += share[r]! * sum[r]!;
      }
      diagonal[j] = own;
    }
    for (let node = 0; node < nodeCount; node++) out[node] = diagonal[position[node]!]!;
  }
}
