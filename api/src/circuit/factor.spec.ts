import { all, create, type Matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { NetworkFactor } from './factor.js';
import { planElimination, TooTangled } from './ordering.js';
import { seeded } from './random.testkit.js';

const math = create(all!);

interface Graph {
  readonly nodes: number;
  readonly low: Int32Array;
  readonly high: Int32Array;
  readonly siemens: Float64Array;
}

function graphOf(nodes: number, pairs: readonly (readonly [number, number])[], random: () => number): Graph {
  const unique = new Map(
    pairs.map(([a, b]) => [`${Math.min(a, b)} ${Math.max(a, b)}`, [Math.min(a, b), Math.max(a, b)]]),
  );
  const edges = [...unique.values()].filter(([a, b]) => a !== b);
  return {
    nodes,
    low: Int32Array.from(edges, ([a]) => a!),
    high: Int32Array.from(edges, ([, b]) => b!),
    siemens: Float64Array.from(edges, () => 0.1 + 10 * random()),
  };
}

function randomGraph(seed: number): Graph {
  const random = seeded(seed);
  const nodes = 2 + Math.floor(40 * random());
  const pairs: [number, number][] = [];
  for (let i = 1; i < nodes; i++) pairs.push([Math.floor(random() * i), i]);
  const extra = Math.floor(random() * nodes);
  for (let e = 0; e < extra; e++) pairs.push([Math.floor(random() * nodes), Math.floor(random() * nodes)]);
  return graphOf(nodes, pairs, random);
}

function grid(width: number): Graph {
  const pairs: [number, number][] = [];
  for (let i = 0; i < width * width; i++) {
    if (i % width) pairs.push([i - 1, i]);
    if (i >= width) pairs.push([i - width, i]);
  }
  return graphOf(width * width, pairs, seeded(1));
}

const factorOf = ({ nodes, low, high, siemens }: Graph) =>
  new NetworkFactor(nodes, low, high, siemens, planElimination(nodes, low, high));

function denseMatrix({ nodes, low, high, siemens }: Graph, excess: Float64Array): Matrix {
  const rows = Array.from({ length: nodes }, (_, i) =>
    Array.from({ length: nodes }, (__, j) => (i === j ? excess[i]! : 0)),
  );
  for (let e = 0; e < low.length; e++) {
    const [a, b, g] = [low[e]!, high[e]!, siemens[e]!];
    rows[a]![a]! += g;
    rows[b]![b]! += g;
    rows[a]![b]! -= g;
    rows[b]![a]! -= g;
  }
  return math.matrix(rows);
}

describe('NetworkFactor', () => {
  it.each(Array.from({ length: 40 }, (_, i) => i + 1))(
    'solves and inverts as a dense LU does: seed %i',
    (seed) => {
      const graph = randomGraph(seed);
      const random = seeded(seed + 1000);
      const excess = Float64Array.from({ length: graph.nodes }, () => 0.01 + random());
      const right = Float64Array.from({ length: graph.nodes }, () => random() - 0.5);
      const factor = factorOf(graph);
      expect(factor.refactor(excess)).toBe(true);
      const solution = new Float64Array(graph.nodes);
      factor.solve(right, solution);
      const dense = denseMatrix(graph, excess);
      const wanted = (math.lusolve(dense, [...right]) as Matrix).toArray().flat() as number[];
      solution.forEach((value, i) => {
        expect(Math.abs(value - wanted[i]!)).toBeLessThan(1e-11);
      });
      const diagonal = new Float64Array(graph.nodes);
      factor.inverseDiagonal(diagonal);
      const inverse = math.inv(dense).toArray() as number[][];
      diagonal.forEach((value, i) => {
        expect(Math.abs(value - inverse[i]![i]!)).toBeLessThan(1e-10);
      });
    },
  );

  it('tells when the matrix is not positive definite', () => {
    const factor = factorOf(randomGraph(3));
    const nodes = randomGraph(3).nodes;
    expect(factor.refactor(new Float64Array(nodes).fill(0.1))).toBe(true);
    expect(factor.refactor(new Float64Array(nodes))).toBe(false);
    expect(factor.refactor(new Float64Array(nodes).fill(-0.1))).toBe(false);
    expect(factor.refactor(new Float64Array(nodes).fill(Number.NaN))).toBe(false);
    const one = new Float64Array(nodes).fill(0.001);
    one[1] = -1;
    expect(factor.refactor(one)).toBe(false);
  });

  it('keeps digits that subtraction would lose: a micro-ohm chain behind 400 Ω', () => {
    const nodes = 50;
    const low = Int32Array.from({ length: nodes - 1 }, (_, i) => i);
    const high = low.map((i) => i + 1);
    const factor = factorOf({ nodes, low, high, siemens: new Float64Array(nodes - 1).fill(1e6) });
    const excess = new Float64Array(nodes);
    excess[0] = 1 / 400;
    expect(factor.refactor(excess)).toBe(true);
    const solution = new Float64Array(nodes);
    const right = new Float64Array(nodes);
    right[nodes - 1] = 1;
    factor.solve(right, solution);
    expect(solution[nodes - 1]! / (400 + 49e-6)).toBeCloseTo(1, 13);
  });
});

describe('planElimination', () => {
  it('fills in nothing on forests', () => {
    const random = seeded(7);
    const pairs = Array.from({ length: 999 }, (_, i) => [Math.floor(random() * (i + 1)), i + 1] as const);
    const { nodes, low, high } = graphOf(1000, pairs, random);
    expect(planElimination(nodes, low, high).row).toHaveLength(999);
  });

  it('fills in little on a ring with spokes and on a grid', () => {
    const spokes = Array.from(
      { length: 500 },
      (_, i) =>
        [
          [0, i + 1],
          [i + 1, ((i + 1) % 500) + 1],
        ] as const,
    ).flat();
    const wheel = graphOf(501, spokes as unknown as [number, number][], seeded(2));
    expect(planElimination(wheel.nodes, wheel.low, wheel.high).row.length).toBeLessThan(3 * 501);
    const square = grid(40);
    expect(planElimination(square.nodes, square.low, square.high).row.length).toBeLessThan(15 * 1600);
  });

  it('refuses a tangle that would take minutes', () => {
    const random = seeded(5);
    const nodes = 12_000;
    const pairs = Array.from(
      { length: 5 * nodes },
      () => [Math.floor(random() * nodes), Math.floor(random() * nodes)] as const,
    );
    const { low, high } = graphOf(nodes, pairs, random);
    expect(() => planElimination(nodes, low, high)).toThrow(TooTangled);
  });
});
