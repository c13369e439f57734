import type { Axis } from './aiming.js';
import { type Crown, insideness, type LightSpace, type Point3, type Wall } from './space.js';

/** A light as far as its direction goes: where it is and which way it shines. */
export interface LightPose extends Point3 {
  readonly axis: Axis;
  /** The tree that it hangs in, whose crown it is not stopped by. */
  readonly treeId: string | null;
}

/** What the middle of a beam meets first, where, and how many metres from the light. */
export interface Reach {
  readonly on: 'ground' | 'face' | 'tree' | 'nothing';
  readonly point: Point3;
  readonly meters: number;
}

/** A beam that meets nothing is followed so far. */
const SKY_METERS = 4;
/** Directions in which the edge of a beam is followed. */
const EDGE_STEPS = 72;
/** A light does not meet what it stands on or hangs at. */
const START_METERS = 0.02;
/** The edge of a beam that falls flat on the ground runs away: it is followed so many times as far as its middle. */
const FARTHEST = 3;

/** Where the middle of a beam meets ground, a wall or a crown; a little way off where it meets nothing. */
export function reachOf(pose: LightPose, { walls, crowns }: Pick<LightSpace, 'walls' | 'crowns'>): Reach {
  const others = crowns.filter((crown) => crown.id !== pose.treeId && insideness(crown, pose) > 1);
  return (
    firstMet(pose, pose.axis, walls, others, Number.POSITIVE_INFINITY) ?? {
      on: 'nothing',
      point: along(pose, pose.axis, SKY_METERS),
      meters: SKY_METERS,
    }
  );
}

/**
 * The edge of a beam, where it has half of its peak, as lines in space. Of a beam that meets ground or a wall: its
 * edge there, as far as it meets anything. Of one that goes into a crown or the air: the circle across it at the
 * distance that its middle reaches, 2·d·tan(β/2) wide. A line that closes ends with its first point. None where
 * a beam has no edge: for light that goes all around, or a half angle of 90° and more.
 */
export function beamEdge(
  pose: LightPose,
  halfAngle: number,
  reach: Reach,
  { walls }: Pick<LightSpace, 'walls'>,
): readonly (readonly Point3[])[] {
  if (!(halfAngle < Math.PI / 2)) return [];
  const { axis } = pose;
  // Whatever is not along the axis gives two directions that are square to it.
  const u = normalised(crossed(axis, Math.abs(axis[2]) > 0.9 ? [1, 0, 0] : [0, 0, 1]));
  const v = crossed(axis, u);
  const slant = reach.meters / Math.cos(halfAngle);
  const part = (k: 0 | 1 | 2, turn: number): number =>
    axis[k] * Math.cos(halfAngle) + (u[k] * Math.cos(turn) + v[k] * Math.sin(turn)) * Math.sin(halfAngle);
  const onSurface = reach.on === 'ground' || reach.on === 'face';
  const edge = Array.from({ length: EDGE_STEPS }, (_, i) => {
    const turn = (i / EDGE_STEPS) * 2 * Math.PI;
    const direction: Axis = [part(0, turn), part(1, turn), part(2, turn)];
    if (!onSurface) return along(pose, direction, slant);
    return firstMet(pose, direction, walls, [], slant * FARTHEST)?.point ?? null;
  });
  return linesOf(edge);
}

/** A loop with gaps as the lines between them. */
function linesOf(loop: readonly (Point3 | null)[]): Point3[][] {
  const gap = loop.indexOf(null);
  if (gap < 0) return [[...(loop as Point3[]), loop[0]!]];
  const lines: Point3[][] = [];
  let line: Point3[] = [];
  for (const p of [...loop.slice(gap), ...loop.slice(0, gap), null]) {
    if (p !== null) line.push(p);
    else if (line.length > 0) {
      lines.push(line);
      line = [];
    }
  }
  return lines.filter(({ length }) => length > 1);
}

function firstMet(
  from: Point3,
  direction: Axis,
  walls: readonly Wall[],
  crowns: readonly Crown[],
  farthest: number,
): Reach | null {
  let meters = farthest;
  let on: Exclude<Reach['on'], 'nothing'> | null = null;
  const meet = (t: number | null, what: Exclude<Reach['on'], 'nothing'>): void => {
    if (t === null || t <= START_METERS || t >= meters) return;
    meters = t;
    on = what;
  };
  if (direction[2] < 0) meet(-from.z / direction[2], 'ground');
  for (const wall of walls) meet(wallMet(wall, from, direction), 'face');
  for (const crown of crowns) meet(crownMet(crown, from, direction), 'tree');
  return on === null ? null : { on, point: along(from, direction, meters), meters };
}

function along(from: Point3, direction: Axis, meters: number): Point3 {
  return {
    x: from.x + direction[0] * meters,
    y: from.y + direction[1] * meters,
    z: Math.max(0, from.z + direction[2] * meters),
  };
}

/** Metres along a ray to a wall; null where it passes beside or over it. */
function wallMet(wall: Wall, from: Point3, d: Axis): number | null {
  const wx = wall.bx - wall.ax;
  const wy = wall.by - wall.ay;
  const cross = d[0] * wy - d[1] * wx;
  if (cross === 0) return null;
  const ox = wall.ax - from.x;
  const oy = wall.ay - from.y;
  const t = (ox * wy - oy * wx) / cross;
  const s = (ox * d[1] - oy * d[0]) / cross;
  const z = from.z + t * d[2];
  return t > 0 && s >= 0 && s <= 1 && z >= 0 && z <= wall.heightMeters ? t : null;
}

/** Metres along a ray to the near side of a crown; null where it passes by. */
function crownMet({ x, y, z, radiusMeters, halfHeightMeters }: Crown, from: Point3, d: Axis): number | null {
  const o = [
    (from.x - x) / radiusMeters,
    (from.y - y) / radiusMeters,
    (from.z - z) / halfHeightMeters,
  ] as const;
  const r = [d[0] / radiusMeters, d[1] / radiusMeters, d[2] / halfHeightMeters] as const;
  const a = r[0] ** 2 + r[1] ** 2 + r[2] ** 2;
  const b = o[0] * r[0] + o[1] * r[1] + o[2] * r[2];
  const c = o[0] ** 2 + o[1] ** 2 + o[2] ** 2 - 1;
  const square = b * b - a * c;
  if (square <= 0) return null;
  const t = (-b - Math.sqrt(square)) / a;
  return t > 0 ? t : null;
}

function crossed(a: Axis, b: Axis): Axis {
  return [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
}

function normalised([x, y, z]: Axis): Axis {
  const n = Math.hypot(x, y, z);
  return [x / n, y / n, z / n];
}
