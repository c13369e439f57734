import { type EstimateAnswer, normalizeEstimateRequest } from '@lampwright/geometry/estimate';
import { NoConvergence, solveEstimate } from '../circuit/index.js';
import { ampacityOf, limitsOf } from './bench-run.js';
import { landOnCommons } from './commons.js';
import { type Model, type ModelTap, meet, rangeOfTap } from './model.js';
import type { RunOption, VoltRange } from './options.js';
import type { CableChoice, DesignRun, SearchControl } from './problem.js';

/** A run with the cable that it is to have. */
export interface CabledRun {
  readonly run: DesignRun;
  readonly cable: CableChoice;
  readonly option: RunOption;
}

export interface Terminals {
  readonly tapId: string;
  readonly commonId: string;
}

/** One terminal pair a run; or `none`, proven; or `given-up`. */
export type Landing = readonly Terminals[] | 'none' | 'given-up';

/** Sets of taps that are estimated for one choice of cables before giving it up. */
const MOST_ESTIMATES = 400;
/** Steps of the search between them. */
const MOST_STEPS = 200_000;

/**
 * Lands runs, whose cable is chosen, on taps and commons of a model within every limit. A set of taps is taken only
 * after the whole site was estimated with it.
 */
export function landOnTaps(
  model: Model,
  runs: readonly CabledRun[],
  conductorTemperatureC: number,
  control: SearchControl,
): Landing {
  const candidates = runs.map(({ option }) => tapsFor(model, option));
  if (candidates.some((taps) => taps.length === 0)) return 'none';
  if (!mayHold(model, runs)) return 'none';
  // The run with the fewest taps first.
  const order = runs.map((_, i) => i).sort((a, b) => candidates[a]!.length - candidates[b]!.length);
  const chosen: ModelTap[] = [];
  let estimates = 0;
  let steps = 0;
  let surelyNone = true;
  const used = new Map<string, { runs: number; amps: number }>();

  const visit = (depth: number): readonly Terminals[] | null => {
    steps += 1;
    if (estimates >= MOST_ESTIMATES || steps > MOST_STEPS || control.stopped()) {
      surelyNone = false;
      return null;
    }
    if (depth === order.length) {
      estimates += 1;
      const landed = estimated(model, runs, chosen, conductorTemperatureC);
      if (landed === 'given-up') surelyNone = false;
      return typeof landed === 'string' ? null : landed;
    }
    const index = order[depth]!;
    for (const tap of candidates[index]!) {
      const before = used.get(tap.id) ?? { runs: 0, amps: 0 };
      const after = { runs: before.runs + 1, amps: before.amps + runs[index]!.option.ampsFrom };
      if (after.runs > tap.maxConductors || after.amps > tap.limitAmps) continue;
      chosen[index] = tap;
      used.set(tap.id, after);
      if (ranges(model, runs, candidates, chosen, order, depth)) {
        const found = visit(depth + 1);
        if (found) return found;
      }
      used.set(tap.id, before);
    }
    return null;
  };
  return visit(0) ?? (surelyNone ? 'none' : 'given-up');
}

/** Taps at which the run can have its volts, the one amid its range first. */
function tapsFor(model: Model, { works }: RunOption): ModelTap[] {
  const middle = (works.from + works.to) / 2;
  const away = (tap: ModelTap) => {
    const { from, to } = rangeOfTap(model, tap);
    return Math.abs((from + to) / 2 - middle);
  };
  return model.taps.filter((tap) => meet(rangeOfTap(model, tap), works)).sort((a, b) => away(a) - away(b));
}

/** Whether all the load can be within the model's limits at all. */
function mayHold(model: Model, runs: readonly CabledRun[]): boolean {
  const sum = (of: (option: RunOption) => number) =>
    runs.reduce((total, { option }) => total + of(option), 0);
  const commons = model.windings.flatMap((winding) => winding.commons);
  return (
    sum((option) => option.voltAmpsFrom) <= model.mostVA &&
    sum((option) => option.ampsFrom) <= commons.reduce((total, { limitAmps }) => total + limitAmps, 0) &&
    runs.length <= commons.reduce((total, { maxConductors }) => total + maxConductors, 0)
  );
}

/** Whether every run landed so far can still have its volts, with what may come on its winding. */
function ranges(
  model: Model,
  runs: readonly CabledRun[],
  candidates: readonly (readonly ModelTap[])[],
  chosen: readonly ModelTap[],
  order: readonly number[],
  depth: number,
): boolean {
  const least = model.windings.map(() => 0);
  const most = model.windings.map(() => 0);
  order.forEach((index, at) => {
    const { voltAmpsFrom, voltAmpsTo } = runs[index]!.option;
    const windings = new Set(
      at <= depth ? [chosen[index]!.winding] : candidates[index]!.map((tap) => tap.winding),
    );
    for (const winding of windings) {
      most[winding]! += voltAmpsTo;
      if (windings.size === 1) least[winding]! += voltAmpsFrom;
    }
  });
  if (model.windings.some(({ mostVA }, w) => least[w]! > mostVA)) return false;
  for (let at = 0; at <= depth; at++) {
    const index = order[at]!;
    const tap = chosen[index]!;
    const { sagPerVA, mostVA } = model.windings[tap.winding]!;
    const volts: VoltRange = {
      from: tap.openVolts * (1 - sagPerVA * Math.min(most[tap.winding]!, mostVA, model.mostVA)),
      to: tap.openVolts * (1 - sagPerVA * least[tap.winding]!),
    };
    if (!meet(volts, runs[index]!.option.works)) return false;
  }
  return true;
}

function estimated(
  model: Model,
  runs: readonly CabledRun[],
  chosen: readonly ModelTap[],
  conductorTemperatureC: number,
): Landing {
  const answer = estimateOf(model, runs, chosen, conductorTemperatureC);
  if (!answer || !keepsLimits(model, runs, chosen, answer)) return 'none';
  const terminals: Terminals[] = new Array(runs.length);
  for (const [w, winding] of model.windings.entries()) {
    const members = runs.flatMap(({ run }, i) => (chosen[i]!.winding === w ? [{ run, i }] : []));
    const landed = landOnCommons(
      members.map(({ run, i }) => ({ runId: run.id, amps: answer.runs[i]!.amps })),
      winding.commons,
    );
    if (typeof landed === 'string') return landed;
    for (const { run, i } of members) terminals[i] = { tapId: chosen[i]!.id, commonId: landed.get(run.id)! };
  }
  return terminals;
}

function estimateOf(
  model: Model,
  runs: readonly CabledRun[],
  chosen: readonly ModelTap[],
  conductorTemperatureC: number,
): EstimateAnswer | null {
  const { runs: normalized } = normalizeEstimateRequest({
    transformers: [],
    runs: runs.map(({ run, cable }, i) => ({
      id: run.id,
      transformerId: model.transformer.id,
      tapId: chosen[i]!.id,
      commonId: model.windings[chosen[i]!.winding]!.commons[0]!.id,
      source: run.source,
      cables: run.cables.map((drawn) => ({ ...drawn, conductor: cable.conductor })),
      fixtures: [...run.fixtures],
    })),
  });
  try {
    return solveEstimate({ conductorTemperatureC, transformers: [model.transformer], runs: normalized });
  } catch (error) {
    if (error instanceof NoConvergence) return null;
    throw error;
  }
}

/** All limits but those of the commons, on which the runs are not landed yet. */
function keepsLimits(
  model: Model,
  runs: readonly CabledRun[],
  chosen: readonly ModelTap[],
  answer: EstimateAnswer,
): boolean {
  const fixtures = new Map(answer.fixtures.map((fixture) => [fixture.id, fixture.volts]));
  const cables = new Map(answer.cables.map((cable) => [cable.id, Math.abs(cable.amps)]));
  const litRight = runs.every(({ run, cable }) => {
    const ampacity = ampacityOf(cable);
    return (
      run.fixtures.every((fixture) => {
        const limits = limitsOf(fixture);
        const volts = fixtures.get(fixture.id) ?? 0;
        return limits === null || (volts >= limits.minVolts && volts <= limits.maxVolts);
      }) && run.cables.every(({ id }) => ampacity === null || (cables.get(id) ?? 0) <= ampacity)
    );
  });
  if (!litRight) return false;
  const perTap = new Map(answer.taps.map(({ id, amps }) => [id, amps]));
  if (model.taps.some(({ id, limitAmps }) => (perTap.get(id) ?? 0) > limitAmps)) return false;
  const perWinding = model.windings.map(() => 0);
  answer.runs.forEach(({ voltAmps }, i) => {
    perWinding[chosen[i]!.winding]! += voltAmps;
  });
  const total = perWinding.reduce((sum, voltAmps) => sum + voltAmps, 0);
  return total <= model.mostVA && model.windings.every(({ mostVA }, w) => perWinding[w]! <= mostVA);
}
