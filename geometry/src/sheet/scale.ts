import { type GroundPoint, type Meters, meters, type SheetPoint } from '../units/brand.js';
import type { Matrix3 } from './homography.js';

/** How one reference fits the scale that all of them gave together. */
export interface ReferenceResidual {
  /** The reference's id, or `drawing-scale`. */
  readonly referenceId: string;
  /** For a rectangle: the side that starts at this corner. Null for lengths and the drawing scale. */
  readonly side: 0 | 1 | 2 | 3 | null;
  readonly expectedMeters: Meters;
  readonly gotMeters: Meters;
  /** (got − expected) / expected. */
  readonly relative: number;
}

/** The ground under a sheet point, and how it moves with the click and with the calibration. */
export interface GroundReading {
  readonly ground: GroundPoint;
  /** ∂x/∂u, ∂x/∂v, ∂y/∂u, ∂y/∂v in metres per sheet pixel. */
  readonly byClick: readonly [number, number, number, number];
  /** ∂x/∂p and ∂y/∂p for each of the calibration's parameters. */
  readonly xByParameter: Float64Array;
  readonly yByParameter: Float64Array;
  /** True where the ground runs away so fast that a first-order error says little. */
  readonly nearHorizon: boolean;
}

/** The solved calibration of one sheet. Immutable; solve once per calibration and keep it. */
export interface SolvedScale {
  readonly view: 'plan' | 'photo';
  /** Null at the horizon and above it. */
  groundFromSheet(p: SheetPoint): GroundPoint | null;
  /** What `groundFromSheet` does, as one matrix over pixels: (x, y, w) = M · (u, v, 1), seen where w > 0. */
  readonly groundMatrix: Matrix3;
  /** Null for ground at or behind the camera. */
  sheetFromGround(g: GroundPoint): SheetPoint | null;
  /** Null at the horizon and above it. */
  read(p: SheetPoint): GroundReading | null;
  readonly residuals: readonly ReferenceResidual[];
  /**
   * Root mean square of the leftover errors in units of the expected one: about 1 when people clicked as
   * expected, above 3 when some reference is wrong, null when the references only just fix the scale.
   */
  readonly misfit: number | null;
  readonly clickSigmaPixels: number;
  /** Covariance of the calibration's parameters, row by row (k × k). */
  readonly covariance: Float64Array;
}

export interface MeasuredLength {
  readonly meters: Meters;
  /** One standard deviation. */
  readonly sigmaMeters: Meters;
  readonly trusted: boolean;
  readonly reason?: 'near-horizon' | 'error-over-10-percent';
}

/** A length whose error passes this share of it is not to be trusted (the product's own promise). */
export const TRUSTED_RELATIVE_ERROR = 0.1;

/** Leftovers this many times the expected click error can't be clicks: some reference is wrong. */
export const MISFIT_LIMIT = 3;

/**
 * The factor on the calibration's variances. Clicks as good as expected leave it at 1, whatever their luck;
 * beyond the limit the leftovers themselves are the better measure of the error (Birge's ratio).
 */
export function growthOfErrors(misfit: number | null): number {
  return misfit !== null && misfit > MISFIT_LIMIT ? misfit ** 2 : 1;
}

/** The straight distance on the ground between two sheet points; null where one is not on the ground. */
export function lengthBetween(scale: SolvedScale, a: SheetPoint, b: SheetPoint): MeasuredLength | null {
  return lengthAlong(scale, [a, b]);
}

/**
 * The length of a polyline on the ground, in metres, with one standard deviation: first-order propagation
 * of the calibration's covariance and of `clickSigmaPixels` in each coordinate of every point. The segments
 * share their points and the calibration, so their errors are carried together rather than added up.
 * Null where a point is at or above the horizon. Equal neighbours count as one click.
 */
export function lengthAlong(scale: SolvedScale, points: readonly SheetPoint[]): MeasuredLength | null {
  const { covariance, clickSigmaPixels } = scale;
  const count = Math.sqrt(covariance.length);
  const byParameter = new Float64Array(count);
  let total = 0;
  let clickVariance = 0;
  let nearHorizon = false;
  let from: GroundReading | null = null;
  // The pull of the segment that ended at `from` on it: unit vector, zero at the start.
  let inX = 0;
  let inY = 0;
  for (const point of points) {
    const to = scale.read(point);
    if (to === null) return null;
    nearHorizon ||= to.nearHorizon;
    if (from !== null) {
      const dx = to.ground.x - from.ground.x;
      const dy = to.ground.y - from.ground.y;
      const length = Math.hypot(dx, dy);
      if (length === 0) continue;
      const ux = dx / length;
      const uy = dy / length;
      total += length;
      for (let k = 0; k < count; k++) {
        byParameter[k]! +=
          ux * (to.xByParameter[k]! - from.xByParameter[k]!) +
          uy * (to.yByParameter[k]! - from.yByParameter[k]!);
      }
      clickVariance += clickVarianceOf(from, inX - ux, inY - uy);
      inX = ux;
      inY = uy;
    }
    from = to;
  }
  if (from !== null) clickVariance += clickVarianceOf(from, inX, inY);
  const variance = clickVariance * clickSigmaPixels ** 2 + quadraticForm(covariance, byParameter);
  return judged(total, Math.sqrt(variance), nearHorizon);
}

/** Variance of a length for unit click variance at one point, given the length's gradient there. */
function clickVarianceOf(reading: GroundReading, gx: number, gy: number): number {
  const [xu, xv, yu, yv] = reading.byClick;
  return (gx * xu + gy * yu) ** 2 + (gx * xv + gy * yv) ** 2;
}

/** vᵀ M v for a symmetric M stored row by row. */
export function quadraticForm(matrix: Float64Array, v: Float64Array): number {
  const n = v.length;
  let sum = 0;
  for (let i = 0; i < n; i++) {
    let row = 0;
    for (let j = 0; j < n; j++) row += matrix[i * n + j]! * v[j]!;
    sum += row * v[i]!;
  }
  // Rounding may leave a hair below zero where the true value is zero.
  return Math.max(sum, 0);
}

function judged(length: number, sigma: number, nearHorizon: boolean): MeasuredLength {
  const measured = { meters: meters(length), sigmaMeters: meters(sigma) };
  if (nearHorizon) return { ...measured, trusted: false, reason: 'near-horizon' };
  if (sigma > TRUSTED_RELATIVE_ERROR * length) {
    return { ...measured, trusted: false, reason: 'error-over-10-percent' };
  }
  return { ...measured, trusted: true };
}
