import type { RunCircuit } from './circuit.js';

/**
 * Volts on one winding: the runs' networks, tied together by the sag of the winding where it has any. `share` is
 * the part f of the open volts that is left; f = 1 − sag × S, S being Σ V_terminal × I over the runs.
 */
export interface WindingState {
  readonly runs: readonly RunCircuit[];
  readonly sag: number;
  share: number;
  /** Upper bound of the highest answer's share; each run's `mostVolts` bound its volts likewise. */
  topShare: number;
  /** Newton steps and factorisations done, for the bench. */
  iterations: number;
}

/** Steps this small, as a part of a node's volts, end the iteration: far below a millivolt, at rounding. */
const SETTLED = 1e-13;
/** Rounding may keep steps from settling: this often without progress below this part is enough. */
const GOOD_ENOUGH = 1e-9;
const MOST_STALLS = 3;
/** Volts below this part of the open volts are as good as none and may settle as they like. */
const LEAST_SCALE = 1e-12;
/** Once a step is this small, the matrix is as good as exact and is kept for the last steps. */
const KEEP_MATRIX = 1e-5;
/** At the very nose of a supply Newton only halves its error with each step. */
const MAX_STEPS = 80;
/** A step that would take volts to 0 or below takes them to this part of what they were. */
const CUT = 1e-3;

/**
 * Newton's method from the upper bound down. Where all loads bend upward (constant power, constant current,
 * resistance) every iterate stays at or above the highest answer, so that it cannot be missed; otherwise the answer
 * wants `isHighest`. Returns null if it did not settle, else whether the way down was such a safe one.
 */
export function newton(state: WindingState): { safe: boolean } | null {
  const { runs, sag } = state;
  state.share = state.topShare;
  for (const run of runs) run.startAtBounds();
  let safe = sag === 0;
  let moved = Number.POSITIVE_INFINITY;
  let keepMatrix = false;
  let stalls = 0;
  for (let count = 0; count < MAX_STEPS; count++) {
    for (const run of runs) {
      const convex = run.evaluate(state.share);
      if (convex === null) return null;
      safe &&= convex;
    }
    if (!keepMatrix) {
      state.iterations++;
      for (const run of runs) if (!run.factorise(run.nodeSlope)) return null;
    }
    const before = moved;
    const step = takeStep(state);
    if (!Number.isFinite(step.moved)) return null;
    moved = step.moved;
    safe &&= !step.cut;
    const progress = moved <= before / 2 && !step.cut;
    if (!progress && moved <= GOOD_ENOUGH) stalls++;
    if (moved <= SETTLED || stalls >= MOST_STALLS) {
      for (const run of runs) if (run.evaluate(state.share) === null) return null;
      return { safe };
    }
    // A kept matrix that makes no progress has a load on the other side of its knee: then it is made anew.
    keepMatrix = moved < KEEP_MATRIX && progress;
  }
  return null;
}

/**
 * One Newton step with the matrices at hand: the largest move as a part of a node's volts (NaN if there is none),
 * and whether any node's step had to be cut short of 0 V.
 */
function takeStep(state: WindingState): { moved: number; cut: boolean } {
  const { runs, sag, share } = state;
  let shareMove = 0;
  for (const run of runs) {
    run.mismatch(run.step);
    run.factor.solve(run.step, run.step);
  }
  if (sag > 0) {
    // f's own equation: h = f − 1 + sag × f × Σ V_open × I = 0, with I moved by the step and by f itself.
    let residual = share - 1;
    let gradient = 1;
    for (const run of runs) {
      const { open, nodeSlope, step, amps } = run;
      let byStep = 0;
      for (let i = 0; i < step.length; i++) byStep += nodeSlope[i]! * step[i]!;
      residual += sag * share * open * (amps + byStep);
      gradient += sag * open * (amps + share * open * run.inputSiemens());
    }
    if (!(gradient > 0)) return { moved: Number.NaN, cut: false };
    shareMove = -residual / gradient;
    state.share = share + shareMove;
  }
  let moved = Math.abs(shareMove);
  let cut = false;
  for (const run of runs) {
    const { drop, nodeVolts, step, follow, open } = run;
    const lift = shareMove * open;
    for (let i = 0; i < drop.length; i++) {
      let fall = lift === 0 ? -step[i]! : follow[i]! * lift - step[i]!;
      let rise = lift === 0 ? step[i]! : (1 - follow[i]!) * lift + step[i]!;
      const scale = Math.max(nodeVolts[i]!, LEAST_SCALE * open);
      if (nodeVolts[i]! + rise < 0) {
        cut = true;
        rise = (CUT - 1) * nodeVolts[i]!;
        fall = lift - rise;
      }
      drop[i]! += fall;
      nodeVolts[i]! += rise;
      const relative = Math.abs(rise) / scale;
      if (!(relative <= moved)) moved = relative;
    }
  }
  return { moved, cut };
}

/**
 * Proves that no other answer is higher. If w were one, the difference would solve the linear network whose loads
 * have the chord slopes from here to w; those are at least `slopesAsLeastChords`, and if the network with these is
 * positive definite its only solution is zero. With sag the same goes for f's equation.
 */
export function isHighest(state: WindingState): boolean {
  const { runs, sag, share, topShare } = state;
  let gradient = 1;
  state.iterations++;
  for (const run of runs) {
    run.slopesAsLeastChords(share, topShare);
    if (!run.factorise(run.nodeSlope)) return false;
    if (sag === 0) continue;
    const siemens = run.inputSiemens();
    const leastAmps = Math.max(0, run.amps + Math.min(0, siemens) * Math.max(0, topShare - share) * run.open);
    gradient += sag * run.open * (leastAmps + share * run.open * siemens);
  }
  return gradient > 0;
}
