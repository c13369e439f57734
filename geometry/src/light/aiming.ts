import type { FixtureKind } from '../catalogue/index.js';
import type { Aim, PlanPoint } from '../plan/index.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import type { LightSource } from './night-scene.js';
import type { LightSpace, Point3, Wall } from './space.js';

export type Axis = LightSource['axis'];

const DOWN: Axis = [0, 0, -1];
const UP: Axis = [0, 0, 1];

/** A flood or wash is taken to be meant for a wall no farther away than this. */
const WASHED_WITHIN_METERS = 6;
/** A step light is taken to be set into a wall no farther away than this. */
const SET_INTO_WITHIN_METERS = 1;

/** What a fixture's pointing is worked out from. */
export interface Pointing {
  readonly kind: FixtureKind;
  readonly aim: Aim | null;
  /** The light itself. */
  readonly lamp: Point3;
  /** Where it is marked on the sheet. */
  readonly at: PlanPoint;
  readonly groundUnder: (p: PlanPoint) => PlanePoint | null;
  readonly space: Pick<LightSpace, 'walls'>;
}

/** Unit vector along the middle of the beam: as aimed, or as fixtures of the kind usually point. */
export function axisOf(pointing: Pointing): Axis {
  const { aim, kind, lamp, space } = pointing;
  return (aim && axisOfAim(pointing, aim)) ?? usualAxis(kind, lamp, space.walls);
}

/** Null where the aim says nothing: at the light itself, or at a place above the horizon. */
function axisOfAim({ lamp, at, groundUnder }: Pointing, aim: Aim): Axis | null {
  switch (aim.kind) {
    case 'point': {
      const ground = groundUnder(aim.at);
      return ground && axisTo(lamp, { ...ground, z: aim.heightMeters });
    }
    case 'tilt': {
      const angle = (aim.degreesFromDown * Math.PI) / 180;
      if (aim.degreesFromDown === 0) return DOWN;
      if (aim.degreesFromDown === 180) return UP;
      // One pixel on the way is on the same line of ground, and is on the ground even where the way leads to the sky.
      const length = Math.hypot(aim.toward.x - at.x, aim.toward.y - at.y);
      if (length === 0) return null;
      const here = groundUnder(at);
      const step = Math.min(1, 1 / length);
      const there = groundUnder({
        x: at.x + (aim.toward.x - at.x) * step,
        y: at.y + (aim.toward.y - at.y) * step,
      });
      if (!here || !there) return null;
      const far = Math.hypot(there.x - here.x, there.y - here.y);
      const level = Math.sin(angle) / far;
      return [(there.x - here.x) * level, (there.y - here.y) * level, -Math.cos(angle)];
    }
  }
}

/**
 * How a fixture of the kind points where nobody said: common practice, no source. Floods and washes point half
 * way up the nearest wall, or straight up where there is none near; a step light down and away from the wall that
 * it is set into, so that it lights the treads before it; what hides under a cap or rail lights the ground below.
 */
export function usualAxis(kind: FixtureKind, lamp: Point3, walls: readonly Wall[]): Axis {
  switch (kind) {
    case 'path':
    case 'bollard':
    case 'down':
    case 'linear':
      return DOWN;
    case 'up':
    case 'in-grade':
    case 'underwater':
      return UP;
    case 'flood':
    case 'wall-wash': {
      const near = nearestWall(lamp, walls, WASHED_WITHIN_METERS);
      return (near && axisTo(lamp, { ...near, z: near.wall.heightMeters / 2 })) ?? UP;
    }
    case 'step': {
      const near = nearestWall(lamp, walls, SET_INTO_WITHIN_METERS);
      if (!near || near.distance === 0) return DOWN;
      const level = Math.SQRT1_2 / near.distance;
      return [(lamp.x - near.x) * level, (lamp.y - near.y) * level, -Math.SQRT1_2];
    }
  }
}

/** Null from a point to itself. */
export function axisTo(from: Point3, to: Point3): Axis | null {
  const x = to.x - from.x;
  const y = to.y - from.y;
  const z = to.z - from.z;
  const length = Math.hypot(x, y, z);
  return length < 1e-9 ? null : [x / length, y / length, z / length];
}

export interface NearWall {
  readonly wall: Wall;
  /** The nearest point of its foot, and how far away it is. */
  readonly x: number;
  readonly y: number;
  readonly distance: number;
}

/** The nearest wall no farther than so many metres on the ground. */
export function nearestWall(p: PlanePoint, walls: readonly Wall[], within: number): NearWall | null {
  let nearest: NearWall | null = null;
  for (const wall of walls) {
    const wx = wall.bx - wall.ax;
    const wy = wall.by - wall.ay;
    const square = wx * wx + wy * wy;
    const along = square === 0 ? 0 : ((p.x - wall.ax) * wx + (p.y - wall.ay) * wy) / square;
    const t = Math.min(Math.max(along, 0), 1);
    const x = wall.ax + t * wx;
    const y = wall.ay + t * wy;
    const distance = Math.hypot(p.x - x, p.y - y);
    if (distance <= (nearest?.distance ?? within)) nearest = { wall, x, y, distance };
  }
  return nearest;
}
