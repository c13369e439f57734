/**
 * Which unknown is eliminated when, and which others each one touches by then: the pattern of the factor. Minimum
 * degree keeps it sparse; on a tree it eliminates from the leaves to the source and touches one neighbour each.
 */
export interface Elimination {
  /** position[node]: when the node is eliminated. */
  readonly position: Int32Array;
  /** Column p of the factor touches positions row[start[p]] … row[start[p + 1] − 1], ascending, all above p. */
  readonly start: Int32Array;
  readonly row: Int32Array;
}

/**
 * More multiplications in one factorisation, or more entries merged while planning it, would hold a server for
 * seconds. Only a random tangle of thousands of cross-connections comes near: a square grid of 5,000 nodes needs
 * under a hundredth of either.
 */
const MAX_MULTIPLICATIONS = 1e9;
const MAX_MERGED = 1e8;

export class TooTangled extends Error {}

/** Nodes must be numbered outward from the source, as `buildNetwork` does. Throws TooTangled. */
export function planElimination(nodeCount: number, edgeLow: Int32Array, edgeHigh: Int32Array): Elimination {
  return planForest(nodeCount, edgeLow, edgeHigh) ?? planMinimumDegree(nodeCount, edgeLow, edgeHigh);
}

/** Where each node has at most one neighbour nearer the source, eliminating outermost first touches only that one. */
function planForest(nodeCount: number, edgeLow: Int32Array, edgeHigh: Int32Array): Elimination | null {
  const parent = new Int32Array(nodeCount).fill(-1);
  for (let e = 0; e < edgeLow.length; e++) {
    const child = edgeHigh[e]!;
    if (parent[child] !== -1) return null;
    parent[child] = edgeLow[e]!;
  }
  const position = new Int32Array(nodeCount);
  const start = new Int32Array(nodeCount + 1);
  const row = new Int32Array(edgeLow.length);
  let filled = 0;
  for (let p = 0; p < nodeCount; p++) {
    const node = nodeCount - 1 - p;
    position[node] = p;
    if (parent[node] !== -1) row[filled++] = nodeCount - 1 - parent[node]!;
    start[p + 1] = filled;
  }
  return { position, start, row };
}

function planMinimumDegree(nodeCount: number, edgeLow: Int32Array, edgeHigh: Int32Array): Elimination {
  const neighbours = adjacency(nodeCount, edgeLow, edgeHigh);
  const queue = new DegreeQueue(neighbours.map((list) => list.length));
  const position = new Int32Array(nodeCount).fill(-1);
  const columns: number[][] = [];
  const mark = new Int32Array(nodeCount).fill(-1);
  let stamp = 0;
  let multiplications = 0;
  let merged = 0;
  const inner: number[] = [];
  /** Takes eliminated nodes out of a list and marks the others with the stamp. */
  const clean = (list: number[]): void => {
    let kept = 0;
    for (let i = 0; i < list.length; i++) {
      const node = list[i]!;
      if (position[node] !== -1) continue;
      mark[node] = stamp;
      list[kept++] = node;
    }
    list.length = kept;
  };
  for (let p = 0; p < nodeCount; ) {
    const node = queue.takeLeast();
    position[node] = p++;
    // The list is not needed as one of neighbours any more: it becomes the node's column.
    const touched = neighbours[node]!;
    stamp++;
    clean(touched);
    columns.push(touched);
    const allJoined = touched.length === nodeCount - p;
    multiplications += touched.length ** 2 * (allJoined ? touched.length / 3 : 1);
    if (multiplications > MAX_MULTIPLICATIONS || merged > MAX_MERGED) throw new TooTangled();
    if (allJoined) {
      finishClique(touched, p, position, columns);
      break;
    }
    if (touched.length === 1) {
      // The dead entry stays in the neighbour's list; lists are cleaned when they are next merged or read.
      const only = touched[0]!;
      queue.move(only, queue.degree[only]! - 1);
      continue;
    }
    inner.length = 0;
    for (let t = 0; t < touched.length; t++) {
      const one = touched[t]!;
      const list = neighbours[one]!;
      merged += list.length + touched.length;
      stamp++;
      clean(list);
      mark[one] = stamp;
      for (let i = 0; i < touched.length; i++) {
        const other = touched[i]!;
        if (mark[other] !== stamp) list.push(other);
      }
      if (list.length === touched.length - 1) inner.push(one);
    }
    // Those with no neighbour outside can go at once: all of theirs are joined already, so nothing is filled in.
    for (let t = 0; t < inner.length; t++) {
      const one = inner[t]!;
      queue.remove(one);
      position[one] = p++;
      clean(neighbours[one]!);
      columns.push(neighbours[one]!);
      multiplications += neighbours[one]!.length ** 2;
    }
    for (let t = 0; t < touched.length; t++) {
      const one = touched[t]!;
      if (position[one] === -1) queue.move(one, neighbours[one]!.length - inner.length);
    }
  }
  return { position, ...sortedPattern(nodeCount, columns, position) };
}

/** What is left is all joined to all: any order is as good as another, and no merging is needed. */
function finishClique(
  left: readonly number[],
  from: number,
  position: Int32Array,
  columns: number[][],
): void {
  for (let i = 0; i < left.length; i++) {
    position[left[i]!] = from + i;
    columns.push(left.slice(i + 1));
  }
}

function adjacency(nodeCount: number, edgeLow: Int32Array, edgeHigh: Int32Array): number[][] {
  const lists: number[][] = Array.from({ length: nodeCount }, () => []);
  for (let e = 0; e < edgeLow.length; e++) {
    lists[edgeLow[e]!]!.push(edgeHigh[e]!);
    lists[edgeHigh[e]!]!.push(edgeLow[e]!);
  }
  return lists;
}

/** Columns as ascending positions: gathering them by row and then by column again sorts without comparing. */
function sortedPattern(nodeCount: number, columns: readonly number[][], position: Int32Array) {
  const start = new Int32Array(nodeCount + 1);
  const rowStart = new Int32Array(nodeCount + 1);
  columns.forEach((column, p) => {
    start[p + 1] = start[p]! + column.length;
    for (const node of column) rowStart[position[node]! + 1]!++;
  });
  for (let r = 0; r < nodeCount; r++) rowStart[r + 1]! += rowStart[r]!;
  const rowFill = rowStart.slice(0, nodeCount);
  const columnOf = new Int32Array(start[nodeCount]!);
  columns.forEach((column, p) => {
    for (const node of column) columnOf[rowFill[position[node]!]!++] = p;
  });
  const fill = start.slice(0, nodeCount);
  const row = new Int32Array(start[nodeCount]!);
  for (let r = 0; r < nodeCount; r++) {
    for (let q = rowStart[r]!; q < rowStart[r + 1]!; q++) row[fill[columnOf[q]!]!++] = r;
  }
  return { start, row };
}

/** Nodes in doubly linked lists by degree, so that the least is found and moved in constant time. */
class DegreeQueue {
  readonly degree: Int32Array;
  private readonly head: Int32Array;
  private readonly next: Int32Array;
  private readonly previous: Int32Array;
  private least = 0;

  constructor(degrees: readonly number[]) {
    const count = degrees.length;
    this.degree = Int32Array.from(degrees);
    this.head = new Int32Array(count + 1).fill(-1);
    this.next = new Int32Array(count);
    this.previous = new Int32Array(count);
    for (let node = count - 1; node >= 0; node--) this.link(node);
  }

  takeLeast(): number {
    while (this.head[this.least] === -1) this.least++;
    const node = this.head[this.least]!;
    this.unlink(node);
    return node;
  }

  remove(node: number): void {
    this.unlink(node);
  }

  move(node: number, degree: number): void {
    if (degree === this.degree[node]) return;
    this.unlink(node);
    this.degree[node] = degree;
    this.link(node);
    if (degree < this.least) this.least = degree;
  }

  private link(node: number): void {
    const degree = this.degree[node]!;
    const first = this.head[degree]!;
    this.next[node] = first;
    this.previous[node] = -1;
    if (first !== -1) this.previous[first] = node;
    this.head[degree] = node;
  }

  private unlink(node: number): void {
    const before = this.previous[node]!;
    const after = this.next[node]!;
    if (before === -1) this.head[this.degree[node]!] = after;
    else this.next[before] = after;
    if (after !== -1) this.previous[after] = before;
  }
}
