import { RunOnBench } from './bench-run.js';
import { type Model, rangeOfTap } from './model.js';
import { type RunOption, type VoltRange, workingRange } from './options.js';
import type { DesignProblem, DesignRun, DesignSite, Impossible } from './problem.js';

/** Sets of fixtures that are looked at for a smallest one; beyond, a small one is told. */
const MOST_SETS = 200_000;

/** Names a smallest set of fixtures that makes a site impossible, with the reason. */
export function whyImpossible(
  problem: DesignProblem,
  site: DesignSite,
  models: readonly Model[],
  options: readonly (readonly RunOption[])[],
): Impossible {
  for (const [i, run] of site.runs.entries()) {
    const hasTap = (model: Model) =>
      options[i]!.some(({ works }) =>
        model.taps.some((tap) => {
          const { from, to } = rangeOfTap(model, tap);
          return from <= works.to && works.from <= to;
        }),
      );
    if (models.some(hasTap)) continue;
    return {
      siteId: site.id,
      reason: 'no-volts',
      runId: run.id,
      fixtureIds: smallestAgainst(problem, run, models),
    };
  }
  const heaviest = heaviestOver(site, options, Math.max(...models.map(({ mostVA }) => mostVA)));
  if (heaviest) return { siteId: site.id, reason: 'too-much-load', runId: null, fixtureIds: heaviest };
  return {
    siteId: site.id,
    reason: 'no-terminals',
    runId: null,
    fixtureIds: site.runs.flatMap(({ fixtures }) => fixtures.map(({ id }) => id)),
  };
}

/** The fewest fixtures whose load alone is more than any model may feed; null where all together are within it. */
function heaviestOver(
  site: DesignSite,
  options: readonly (readonly RunOption[])[],
  mostVA: number,
): string[] | null {
  const loads = site.runs
    .flatMap(({ fixtures }, i) => {
      const least = Math.min(...options[i]!.map(({ voltAmpsFrom }) => voltAmpsFrom));
      const watts = fixtures.map(({ load, quantity = 1 }) => ('watts' in load ? load.watts * quantity : 0));
      const total = watts.reduce((sum, w) => sum + w, 0);
      return fixtures.map(({ id }, f) => ({ id, voltAmps: total > 0 ? (least * watts[f]!) / total : 0 }));
    })
    .sort((a, b) => b.voltAmps - a.voltAmps);
  let sum = 0;
  for (const [i, { voltAmps }] of loads.entries()) {
    sum += voltAmps;
    if (sum > mostVA) return loads.slice(0, i + 1).map(({ id }) => id);
  }
  return null;
}

/**
 * Every choice (model, tap, cable) fails a run by one fixture, or by two that never have their volts at the same
 * time: volts that suit a fixture are one range, and ranges of which every two meet all meet (Helly). A smallest set
 * that holds one of these for every choice.
 */
function smallestAgainst(problem: DesignProblem, run: DesignRun, models: readonly Model[]): string[] {
  const choices: (readonly number[])[][] = [];
  for (const [c, cable] of problem.cables.entries()) {
    if ((run.costMinor[c] ?? null) === null) continue;
    const bench = new RunOnBench(run, cable, problem.conductorTemperatureC);
    for (const model of models)
      for (const tap of model.taps) choices.push(failuresAt(bench, rangeOfTap(model, tap)));
  }
  return smallestCover(choices, run.fixtures.length).map((index) => run.fixtures[index]!.id);
}

function failuresAt(bench: RunOnBench, volts: VoltRange): (readonly number[])[] {
  const ranges = bench.limits.map((limits, i) =>
    limits === null ? volts : workingRange(bench, volts, (index) => index === i),
  );
  const failures: number[][] = [];
  ranges.forEach((a, i) => {
    if (a === null) failures.push([i]);
    ranges.slice(0, i).forEach((b, j) => {
      if (a !== null && b !== null && (a.from > b.to || b.from > a.to)) failures.push([j, i]);
    });
  });
  return failures;
}

/** A smallest set of numbers that holds one whole failure of every choice; a choice without any is left out. */
function smallestCover(choices: readonly (readonly (readonly number[])[])[], count: number): number[] {
  const asked = choices.filter((failures) => failures.length > 0);
  const taking = [...new Set(asked.flat(2))].sort((a, b) => a - b);
  let looked = 0;
  for (let size = 1; size <= count; size++) {
    for (const set of subsets(taking, size)) {
      looked += 1;
      if (looked > MOST_SETS) return greedyCover(asked);
      if (asked.every((failures) => failures.some((f) => f.every((i) => set.includes(i))))) return set;
    }
  }
  return taking;
}

function greedyCover(choices: readonly (readonly (readonly number[])[])[]): number[] {
  const set = new Set<number>();
  for (const failures of choices) {
    if (failures.some((f) => f.every((i) => set.has(i)))) continue;
    for (const i of failures[0]!) set.add(i);
  }
  return [...set].sort((a, b) => a - b);
}

function* subsets(from: readonly number[], size: number, start = 0): Generator<number[]> {
  if (size === 0) {
    yield [];
    return;
  }
  for (let i = start; i <= from.length - size; i++)
    for (const rest of subsets(from, size - 1, i + 1)) yield [from[i]!, ...rest];
}
