import { Matrix, SVD } from 'ml-matrix';
import { determinant, type Matrix3, multiply, type PlanePoint } from './matrix3.js';

export * from './matrix3.js';

/** One point in two planes. */
export interface Correspondence {
  readonly from: PlanePoint;
  readonly to: PlanePoint;
}

/** Relative size below which a pivot is rounding: three of the points are on one line, or two coincide. */
const DEGENERATE = 1e-10;

/**
 * The homography that carries `from` to `to`: exact for four points, least squares for more (algebraic, in
 * normalised coordinates: the direct linear transform after Hartley, "In defence of the eight-point
 * algorithm", 1997). Its sign is such that the third coordinate is positive amid the `from` points.
 * Null for fewer than four points and for points that fix no homography.
 */
export function homographyFromPoints(pairs: readonly Correspondence[]): Matrix3 | null {
  if (pairs.length < 4) return null;
  const from = normalisation(pairs.map((p) => p.from));
  const to = normalisation(pairs.map((p) => p.to));
  if (!from || !to) return null;
  // Rows of zeros make four points' eight equations square, so that the decomposition holds the null vector.
  const equations = Matrix.zeros(Math.max(2 * pairs.length, 9), 9);
  pairs.forEach((pair, i) => {
    const x = (pair.from.x - from.x) * from.scale;
    const y = (pair.from.y - from.y) * from.scale;
    const u = (pair.to.x - to.x) * to.scale;
    const v = (pair.to.y - to.y) * to.scale;
    equations.setRow(2 * i, [x, y, 1, 0, 0, 0, -u * x, -u * y, -u]);
    equations.setRow(2 * i + 1, [0, 0, 0, x, y, 1, -v * x, -v * y, -v]);
  });
  const svd = new SVD(equations, { computeLeftSingularVectors: false });
  const [largest, , , , , , , secondLeast] = svd.diagonal;
  if (!(secondLeast! > largest! * DEGENERATE)) return null;
  const h = svd.rightSingularVectors.getColumn(8) as unknown as Matrix3;
  if (Math.abs(determinant(h)) < DEGENERATE) return null;
  const toSheet: Matrix3 = [1 / to.scale, 0, to.x, 0, 1 / to.scale, to.y, 0, 0, 1];
  const fromSheet: Matrix3 = [
    from.scale,
    0,
    -from.x * from.scale,
    0,
    from.scale,
    -from.y * from.scale,
    0,
    0,
    1,
  ];
  const sign = Math.sign(h[8]) || 1;
  return multiply(toSheet, multiply(h.map((n) => n * sign) as unknown as Matrix3, fromSheet));
}

/** Moves the middle of the points to 0 and their root mean square distance from it to √2 (Hartley). */
export function normalisation(points: readonly PlanePoint[]): { x: number; y: number; scale: number } | null {
  const n = points.length;
  const x = points.reduce((sum, p) => sum + p.x, 0) / n;
  const y = points.reduce((sum, p) => sum + p.y, 0) / n;
  const meanSquare = points.reduce((sum, p) => sum + (p.x - x) ** 2 + (p.y - y) ** 2, 0) / n;
  if (!(meanSquare > 0 && Number.isFinite(meanSquare))) return null;
  return { x, y, scale: Math.sqrt(2 / meanSquare) };
}
