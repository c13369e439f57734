import type { RunCircuit } from './circuit.js';
import { isHighest, newton, type WindingState } from './newton.js';
import { NoConvergence } from './no-convergence.js';
import { shareLeft } from './supply.js';

/**
 * How long downward steps are tried before giving up, in entries of the factors worked through: some tenths of a
 * second. Just past the nose of a supply the steps are tiny; 1e-6 past it takes a few thousand of them.
 */
const DOWNWARD_WORK = 2e7;
const LEAST_DOWNWARD_STEPS = 500;
/** Evaluating a load costs about as much as this many entries. */
const LOAD_WORK = 10;
/** An answer this close, as a part of the open volts, below the proven upper bound is as good as the highest. */
const AT_THE_TOP = 1e-6;
/** Kirchhoff's law and the power balance must hold to this part of the volt-amperes supplied. */
const BALANCE = 1e-7;
/** … or to this many volt-amperes, where next to nothing flows. */
const BALANCE_VA = 1e-18;

/**
 * Solves all runs of one winding for the answer with the highest volts. Newton from no-load volts finds it at once
 * in nearly all yards. Where loads drop out of regulation or a supply collapses, its answer may be a lower one or
 * none; then `stepDown`, slow and certain, brings the upper bound nearer and Newton starts again from there.
 * Throws NoConvergence.
 */
export function solveWinding(runs: readonly RunCircuit[], sag: number): WindingState {
  const state: WindingState = { runs, sag, share: 1, topShare: 1, iterations: 0 };
  const workPerStep = runs.reduce(
    (sum, { factor, loads }) => sum + factor.entries + LOAD_WORK * loads.count,
    20,
  );
  const mostSteps = Math.max(LEAST_DOWNWARD_STEPS, DOWNWARD_WORK / workPerStep);
  let batch = 1;
  for (let done = 0; done <= mostSteps; ) {
    const found = newton(state);
    if (found && (found.safe || isHighest(state) || isAtTheTop(state))) {
      verify(state);
      return state;
    }
    for (let i = 0; i < batch; i++) stepDown(state);
    done += batch;
    batch *= 2;
  }
  throw unsettled(state);
}

/**
 * Replaces every load by the conductance it shows at the upper bound and solves that linear winding. Loads seen as
 * conductances only grow as volts fall, so the true answer cannot be higher than this one: it is the new, lower
 * upper bound. Repeated, it converges to the highest answer, wherever the kinks are.
 */
function stepDown(state: WindingState): void {
  const { runs, sag, topShare } = state;
  let siemensSeen = 0;
  state.iterations++;
  for (const run of runs) {
    run.startAtBounds();
    if (run.evaluate(topShare) === null) throw unsettled(state);
    run.slopesAsConductances(topShare);
    if (!run.factorise(run.nodeSlope)) throw unsettled(state);
    siemensSeen += run.open ** 2 * run.inputSiemens();
  }
  state.topShare = Math.min(topShare, shareLeft(sag, siemensSeen));
  for (const run of runs) run.lowerBounds(state.topShare);
}

function isAtTheTop({ runs, share, topShare }: WindingState): boolean {
  if (topShare - share > AT_THE_TOP) return false;
  return runs.every(({ nodeVolts, mostVolts, open }) =>
    nodeVolts.every((v, i) => mostVolts[i]! - v <= AT_THE_TOP * open),
  );
}

/** Checks the answer against the equations themselves, whatever way it was found. */
function verify(state: WindingState): void {
  const { runs, sag, share } = state;
  let supplied = 0;
  let missed = 0;
  for (const run of runs) {
    if (run.evaluate(share) === null) throw unsettled(state);
    run.mismatch(run.step);
    const { amps, open, nodeVolts, nodeAmps, drop, step, network } = run;
    const terminal = share * open;
    let used = terminal * run.atSource.amps;
    for (let i = 0; i < drop.length; i++) {
      missed += Math.abs(step[i]!) * nodeVolts[i]!;
      used += nodeVolts[i]! * nodeAmps[i]! + network.toSource[i]! * drop[i]! ** 2;
    }
    for (let e = 0; e < network.edgeLow.length; e++) {
      used += network.edgeSiemens[e]! * run.fall(network.edgeLow[e]!, network.edgeHigh[e]!) ** 2;
    }
    supplied += terminal * amps;
    missed += Math.abs(terminal * amps - used);
  }
  const sagMissed = Math.abs(share - 1 + sag * supplied);
  const finite = Number.isFinite(supplied) && runs.every(({ loads }) => loads.volts.every(Number.isFinite));
  if (!finite || !(missed <= BALANCE * supplied + BALANCE_VA && sagMissed <= BALANCE)) throw unsettled(state);
}

function unsettled(state: WindingState): NoConvergence {
  const runIds = state.runs.map(({ run }) => run.id);
  const named = runIds.slice(0, 5).join(', ') + (runIds.length > 5 ? ` and ${runIds.length - 5} more` : '');
  return new NoConvergence(
    runIds,
    `No steady voltage could be found for ${runIds.length === 1 ? 'run' : 'runs'} ${named}: the load is at the very ` +
      'edge of what the cable can feed, or a number in it is extreme. Shorten the run, use heavier cable or split ' +
      'the load, and ask again.',
  );
}
