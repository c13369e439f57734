import { CholeskyDecomposition, type Matrix } from 'ml-matrix';

/** A point of a least-squares problem, linearised: half the Gauss–Newton quadratic there. */
export interface Linearised {
  /** Sum of squared residuals. */
  readonly cost: number;
  /** JᵀJ, n × n. */
  readonly normal: Matrix;
  /** Jᵀr, n × 1. */
  readonly gradient: Matrix;
}

/** Null where the residuals have no value (a point behind the camera, say). */
export type Linearise = (x: Float64Array) => Linearised | null;

export interface LeastSquaresFit {
  readonly x: Float64Array;
  readonly cost: number;
  readonly normal: Matrix;
}

/** Calibrations settle in 3 to 15 steps; past this the references have no common solution. */
const MOST_STEPS = 80;
/** A step this small, in normalised coordinates, moves a sheet point by far less than a thousandth of a pixel. */
const SETTLED = 1e-12;

/** Levenberg–Marquardt with Marquardt's scaling. Null when the start has no value or it doesn't settle. */
export function minimise(linearise: Linearise, start: Float64Array): LeastSquaresFit | null {
  let x = start;
  let here = linearise(x);
  if (!here) return null;
  let damping = 1e-4;
  for (let step = 0; step < MOST_STEPS; step++) {
    const n = x.length;
    const damped = here.normal.clone();
    for (let i = 0; i < n; i++) damped.set(i, i, damped.get(i, i) * (1 + damping));
    const cholesky = new CholeskyDecomposition(damped);
    if (cholesky.isPositiveDefinite()) {
      const move = cholesky.solve(here.gradient).to1DArray();
      const size = Math.sqrt(move.reduce((sum, d) => sum + d * d, 0));
      const next = x.map((value, i) => value - move[i]!);
      const there = linearise(next);
      const settled = size < SETTLED * (1 + Math.hypot(...x));
      if (there && there.cost <= here.cost) {
        const still = here.cost - there.cost <= SETTLED * here.cost;
        x = next;
        here = there;
        damping = Math.max(damping / 10, 1e-12);
        if (settled || still) return { x, cost: here.cost, normal: here.normal };
        continue;
      }
      // At the bottom rounding alone can make a step look uphill.
      if (settled) return { x, cost: here.cost, normal: here.normal };
    }
    damping *= 10;
    if (damping > 1e16) return null;
  }
  return null;
}
