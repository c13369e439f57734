import { inverse, type Matrix3, type PlanePoint } from './matrix3.js';

/** A point over the ground of a sheet: metres, z up. */
export interface SpacePoint {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** How a sheet sees what stands up from its ground. */
export interface SheetCamera {
  /** Where on the sheet a point in space is seen; null at or behind the camera. */
  project(p: SpacePoint): PlanePoint | null;
  /** Where the camera is; null where a drawing from above sees everything straight down. */
  readonly eye: SpacePoint | null;
  /** The direction, of length 1, in which a place on the sheet lies from the eye (straight down on a drawing). */
  ray(p: PlanePoint): SpacePoint;
}

export interface SheetSize {
  readonly widthPx: number;
  readonly heightPx: number;
}

/**
 * The shortest and longest focal length that is believed, as a share of the longer edge: from the widest lens of
 * a phone to a telephoto. A result beyond means that the references can't tell it.
 */
const FOCAL_SHARES = { least: 0.3, most: 12 } as const;

/**
 * The camera of a photo, from the map between its pixels and the ground alone: its pixels are taken to be square
 * and the middle of the picture to be the middle of the lens, as they are unless somebody has cropped it.
 *
 * With H = K·[r₁ r₂ t] (ground to pixels about the middle, K = diag(f, f, 1)), r₁ ⟂ r₂ and |r₁| = |r₂| are two
 * equations for g = 1/f²; they are solved together by least squares, weighed so that the answer does not depend on
 * how the ground's axes lie (Zhang, "A flexible new technique for camera calibration", 2000, for one plane).
 * Null where they don't tell it: a picture taken straight down, or one whose middle was cropped away.
 */
export function photoCamera(groundMatrix: Matrix3, { widthPx, heightPx }: SheetSize): SheetCamera | null {
  const c = { x: widthPx / 2, y: heightPx / 2 };
  const h = inverse(groundMatrix);
  // Columns of H about the middle of the picture.
  const column = (j: 0 | 1 | 2) => {
    const w = h[6 + j]!;
    return { u: h[j]! - c.x * w, v: h[3 + j]! - c.y * w, w };
  };
  const [h1, h2, h3] = [column(0), column(1), column(2)];
  const a = [2 * (h1.u * h2.u + h1.v * h2.v), h1.u * h1.u + h1.v * h1.v - h2.u * h2.u - h2.v * h2.v] as const;
  const b = [2 * h1.w * h2.w, h1.w * h1.w - h2.w * h2.w] as const;
  const square = a[0] * a[0] + a[1] * a[1];
  const g = -(a[0] * b[0] + a[1] * b[1]) / square;
  const focal = g > 0 ? 1 / Math.sqrt(g) : Number.NaN;
  const edge = Math.max(widthPx, heightPx);
  if (!(focal >= FOCAL_SHARES.least * edge && focal <= FOCAL_SHARES.most * edge)) return null;

  const r1 = { x: h1.u / focal, y: h1.v / focal, z: h1.w };
  const r2 = { x: h2.u / focal, y: h2.v / focal, z: h2.w };
  const t = { x: h3.u / focal, y: h3.v / focal, z: h3.w };
  // Of the two axes together: their mean square is the same however they are turned.
  const scale = Math.sqrt((dot(r1, r1) + dot(r2, r2)) / 2);
  // The ground's z is up, and so towards the eye: of the two normals the one that the eye lies on the side of.
  const cross = timesCross(r1, r2, 1 / scale);
  const side = dot(cross, t) < 0 ? 1 : -1;
  const r3 = { x: cross.x * side, y: cross.y * side, z: cross.z * side };
  const eye = eyeOf(r1, r2, r3, t);
  if (!(eye.z > 0)) return null;
  const directions = inverse([r1.x, r2.x, r3.x, r1.y, r2.y, r3.y, r1.z, r2.z, r3.z]);
  return {
    eye,
    project({ x, y, z }) {
      const w = r1.z * x + r2.z * y + r3.z * z + t.z;
      if (!(w > 0)) return null;
      return {
        x: (focal * (r1.x * x + r2.x * y + r3.x * z + t.x)) / w + c.x,
        y: (focal * (r1.y * x + r2.y * y + r3.y * z + t.y)) / w + c.y,
      };
    },
    ray(p) {
      const u = (p.x - c.x) / focal;
      const v = (p.y - c.y) / focal;
      const d = directions;
      return unit({
        x: d[0] * u + d[1] * v + d[2],
        y: d[3] * u + d[4] * v + d[5],
        z: d[6] * u + d[7] * v + d[8],
      });
    },
  };
}

/** The camera of a drawing from above: what stands up is seen where it stands. */
export function planCamera(groundMatrix: Matrix3): SheetCamera {
  const toSheet = inverse(groundMatrix);
  return {
    eye: null,
    project({ x, y }) {
      const w = toSheet[6] * x + toSheet[7] * y + toSheet[8];
      return {
        x: (toSheet[0] * x + toSheet[1] * y + toSheet[2]) / w,
        y: (toSheet[3] * x + toSheet[4] * y + toSheet[5]) / w,
      };
    },
    ray: () => ({ x: 0, y: 0, z: -1 }),
  };
}

/**
 * How high over a place on the ground something is that is seen right above it: the height at which the line of
 * sight comes nearest to the plumb line there. Null on a drawing from above, and for what is seen below the place.
 */
export function heightAbove(camera: SheetCamera, ground: PlanePoint, seen: PlanePoint): number | null {
  const { eye } = camera;
  if (eye === null) return null;
  const ray = camera.ray(seen);
  const flat = Math.hypot(ray.x, ray.y);
  // Looking straight up or down there is no plumb line to compare with.
  if (flat < 1e-6) return null;
  const along = ((ground.x - eye.x) * ray.x + (ground.y - eye.y) * ray.y) / flat;
  if (along <= 0) return null;
  const height = eye.z + (along / flat) * ray.z;
  return height > 0 ? height : null;
}

/**
 * The point in space that is seen at a place of the sheet, in the upright plane through a place on the ground that
 * faces the camera. Null on a drawing from above and for what is seen behind the camera or below the ground.
 */
export function uprightPoint(camera: SheetCamera, ground: PlanePoint, seen: PlanePoint): SpacePoint | null {
  const { eye } = camera;
  if (eye === null) return null;
  const nx = ground.x - eye.x;
  const ny = ground.y - eye.y;
  const ray = camera.ray(seen);
  const closing = ray.x * nx + ray.y * ny;
  if (closing <= 0) return null;
  const t = (nx * nx + ny * ny) / closing;
  const z = eye.z + t * ray.z;
  return z >= 0 ? { x: eye.x + t * ray.x, y: eye.y + t * ray.y, z } : null;
}

function eyeOf(r1: SpacePoint, r2: SpacePoint, r3: SpacePoint, t: SpacePoint): SpacePoint {
  const m = inverse([r1.x, r2.x, r3.x, r1.y, r2.y, r3.y, r1.z, r2.z, r3.z]);
  return {
    x: -(m[0] * t.x + m[1] * t.y + m[2] * t.z),
    y: -(m[3] * t.x + m[4] * t.y + m[5] * t.z),
    z: -(m[6] * t.x + m[7] * t.y + m[8] * t.z),
  };
}

const length = (p: SpacePoint): number => Math.hypot(p.x, p.y, p.z);
const dot = (a: SpacePoint, b: SpacePoint): number => a.x * b.x + a.y * b.y + a.z * b.z;
const unit = (p: SpacePoint): SpacePoint => {
  const n = length(p);
  return { x: p.x / n, y: p.y / n, z: p.z / n };
};
const timesCross = (a: SpacePoint, b: SpacePoint, k: number): SpacePoint => ({
  x: (a.y * b.z - a.z * b.y) * k,
  y: (a.z * b.x - a.x * b.z) * k,
  z: (a.x * b.y - a.y * b.x) * k,
});
