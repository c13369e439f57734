import type { PlanPoint } from '../plan/index.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { nearestWall } from './aiming.js';
import { isWithin, type LightSpace, MARKED_TWICE_METERS } from './space.js';

/** How far off a wall a lamp at its foot stands. */
const STAND_OFF_METERS = 0.05;

/**
 * Where a lamp really stands: clicks are a pixel or two off, so one that is marked on a wall, or a little inside
 * of a building, stands just before it. Deep inside of a building it stays inside.
 */
export function standingPlace(
  at: PlanPoint,
  groundUnder: (p: PlanPoint) => PlanePoint | null,
  { walls, roofs }: Pick<LightSpace, 'walls' | 'roofs'>,
): PlanePoint | null {
  const ground = groundUnder(at);
  if (!ground) return null;
  const building = roofs.find(({ points }) => isWithin(points, ground));
  const ofBuilding = building && walls.filter(({ id }) => id === building.id);
  const near = ofBuilding
    ? nearestWall(ground, ofBuilding, MARKED_TWICE_METERS)
    : nearestWall(ground, walls, STAND_OFF_METERS);
  if (!near) return ground;
  const length = Math.hypot(near.wall.bx - near.wall.ax, near.wall.by - near.wall.ay);
  if (length === 0) return ground;
  const across = {
    x: -(near.wall.by - near.wall.ay) / length,
    y: (near.wall.bx - near.wall.ax) / length,
  };
  const side = building
    ? -sideOf(near, across, ground)
    : sideOf(near, across, ground) || sideOf(near, across, groundUnder({ x: at.x, y: at.y + 1 }) ?? ground);
  // On the line of a building's wall: whichever side is outside.
  const off = (sign: number) => ({
    x: near.x + across.x * sign * STAND_OFF_METERS,
    y: near.y + across.y * sign * STAND_OFF_METERS,
  });
  const place = off(side || 1);
  return roofs.some(({ points }) => isWithin(points, place)) ? off(-(side || 1)) : place;
}

/** Which side of a wall's line a point is on: 0 on it. On a photo, lower in the picture is nearer to the viewer. */
function sideOf(near: PlanePoint, across: PlanePoint, p: PlanePoint): number {
  const offset = (p.x - near.x) * across.x + (p.y - near.y) * across.y;
  return Math.abs(offset) < 1e-6 ? 0 : Math.sign(offset);
}
