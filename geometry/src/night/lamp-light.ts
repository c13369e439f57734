import { type Beam, intensityAt } from '../light/beam.js';
import type { LightSource } from '../light/night-scene.js';
import {
  beamOf,
  before,
  type Crown,
  isStopped,
  type LightSpace,
  MARKED_TWICE_METERS,
  type Obstacles,
  obstaclesFor,
  type Point3,
  type Wall,
} from '../light/space.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { BLOCK, type SurfaceMap } from './surface-map.js';
import { SurfaceKind } from './surfaces.js';

const BLOCK_PIXELS = BLOCK * BLOCK;

/**
 * Light of one lamp under this share of the lux that is shown as white is left out; up to three times as much it
 * fades in, so that no edge shows.
 */
export const LEAST_SHARE_OF_WHITE = 0.002;
const FADED_IN = 3;
/** Nearer than this to a lamp, light grows no more: a lamp is no point. */
const LAMP_METERS = 0.05;
/** More is white beyond telling, and no half-precision number. */
const MOST_LUX = 30_000;
/** The lux that one lamp gives, by blocks of the map; blocks that it does not reach are not there. */
export interface LampLight {
  readonly blocks: Uint32Array;
  /** BLOCK × BLOCK values for each of the blocks. */
  readonly lux: Float32Array;
}

/**
 * Lux of a lamp on all that the map shows. On the ground and on upright surfaces with the cosine of the angle at
 * which it comes; leaves stand at all angles, so that a crown takes 0.5 · (1 + cosine of the angle to its bulge):
 * most on the side towards the lamp, none on the side away.
 */
export function lampLightOn(
  map: SurfaceMap,
  source: LightSource,
  space: LightSpace,
  whiteLux: number,
): LampLight {
  const bare = beamOf(source);
  const beam: Beam = { ...bare, peakCandela: bare.peakCandela * source.quantity * source.output };
  if (!(beam.peakCandela > 0 && Number.isFinite(beam.peakCandela))) return NO_LIGHT;
  const least = whiteLux * LEAST_SHARE_OF_WHITE;
  const shades = shadesOf(source, space);
  const blocks: number[] = [];
  let lux = new Float32Array(64 * BLOCK_PIXELS);
  for (let b = 0; b < map.blockIsGround.length; b++) {
    if (map.blockStart[b] === map.blockStart[b + 1] || !(mostIn(map, b, source, beam) > least)) continue;
    const at = blocks.length * BLOCK_PIXELS;
    if (at === lux.length) {
      const longer = new Float32Array(2 * lux.length);
      longer.set(lux);
      lux = longer;
    }
    if (lightBlock(map, b, source, beam, least, shades(map, b), lux, at)) blocks.push(b);
  }
  return { blocks: Uint32Array.from(blocks), lux: lux.slice(0, blocks.length * BLOCK_PIXELS) };
}

const NO_LIGHT: LampLight = { blocks: new Uint32Array(0), lux: new Float32Array(0) };

/** No point of the block gets more lux than this. */
function mostIn(map: SurfaceMap, b: number, { x, y, z, axis }: LightSource, beam: Beam): number {
  const dx = map.blockBall[b * 4]! - x;
  const dy = map.blockBall[b * 4 + 1]! - y;
  const dz = map.blockBall[b * 4 + 2]! - z;
  const radius = map.blockBall[b * 4 + 3]!;
  const middle = Math.hypot(dx, dy, dz);
  const nearest = Math.max(middle - radius, LAMP_METERS);
  let angle = 0;
  if (middle > radius) {
    const cosine = (dx * axis[0] + dy * axis[1] + dz * axis[2]) / middle;
    angle = Math.acos(Math.min(Math.max(cosine, -1), 1)) - Math.asin(radius / middle);
  }
  const most = intensityAt(beam, Math.max(angle, 0)) / nearest ** 2;
  return map.blockIsGround[b] ? most * Math.min(Math.max(z, 0) / nearest, 1) : most;
}

/** Writes a block's lux to `lux` from `at` on, where there are zeros; false where there is no light in it. */
function lightBlock(
  map: SurfaceMap,
  b: number,
  { x, y, z, axis }: LightSource,
  beam: Beam,
  least: number,
  shade: Shade,
  lux: Float32Array,
  at: number,
): boolean {
  const [ax, ay, az] = axis;
  const { peakCandela } = beam;
  let any = false;
  for (let s = map.blockStart[b]!, end = map.blockStart[b + 1]!; s < end; s++) {
    const dx = map.x[s]! - x;
    const dy = map.y[s]! - y;
    const dz = map.z[s]! - z;
    const square = Math.max(dx * dx + dy * dy + dz * dz, LAMP_METERS * LAMP_METERS);
    const distance = Math.sqrt(square);
    const facing = -(dx * map.nx[s]! + dy * map.ny[s]! + dz * map.nz[s]!) / distance;
    const catching = map.kind[s] === SurfaceKind.crown ? 0.5 * (1 + facing) : facing;
    if (!(catching > 0) || peakCandela * catching < least * square) continue;
    const cosine = (dx * ax + dy * ay + dz * az) / distance;
    const angle = Math.acos(Math.min(Math.max(cosine, -1), 1));
    let here = (intensityAt(beam, angle) * catching) / square;
    if (!(here > least)) continue;
    if (here < FADED_IN * least) {
      const t = (here / least - 1) / (FADED_IN - 1);
      here *= t * t * (3 - 2 * t);
    }
    if (shade) here *= shade(map, s);
    if (!(here > 0)) continue;
    lux[at + map.slot[s]!]! += Math.min(here, MOST_LUX) * map.share[s]!;
    any = true;
  }
  return any;
}

/** The share of a lamp's light that comes to a sample, 0 to 1; null: all of it to all of a block. */
type Shade = ((map: SurfaceMap, sample: number) => number) | null;

/** What stands between a lamp and any block of the map; only what can is asked about each sample. */
function shadesOf(source: LightSource, space: LightSpace): (map: SurfaceMap, block: number) => Shade {
  const { walls, roofs, crowns } = obstaclesFor(space, source);
  const screens = crowns.map((crown) => screenOf(crown, source));
  return (map, b) => {
    const x = map.blockBall[b * 4]!;
    const y = map.blockBall[b * 4 + 1]!;
    // Light to the ball around the block keeps within its radius of the way to its middle.
    const width = map.blockBall[b * 4 + 3]! + (map.blockIsGround[b] ? 0 : MARKED_TWICE_METERS);
    const way = { ax: source.x, ay: source.y, bx: x, by: y };
    const near: Obstacles = {
      walls: walls.filter((wall) => segmentsWithin(way, wall, width)),
      roofs: roofs.filter(({ roof, overLamp }) => overLamp || isBy(roof.points, x, y, width)),
      // Crowns let light through at their edge, here, where it is seen.
      crowns: [],
    };
    const nearScreens = screens.filter(
      (screen) => distanceTo(way, screen.middle) <= screen.radiusMeters + width,
    );
    if (near.walls.length === 0 && near.roofs.length === 0 && nearScreens.length === 0) return null;
    return shadeBy(source, near, nearScreens);
  };
}

function shadeBy(source: LightSource, solid: Obstacles, screens: readonly Screen[]): Shade {
  const { x, y, z } = source;
  const at = { x: 0, y: 0, z: 0 };
  const normal = { x: 0, y: 0, z: 0 };
  return (map, s) => {
    at.x = map.x[s]!;
    at.y = map.y[s]!;
    at.z = map.z[s]!;
    let to: Point3 = at;
    if (map.kind[s] === SurfaceKind.face) {
      normal.x = map.nx[s]!;
      normal.y = map.ny[s]!;
      to = before(at, normal);
    }
    if (isStopped(source, to, solid)) return 0;
    const own = map.crownIds[map.owner[s]!];
    let share = 1;
    for (const screen of screens)
      if (screen.id !== own) share *= through(screen, to.x - x, to.y - y, to.z - z);
    return share;
  };
}

type Segment = Pick<Wall, 'ax' | 'ay' | 'bx' | 'by'>;

/** Whether two segments come within so many metres of one another. */
function segmentsWithin(p: Segment, q: Segment, meters: number): boolean {
  return (
    cross(p, q) ||
    distanceTo(q, { x: p.ax, y: p.ay }) <= meters ||
    distanceTo(q, { x: p.bx, y: p.by }) <= meters ||
    distanceTo(p, { x: q.ax, y: q.ay }) <= meters ||
    distanceTo(p, { x: q.bx, y: q.by }) <= meters
  );
}

function cross(p: Segment, q: Segment): boolean {
  const side = (s: Segment, x: number, y: number) =>
    (s.bx - s.ax) * (y - s.ay) - (s.by - s.ay) * (x - s.ax) > 0;
  return side(p, q.ax, q.ay) !== side(p, q.bx, q.by) && side(q, p.ax, p.ay) !== side(q, p.bx, p.by);
}

function distanceTo({ ax, ay, bx, by }: Segment, p: PlanePoint): number {
  const dx = bx - ax;
  const dy = by - ay;
  const square = dx * dx + dy * dy;
  const t = square > 0 ? Math.min(Math.max(((p.x - ax) * dx + (p.y - ay) * dy) / square, 0), 1) : 0;
  return Math.hypot(p.x - ax - t * dx, p.y - ay - t * dy);
}

/** Whether a place is so near to the box around a footprint that it may be in it. */
function isBy(points: readonly PlanePoint[], x: number, y: number, meters: number): boolean {
  let [left, right, low, high] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const p of points) {
    left = Math.min(left, p.x);
    right = Math.max(right, p.x);
    low = Math.min(low, p.y);
    high = Math.max(high, p.y);
  }
  return x >= left - meters && x <= right + meters && y >= low - meters && y <= high + meters;
}

/** From this share of a crown's radius outwards it is thin, and lets more and more light through. */
const DENSE_SHARE = 0.45;

/** A crown as a lamp sees it: in units of its own radii, in which it is a ball about the origin. */
interface Screen {
  readonly id: string;
  readonly middle: PlanePoint;
  readonly radiusMeters: number;
  readonly perRadius: number;
  readonly perHalfHeight: number;
  /** The lamp. */
  readonly x: number;
  readonly y: number;
  readonly z: number;
  /** Squared distance of the lamp from the middle. */
  readonly square: number;
}

function screenOf(crown: Crown, lamp: Point3): Screen {
  const perRadius = 1 / crown.radiusMeters;
  const perHalfHeight = 1 / crown.halfHeightMeters;
  const x = (lamp.x - crown.x) * perRadius;
  const y = (lamp.y - crown.y) * perRadius;
  const z = (lamp.z - crown.z) * perHalfHeight;
  return {
    id: crown.id,
    middle: crown,
    radiusMeters: crown.radiusMeters,
    perRadius,
    perHalfHeight,
    x,
    y,
    z,
    square: x * x + y * y + z * z,
  };
}

/** What a crown lets through of light that goes so far: all beside it, nothing near its middle. */
function through(screen: Screen, dx: number, dy: number, dz: number): number {
  const x = dx * screen.perRadius;
  const y = dy * screen.perRadius;
  const z = dz * screen.perHalfHeight;
  const towards = -(screen.x * x + screen.y * y + screen.z * z);
  if (towards <= 0) return 1;
  const length = x * x + y * y + z * z;
  const t = Math.min(towards / length, 1);
  const nearest = screen.square - 2 * t * towards + t * t * length;
  if (nearest >= 1) return 1;
  const s = (Math.sqrt(Math.max(nearest, 0)) - DENSE_SHARE) / (1 - DENSE_SHARE);
  return s > 0 ? s * s * (3 - 2 * s) : 0;
}
