import type { PlanePoint } from './homography.js';
import type { ScaleReference } from './references.js';

/**
 * A reference seen as a shape of known form that lies somewhere on the ground: its points in its own frame
 * and where each was clicked. A length is a shape of two points. With an unknown place and rotation per
 * shape, all that is left to fit are clicks, so that every residual is a click error in the image.
 */
export interface RigidShape {
  readonly reference: ScaleReference;
  /** Points in the shape's own frame, in ground units. */
  readonly own: readonly PlanePoint[];
  /** The clicks, in normalised image coordinates. */
  readonly seen: readonly PlanePoint[];
  /**
   * Set when the length itself is uncertain: its stated value and its standard deviation, in ground units.
   * The shape then has a fourth parameter, the length, that stretches it along its own x axis.
   */
  readonly stretch: { readonly stated: number; readonly sigma: number } | null;
}

/**
 * The points in the shape's own frame. A rectangle has its middle at 0, its width along x, and its depth
 * along +y or −y: whichever way its corners were clicked, the ground is seen from above, never mirrored.
 */
export function rigidShape(
  reference: ScaleReference,
  unit: number,
  normalise: (p: PlanePoint) => PlanePoint,
): RigidShape {
  if (reference.kind === 'length') {
    const sigma = reference.sigmaMeters ?? 0;
    const length = reference.meters / unit;
    return {
      reference,
      own: [
        { x: 0, y: 0 },
        { x: length, y: 0 },
      ],
      seen: [reference.a, reference.b].map(normalise),
      stretch: sigma > 0 ? { stated: length, sigma: sigma / unit } : null,
    };
  }
  const x = reference.widthMeters / unit / 2;
  // Image y runs down, so a positive area is a clockwise round, and the third corner then is to the right.
  const y = ((imageArea(reference.corners) < 0 ? 1 : -1) * reference.depthMeters) / unit / 2;
  return {
    reference,
    own: [
      { x: -x, y: -y },
      { x, y: -y },
      { x, y },
      { x: -x, y },
    ],
    seen: reference.corners.map(normalise),
    stretch: null,
  };
}

/** Signed area of a polygon in the image: positive when it goes clockwise as seen on a screen. */
export function imageArea(points: readonly PlanePoint[]): number {
  let twice = 0;
  points.forEach((p, i) => {
    const q = points[(i + 1) % points.length]!;
    twice += p.x * q.y - q.x * p.y;
  });
  return twice / 2;
}

/** Place and rotation on the ground: own (x, y) goes to R(angle)·(x, y) + (x, y). */
export interface Pose {
  readonly angle: number;
  readonly x: number;
  readonly y: number;
}

/** The pose that brings the shape's own points nearest to the given ground points, in the same order. */
export function poseThrough(own: readonly PlanePoint[], ground: readonly PlanePoint[]): Pose {
  const from = middle(own);
  const to = middle(ground);
  let dot = 0;
  let cross = 0;
  own.forEach((p, i) => {
    const px = p.x - from.x;
    const py = p.y - from.y;
    const gx = ground[i]!.x - to.x;
    const gy = ground[i]!.y - to.y;
    dot += px * gx + py * gy;
    cross += px * gy - py * gx;
  });
  const angle = Math.atan2(cross, dot);
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  return { angle, x: to.x - (c * from.x - s * from.y), y: to.y - (s * from.x + c * from.y) };
}

function middle(points: readonly PlanePoint[]): PlanePoint {
  const n = points.length;
  return { x: points.reduce((sum, p) => sum + p.x, 0) / n, y: points.reduce((sum, p) => sum + p.y, 0) / n };
}
