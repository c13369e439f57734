import type { Matrix3, PlanePoint } from '../sheet/matrix3.js';
import { determinant, inverse, multiply } from '../sheet/matrix3.js';

/**
 * The homography from a picture's pixels to a rectangle seen in it: the four corners, in order around, go to (0, 0),
 * (width, 0), (width, height), (0, height); its third coordinate is positive inside. Null for corners that are not
 * those of a rectangle seen from its front or back: on one line, or folded. (Heckbert, "Fundamentals of texture
 * mapping and image warping", 1989, section 2.2.3.)
 */
export function rectangleIn(
  [a, b, c, d]: readonly [PlanePoint, PlanePoint, PlanePoint, PlanePoint],
  width: number,
  height: number,
): Matrix3 | null {
  const turns = [turn(a, b, c), turn(b, c, d), turn(c, d, a), turn(d, a, b)];
  if (!(turns.every((t) => t > 0) || turns.every((t) => t < 0)) || !(width > 0 && height > 0)) return null;
  const sx = a.x - b.x + c.x - d.x;
  const sy = a.y - b.y + c.y - d.y;
  const bx = b.x - c.x;
  const by = b.y - c.y;
  const dx = d.x - c.x;
  const dy = d.y - c.y;
  const whole = bx * dy - dx * by;
  const g = (sx * dy - dx * sy) / whole;
  const h = (bx * sy - sx * by) / whole;
  const fromSquare: Matrix3 = [
    b.x - a.x + g * b.x,
    d.x - a.x + h * d.x,
    a.x,
    b.y - a.y + g * b.y,
    d.y - a.y + h * d.y,
    a.y,
    g,
    h,
    1,
  ];
  if (!(Math.abs(determinant(fromSquare)) > 0)) return null;
  const m = multiply([width, 0, 0, 0, height, 0, 0, 0, 1], inverse(fromSquare));
  const w = m[6] * (a.x + c.x) + m[7] * (a.y + c.y) + 2 * m[8];
  return w > 0 ? m : (m.map((n) => -n) as unknown as Matrix3);
}

const turn = (a: PlanePoint, b: PlanePoint, c: PlanePoint): number =>
  (b.x - a.x) * (c.y - b.y) - (b.y - a.y) * (c.x - b.x);
