import type { NightScene } from '../light/night-scene.js';
import type { Point3 } from '../light/space.js';
import { photoCamera } from '../sheet/camera.js';
import { inverse, type Matrix3 } from '../sheet/matrix3.js';

/** Where a point in metres is on the sheet. */
export interface Seen {
  /** Sheet pixels. */
  readonly u: number;
  readonly v: number;
  /** Distance from the viewer; see {@link Viewer}. */
  readonly depth: number;
}

/** How a sheet sees points above the ground. */
export interface Viewer {
  /** Null behind the camera. */
  see(x: number, y: number, z: number): Seen | null;
  /** Distance from the viewer: in metres where the camera is known, else in a unit of the sheet's own. */
  depthOf(x: number, y: number, z: number): number;
  /** The camera, in metres; null where it can't be told and on drawings from above. */
  readonly eye: Point3 | null;
}

type Sheet = Pick<NightScene, 'view' | 'widthPx' | 'heightPx' | 'groundMatrix'>;

/**
 * How the sheet sees. Where a photo's camera can't be told, as of one that was cropped or taken straight down,
 * upright is taken as straight up on the photo, at the scale across at the foot.
 */
export function viewerOf(sheet: Sheet): Viewer {
  const ground = sheet.groundMatrix as unknown as Matrix3;
  if (sheet.view === 'plan') return upright(ground, 0);
  const camera = photoCamera(ground, sheet);
  if (!camera?.eye) return upright(ground, 1);
  const { eye } = camera;
  // Not Math.hypot: it is many times slower, and this is asked of every pixel.
  const depthOf = (x: number, y: number, z: number) =>
    Math.sqrt((x - eye.x) ** 2 + (y - eye.y) ** 2 + (z - eye.z) ** 2);
  return {
    eye,
    depthOf,
    see(x, y, z) {
      const p = camera.project({ x, y, z });
      return p && { u: p.x, v: p.y, depth: depthOf(x, y, z) };
    },
  };
}

/** Heights go straight up the sheet, at the scale across at the foot times `rise`. */
function upright(ground: Matrix3, rise: number): Viewer {
  const m = inverse(ground);
  const depthOf = (x: number, y: number) => m[6] * x + m[7] * y + m[8];
  return {
    eye: null,
    depthOf,
    see(x, y, z) {
      const depth = depthOf(x, y);
      if (!(depth > 0)) return null;
      const u = (m[0] * x + m[1] * y + m[2]) / depth;
      const v = (m[3] * x + m[4] * y + m[5]) / depth;
      return { u, v: v - rise * z * pixelsAcross(ground, u, v), depth };
    },
  };
}

/** Sheet pixels to a metre across the view, at the ground under a sheet pixel. */
export function pixelsAcross(m: Matrix3, u: number, v: number): number {
  const w = m[6] * u + m[7] * v + m[8];
  const x = (m[0] * u + m[1] * v + m[2]) / w;
  const y = (m[3] * u + m[4] * v + m[5]) / w;
  return Math.abs(w) / Math.hypot(m[0] - m[6] * x, m[3] - m[6] * y);
}
