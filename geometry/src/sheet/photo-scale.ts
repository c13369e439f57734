import { type GroundPoint, type Meters, meters, pixels, type SheetPoint } from '../units/brand.js';
import { inverse, type Matrix3, multiply } from './homography.js';
import type { ScaleReference } from './references.js';
import {
  type GroundReading,
  growthOfErrors,
  lengthBetween,
  quadraticForm,
  type ReferenceResidual,
  type SolvedScale,
} from './scale.js';

/** Where the ground's frame lies in the solver's own: origin, direction of x, and metres per solver unit. */
export interface GroundFrame {
  readonly originX: number;
  readonly originY: number;
  readonly angle: number;
  readonly unit: number;
}

interface PhotoSolution {
  /** From the solver's ground to the normalised image; last entry 1. */
  readonly homography: Matrix3;
  /** Covariance of the homography's first eight entries, from clicks alone. */
  readonly unitCovariance: readonly number[];
  readonly image: { readonly x: number; readonly y: number; readonly scale: number };
  readonly frame: GroundFrame;
  readonly references: readonly ScaleReference[];
  readonly misfit: number | null;
  readonly clickSigmaPixels: number;
}

/**
 * The depth of a point goes with 1 / (distance from the horizon), so a first-order error needs that distance
 * to be well known: at five standard deviations the neglected second order is 1/25 of the depth.
 */
const LEAST_HORIZON_SIGMAS = 5;

/** A photo's scale: a homography between the sheet and the ground, and the covariance of its entries. */
export class PhotoScale implements SolvedScale {
  readonly view = 'photo';
  readonly residuals: readonly ReferenceResidual[];
  readonly misfit: number | null;
  readonly clickSigmaPixels: number;
  readonly covariance: Float64Array;
  readonly groundMatrix: Matrix3;
  private readonly toImage: Matrix3;
  private readonly toGround: Matrix3;
  private readonly image: PhotoSolution['image'];
  private readonly frame: GroundFrame;
  private readonly cos: number;
  private readonly sin: number;

  constructor(solution: PhotoSolution) {
    this.misfit = solution.misfit;
    this.clickSigmaPixels = solution.clickSigmaPixels;
    const growth = growthOfErrors(solution.misfit);
    this.covariance = Float64Array.from(solution.unitCovariance, (c) => c * growth);
    this.toImage = solution.homography;
    this.toGround = inverse(solution.homography);
    this.image = solution.image;
    this.frame = solution.frame;
    this.cos = Math.cos(solution.frame.angle) * solution.frame.unit;
    this.sin = Math.sin(solution.frame.angle) * solution.frame.unit;
    const { cos, sin, image } = this;
    const { originX, originY } = solution.frame;
    const framed: Matrix3 = [
      cos,
      sin,
      -cos * originX - sin * originY,
      -sin,
      cos,
      sin * originX - cos * originY,
      0,
      0,
      1,
    ];
    const normalised: Matrix3 = [
      image.scale,
      0,
      -image.x * image.scale,
      0,
      image.scale,
      -image.y * image.scale,
      0,
      0,
      1,
    ];
    this.groundMatrix = multiply(framed, multiply(this.toGround, normalised));
    this.residuals = solution.references.flatMap((r) => this.residualsOf(r));
  }

  // The three are bound, so that a caller may pass them on as plain functions, as with a plan's scale.
  readonly groundFromSheet = (p: SheetPoint): GroundPoint | null => {
    const g = this.toGround;
    const u = (p.x - this.image.x) * this.image.scale;
    const v = (p.y - this.image.y) * this.image.scale;
    const w = g[6] * u + g[7] * v + g[8];
    if (!(w > 0)) return null;
    return this.framed((g[0] * u + g[1] * v + g[2]) / w, (g[3] * u + g[4] * v + g[5]) / w);
  };

  readonly sheetFromGround = (point: GroundPoint): SheetPoint | null => {
    const { originX, originY, unit } = this.frame;
    const perUnit = 1 / unit ** 2;
    const x = (this.cos * point.x - this.sin * point.y) * perUnit + originX;
    const y = (this.sin * point.x + this.cos * point.y) * perUnit + originY;
    const h = this.toImage;
    const w = h[6] * x + h[7] * y + h[8];
    if (!(w > 0)) return null;
    return {
      x: pixels((h[0] * x + h[1] * y + h[2]) / w / this.image.scale + this.image.x),
      y: pixels((h[3] * x + h[4] * y + h[5]) / w / this.image.scale + this.image.y),
    };
  };

  /**
   * With G the inverse of H and q = G·(u, v, 1): from dG = −G·dH·G follows ∂x/∂H_ij = −(G_0i − x·G_2i)·q_j/w
   * and ∂x/∂u = (G_00 − x·G_20)/w, and the same for y with row 1.
   */
  readonly read = (p: SheetPoint): GroundReading | null => {
    const g = this.toGround;
    const s = this.image.scale;
    const u = (p.x - this.image.x) * s;
    const v = (p.y - this.image.y) * s;
    const w = g[6] * u + g[7] * v + g[8];
    if (!(w > 0)) return null;
    const x = (g[0] * u + g[1] * v + g[2]) / w;
    const y = (g[3] * u + g[4] * v + g[5]) / w;
    const q = [x, y, 1];
    const xByParameter = new Float64Array(8);
    const yByParameter = new Float64Array(8);
    const wByParameter = new Float64Array(8);
    // In the frame's directions: (x, y) turns by −angle and grows to metres.
    const { cos, sin } = this;
    for (let i = 0; i < 3; i++) {
      const rowX = g[i]! - x * g[6 + i]!;
      const rowY = g[3 + i]! - y * g[6 + i]!;
      const turnedX = cos * rowX + sin * rowY;
      const turnedY = cos * rowY - sin * rowX;
      for (let j = 0; j < 3 && 3 * i + j < 8; j++) {
        xByParameter[3 * i + j] = -turnedX * q[j]!;
        yByParameter[3 * i + j] = -turnedY * q[j]!;
        wByParameter[3 * i + j] = -g[6 + i]! * q[j]! * w;
      }
    }
    const perPixel = s / w;
    const xu = (g[0] - x * g[6]) * perPixel;
    const xv = (g[1] - x * g[7]) * perPixel;
    const yu = (g[3] - y * g[6]) * perPixel;
    const yv = (g[4] - y * g[7]) * perPixel;
    const horizonVariance =
      quadraticForm(this.covariance, wByParameter) +
      (g[6] ** 2 + g[7] ** 2) * (s * this.clickSigmaPixels) ** 2;
    return {
      ground: this.framed(x, y),
      byClick: [cos * xu + sin * yu, cos * xv + sin * yv, cos * yu - sin * xu, cos * yv - sin * xv],
      xByParameter,
      yByParameter,
      nearHorizon: w < LEAST_HORIZON_SIGMAS * Math.sqrt(horizonVariance),
    };
  };

  private framed(x: number, y: number): GroundPoint {
    const dx = x - this.frame.originX;
    const dy = y - this.frame.originY;
    return { x: meters(this.cos * dx + this.sin * dy), y: meters(this.cos * dy - this.sin * dx) };
  }

  private residualsOf(reference: ScaleReference): ReferenceResidual[] {
    const residual = (
      side: ReferenceResidual['side'],
      a: SheetPoint,
      b: SheetPoint,
      expected: Meters,
    ): ReferenceResidual => {
      const got = lengthBetween(this, a, b)?.meters ?? meters(Number.POSITIVE_INFINITY);
      return {
        referenceId: reference.id,
        side,
        expectedMeters: expected,
        gotMeters: got,
        relative: got / expected - 1,
      };
    };
    if (reference.kind === 'length') return [residual(null, reference.a, reference.b, reference.meters)];
    const [c0, c1, c2, c3] = reference.corners;
    return [
      residual(0, c0, c1, reference.widthMeters),
      residual(1, c1, c2, reference.depthMeters),
      residual(2, c2, c3, reference.widthMeters),
      residual(3, c3, c0, reference.depthMeters),
    ];
  }
}
