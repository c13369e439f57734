import { Matrix } from 'ml-matrix';
import type { Linearise } from './least-squares.js';
import type { RigidShape } from './rigid-shape.js';

/** The homography's free entries: all but the last, which is 1. */
export const HOMOGRAPHY_PARAMETERS = 8;

/** Where the parameters of each shape start: none for the first, which is the frame. */
export function parameterOffsets(shapes: readonly RigidShape[]): { offsets: number[]; count: number } {
  let count = HOMOGRAPHY_PARAMETERS;
  const offsets = shapes.map((shape, i) => {
    if (i === 0) return -1;
    const offset = count;
    count += shape.stretch ? 4 : 3;
    return offset;
  });
  return { offsets, count };
}

/**
 * The least-squares problem over the homography from the ground to the image and the pose of every shape
 * but the first, whose own frame is the ground's. Residuals are image distances; a stretch adds one that
 * is weighted against them by `clickSigma` (both in normalised image coordinates).
 */
export function bundleProblem(shapes: readonly RigidShape[], clickSigma: number): Linearise {
  const { offsets, count } = parameterOffsets(shapes);
  return (x) => {
    const sums = new NormalSums(count);
    for (const [i, shape] of shapes.entries()) {
      if (!addShape(sums, x, shape, offsets[i]!, clickSigma)) return null;
    }
    return sums.linearised();
  };
}

/** Gathers JᵀJ and Jᵀr row by row; a row holds the homography's entries and one shape's. */
class NormalSums {
  private readonly normal: Matrix;
  private readonly gradient: Matrix;
  private cost = 0;

  constructor(count: number) {
    this.normal = Matrix.zeros(count, count);
    this.gradient = Matrix.zeros(count, 1);
  }

  add(residual: number, at: readonly number[], slope: readonly number[]): void {
    this.cost += residual * residual;
    for (let i = 0; i < at.length; i++) {
      const row = at[i]!;
      this.gradient.set(row, 0, this.gradient.get(row, 0) + slope[i]! * residual);
      for (let j = 0; j < at.length; j++) {
        const column = at[j]!;
        this.normal.set(row, column, this.normal.get(row, column) + slope[i]! * slope[j]!);
      }
    }
  }

  linearised() {
    return { cost: this.cost, normal: this.normal, gradient: this.gradient };
  }
}

/** False when a point of the shape would be at or behind the camera. */
function addShape(
  sums: NormalSums,
  h: Float64Array,
  shape: RigidShape,
  offset: number,
  clickSigma: number,
): boolean {
  const placed = offset >= 0;
  const angle = placed ? h[offset]! : 0;
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  const stretched = placed && shape.stretch !== null;
  const at = [0, 1, 2, 3, 4, 5, 6, 7];
  if (placed) at.push(offset, offset + 1, offset + 2);
  if (stretched) at.push(offset + 3);
  for (const [i, own] of shape.own.entries()) {
    const ownX = stretched && own.x !== 0 ? h[offset + 3]! : own.x;
    const turnedX = cos * ownX - sin * own.y;
    const turnedY = sin * ownX + cos * own.y;
    const x = turnedX + (placed ? h[offset + 1]! : 0);
    const y = turnedY + (placed ? h[offset + 2]! : 0);
    const w = h[6]! * x + h[7]! * y + 1;
    if (!(w > 0)) return false;
    const u = (h[0]! * x + h[1]! * y + h[2]!) / w;
    const v = (h[3]! * x + h[4]! * y + h[5]!) / w;
    const uSlope = [x / w, y / w, 1 / w, 0, 0, 0, (-u * x) / w, (-u * y) / w];
    const vSlope = [0, 0, 0, x / w, y / w, 1 / w, (-v * x) / w, (-v * y) / w];
    if (placed) {
      const ux = (h[0]! - u * h[6]!) / w;
      const uy = (h[1]! - u * h[7]!) / w;
      const vx = (h[3]! - v * h[6]!) / w;
      const vy = (h[4]! - v * h[7]!) / w;
      uSlope.push(uy * turnedX - ux * turnedY, ux, uy);
      vSlope.push(vy * turnedX - vx * turnedY, vx, vy);
      if (stretched) {
        const moves = own.x !== 0 ? 1 : 0;
        uSlope.push(moves * (ux * cos + uy * sin));
        vSlope.push(moves * (vx * cos + vy * sin));
      }
    }
    const seen = shape.seen[i]!;
    sums.add(u - seen.x, at, uSlope);
    sums.add(v - seen.y, at, vSlope);
  }
  if (stretched && shape.stretch) {
    const weight = clickSigma / shape.stretch.sigma;
    sums.add((h[offset + 3]! - shape.stretch.stated) * weight, [offset + 3], [weight]);
  }
  return true;
}
