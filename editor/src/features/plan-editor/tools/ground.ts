import { sheetPoint } from '@lampwright/geometry/estimate';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import { meters } from '@lampwright/geometry/units';
import type { Point } from '../../../plan-view/camera';

/**
 * The sheet point that lies `length` metres from `from` on the ground: at an angle in degrees, counter-clockwise
 * from the ground's x axis, or, with none, towards `towards`. Null where the ground can't be told (no scale,
 * at the horizon) or `towards` gives no direction.
 */
export function stepOnGround(
  scale: SolvedScale,
  from: Point,
  towards: Point | null,
  length: number,
  degrees: number | null,
): Point | null {
  const origin = scale.groundFromSheet(sheetPoint(from));
  if (origin === null) return null;
  let angle: number;
  if (degrees !== null) angle = (degrees * Math.PI) / 180;
  else {
    const aim = towards === null ? null : scale.groundFromSheet(sheetPoint(towards));
    if (aim === null || (aim.x === origin.x && aim.y === origin.y)) return null;
    angle = Math.atan2(aim.y - origin.y, aim.x - origin.x);
  }
  const end = scale.sheetFromGround({
    x: meters(origin.x + length * Math.cos(angle)),
    y: meters(origin.y + length * Math.sin(angle)),
  });
  return end === null ? null : { x: end.x, y: end.y };
}
