import { type Beam, intensityAt } from '../light/beam.js';
import type { LightSource } from '../light/night-scene.js';
import {
  beamOf,
  before,
  type Crown,
  isStopped,
  type LightSpace,
  type Obstacles,
  obstaclesFor,
  type Point3,
} from '../light/space.js';
import { BLOCK, type SurfaceMap } from './surface-map.js';
import { SurfaceKind } from './surfaces.js';

const BLOCK_PIXELS = BLOCK * BLOCK;

/**
 * Light of one lamp under this share of the lux that is shown as white is left out; up to three times as much it
 * fades in, so that no edge shows.
 */
export const LEAST_SHARE_OF_WHITE = 0.001;
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
  const least = whiteLux * LEAST_SHARE_OF_WHITE;
  const blocks: number[] = [];
  const lit: Float32Array[] = [];
  if (beam.peakCandela > 0 && Number.isFinite(beam.peakCandela)) {
    const shade = shadeOf(source, space);
    for (let b = 0; b < map.blockIsGround.length; b++) {
      if (map.blockStart[b] === map.blockStart[b + 1]) continue;
      if (!(mostIn(map, b, source, beam) > least)) continue;
      const lux = blockLux(map, b, source, beam, least, shade);
      if (lux) {
        blocks.push(b);
        lit.push(lux);
      }
    }
  }
  const all = new Float32Array(blocks.length * BLOCK_PIXELS);
  for (const [i, lux] of lit.entries()) all.set(lux, i * BLOCK_PIXELS);
  return { blocks: Uint32Array.from(blocks), lux: all };
}

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

const scratch = new Float32Array(BLOCK_PIXELS);

function blockLux(
  map: SurfaceMap,
  b: number,
  { x, y, z, axis }: LightSource,
  beam: Beam,
  least: number,
  shade: Shade,
): Float32Array | null {
  let any = false;
  scratch.fill(0);
  for (let s = map.blockStart[b]!; s < map.blockStart[b + 1]!; s++) {
    const dx = map.x[s]! - x;
    const dy = map.y[s]! - y;
    const dz = map.z[s]! - z;
    const distance = Math.max(Math.hypot(dx, dy, dz), LAMP_METERS);
    const facing = -(dx * map.nx[s]! + dy * map.ny[s]! + dz * map.nz[s]!) / distance;
    const catching = map.kind[s] === SurfaceKind.crown ? 0.5 * (1 + facing) : facing;
    if (!(catching > 0)) continue;
    const cosine = (dx * axis[0] + dy * axis[1] + dz * axis[2]) / distance;
    const angle = Math.acos(Math.min(Math.max(cosine, -1), 1));
    let lux = (intensityAt(beam, angle) * catching) / (distance * distance);
    if (!(lux > least)) continue;
    if (lux < FADED_IN * least) {
      const t = (lux / least - 1) / (FADED_IN - 1);
      lux *= t * t * (3 - 2 * t);
    }
    lux *= shade(map, s);
    if (lux > 0) {
      scratch[map.slot[s]!]! += Math.min(lux, MOST_LUX) * map.share[s]!;
      any = true;
    }
  }
  return any ? scratch.slice() : null;
}

/** The share of a lamp's light that comes to a sample, 0 to 1. */
type Shade = (map: SurfaceMap, sample: number) => number;

function shadeOf(source: LightSource, space: LightSpace): Shade {
  const { crowns, ...rest } = obstaclesFor(space, source);
  // Crowns let light through at their edge, here, where it is seen.
  const solid: Obstacles = { ...rest, crowns: [] };
  if (solid.walls.length === 0 && solid.roofs.length === 0 && crowns.length === 0) return () => 1;
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
    const own = map.crownIds.get(map.owner[s]!);
    let through = 1;
    for (const crown of crowns) if (crown.id !== own) through *= throughCrown(crown, source, to);
    return through;
  };
}

/** From this share of a crown's radius outwards it is thin, and lets more and more light through. */
const DENSE_SHARE = 0.8;

/** What a crown lets through between two points: all beside it, nothing through its middle, some at its edge. */
function throughCrown(crown: Crown, from: Point3, to: Point3): number {
  const { radiusMeters: r, halfHeightMeters: h } = crown;
  const ox = (from.x - crown.x) / r;
  const oy = (from.y - crown.y) / r;
  const oz = (from.z - crown.z) / h;
  const dx = (to.x - from.x) / r;
  const dy = (to.y - from.y) / r;
  const dz = (to.z - from.z) / h;
  const a = dx * dx + dy * dy + dz * dz;
  if (a === 0) return 1;
  const t = Math.min(Math.max(-(ox * dx + oy * dy + oz * dz) / a, 0), 1);
  const nearest = Math.hypot(ox + t * dx, oy + t * dy, oz + t * dz);
  if (nearest >= 1) return 1;
  const s = Math.max((nearest - DENSE_SHARE) / (1 - DENSE_SHARE), 0);
  return s * s * (3 - 2 * s);
}
