import { all, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { fixtureVolts, solve } from './feeder.testkit.js';
import { missesOf, ohmsOf, openVoltsOf } from './kirchhoff.testkit.js';
import { LOAD_MIXES, type RandomOptions, randomRequest, SHAPES, seeded } from './random.testkit.js';

const math = create(all!);

/** 200 networks: every shape with every mix of loads, small and large, shallow and deep drops, with and without sag. */
function optionsOf(seed: number): RandomOptions {
  const random = seeded(seed * 7919);
  return {
    shape: SHAPES[seed % SHAPES.length]!,
    mix: LOAD_MIXES[Math.floor(seed / SHAPES.length) % LOAD_MIXES.length]!,
    nodes: Math.floor(random() ** 2 * 60),
    runs: 1 + Math.floor(3 * random()),
    sag: random() < 0.5,
    reach: [1, 5, 20][Math.floor(3 * random())]!,
  };
}

describe('200 random networks', () => {
  it.each(Array.from({ length: 200 }, (_, seed) => seed))('seed %i satisfies the model', (seed) => {
    const options = optionsOf(seed);
    const request = randomRequest(seed, options);
    const answer = solve(request);
    const misses = missesOf(request, answer);
    expect(misses.nodeAmps).toBeLessThan(1e-7);
    expect(misses.loadAmps).toBeLessThan(1e-9);
    expect(misses.leadVolts).toBeLessThan(1e-9);
    expect(misses.terminalVolts).toBeLessThan(1e-8);
    expect(misses.power).toBeLessThan(1e-7);
    if (options.mix === 'linear') {
      const wanted = linearVolts(request);
      fixtureVolts(answer).forEach((volts, i) => {
        expect(Math.abs(volts - wanted[i]!)).toBeLessThan(1e-6);
      });
    }
  });

  it('covers what it should', () => {
    const all = Array.from({ length: 200 }, (_, seed) => ({ options: optionsOf(seed), seed }));
    for (const shape of SHAPES)
      expect(all.filter(({ options }) => options.shape === shape).length).toBeGreaterThan(20);
    expect(all.filter(({ options }) => options.mix === 'linear').length).toBeGreaterThan(30);
    const states = all.flatMap(({ options, seed }) =>
      solve(randomRequest(seed, options)).fixtures.map((f) => f.state),
    );
    for (const state of ['off', 'unwired', 'dark', 'dim', 'in-window']) expect(states).toContain(state);
  });
});

/**
 * Fixture volts of a request with resistive and off loads only, from the nodal equations by mathjs' sparse LU. The
 * winding's sag is found by bisection on its share of the open volts, everything being proportional to it.
 */
function linearVolts(request: ReturnType<typeof randomRequest>): number[] {
  const temperature = request.conductorTemperatureC!;
  const perRun = request.runs.map((run) => {
    const { open, sag, winding } = openVoltsOf(request, run);
    const names = reachedFrom(run);
    const number = new Map(names.map((name, i) => [name, i]));
    const matrix = math.matrix('sparse') as import('mathjs').Matrix;
    matrix.resize([names.length, names.length]);
    const right = new Array<number>(names.length).fill(0);
    const add = (i: number, j: number, value: number) =>
      matrix.set([i, j], Number(matrix.get([i, j])) + value);
    for (const cable of run.cables) {
      const siemens = 1 / ohmsOf(cable, temperature);
      const ends = [cable.from, cable.to].map((name) => number.get(name));
      for (const [me, other] of [ends, [...ends].reverse()]) {
        if (me === undefined) continue;
        add(me, me, siemens);
        if (other !== undefined) add(me, other, -siemens);
        else right[me]! += siemens * open;
      }
    }
    const total = run.fixtures.map(({ load, lead, at, quantity = 1 }) => {
      if (load.kind !== 'resistive') return null;
      const ohms = load.ratedVolts ** 2 / load.watts;
      const whole = ohms + (lead ? ohmsOf(lead, temperature) : 0);
      const node = number.get(at);
      if (node !== undefined) add(node, node, quantity / whole);
      return ohms / whole;
    });
    const volts = names.length
      ? (math.lusolve(math.lup(matrix), right) as unknown as { valueOf(): number[][] }).valueOf().flat()
      : [];
    const nodeVolts = (at: string) => (at === run.source ? open : (volts[number.get(at) ?? -1] ?? 0));
    const amps = run.fixtures.reduce((sum, { load, lead, at, quantity = 1 }) => {
      if (load.kind !== 'resistive') return sum;
      const whole = load.ratedVolts ** 2 / load.watts + (lead ? ohmsOf(lead, temperature) : 0);
      return sum + (quantity * nodeVolts(at)) / whole;
    }, 0);
    return {
      open,
      sag,
      winding,
      va: open * amps,
      ends: run.fixtures.map(({ at }, i) => nodeVolts(at) * (total[i] ?? 1)),
    };
  });
  return perRun.flatMap(({ sag, winding, ends }) => {
    const va = perRun.filter((run) => run.winding === winding).reduce((sum, run) => sum + run.va, 0);
    let low = 0;
    let high = 1;
    for (let i = 0; i < 200; i++) {
      const middle = (low + high) / 2;
      if (middle > 1 - sag * va * middle ** 2) high = middle;
      else low = middle;
    }
    return ends.map((volts) => volts * low);
  });
}

function reachedFrom(run: ReturnType<typeof randomRequest>['runs'][number]): string[] {
  const reached = new Set([run.source]);
  for (let grew = true; grew; ) {
    grew = false;
    for (const { from, to } of run.cables) {
      if (reached.has(from) === reached.has(to)) continue;
      reached.add(from).add(to);
      grew = true;
    }
  }
  reached.delete(run.source);
  return [...reached];
}
