import { type Beam, intensityAt } from './beam.js';
import type { LightSource } from './night-scene.js';
import {
  beamOf,
  before,
  type Crown,
  isStopped,
  type LightSpace,
  type Obstacles,
  obstaclesFor,
  type Point3,
} from './space.js';

/** A lamp, its beam, and what can stop its light: worked out once for all points. */
export interface Lamp {
  readonly source: LightSource;
  readonly beam: Beam;
  readonly obstacles: Obstacles;
}

/** A lamp is no point: nearer than this, in metres, its light grows no more. */
const LAMP_METERS = 0.05;
/** Less than this, in lux, is not worth looking for what stops it: a hundred thousandth of moonlight. */
const NO_LUX = 1e-6;

const UP: Point3 = { x: 0, y: 0, z: 1 };

const lampsBySpace = new WeakMap<LightSpace, readonly Lamp[]>();

/** The lamps of a space that give light. Spaces never change, so this is worked out once for each. */
export function lampsOf(space: LightSpace): readonly Lamp[] {
  const known = lampsBySpace.get(space);
  if (known) return known;
  const lamps = space.sources
    .filter(({ output, peakCandela }) => output > 0 && peakCandela > 0)
    .map((source) => ({ source, beam: beamOf(source), obstacles: obstaclesFor(space, source) }));
  lampsBySpace.set(space, lamps);
  return lamps;
}

/**
 * Lux of one lamp, all its quantity, on a surface through a point, facing along its normal (a unit vector), by the
 * inverse square and cosine laws: E = I(θ) · cos ε / d². What faces away, or is behind a wall, roof or crown, gets none.
 */
export function luxOf({ source, beam, obstacles }: Lamp, point: Point3, normal: Point3): number {
  const dx = point.x - source.x;
  const dy = point.y - source.y;
  const dz = point.z - source.z;
  const square = dx * dx + dy * dy + dz * dz;
  const distance = Math.sqrt(square);
  if (distance === 0) return 0;
  const facing = -(dx * normal.x + dy * normal.y + dz * normal.z) / distance;
  if (facing <= 0) return 0;
  const [ax, ay, az] = source.axis;
  const cosine = (dx * ax + dy * ay + dz * az) / distance;
  const angle = Math.acos(Math.min(Math.max(cosine, -1), 1));
  const candela = intensityAt(beam, angle) * source.output * source.quantity;
  const lux = (candela * facing) / Math.max(square, LAMP_METERS ** 2);
  if (lux < NO_LUX || isStopped(source, before(point, normal), obstacles)) return 0;
  return lux;
}

/** Lux of all lamps at their volts on a surface through a point, facing along its normal (a unit vector). */
export function luxAt(space: LightSpace, point: Point3, normal: Point3): number {
  let sum = 0;
  for (const lamp of lampsOf(space)) sum += luxOf(lamp, point, normal);
  return sum;
}

/** Lux on level ground at a place in metres. */
export function groundLux(space: LightSpace, x: number, y: number): number {
  return luxAt(space, { x, y, z: 0 }, UP);
}

/**
 * Lux of all lamps on the leaves at a point of a crown's surface. Leaves stand at all angles, so that of the light
 * which comes they take half of (1 + cosine of its angle to the bulge): all on the side towards the lamp, none on
 * the side away.
 */
export function leavesLux(space: LightSpace, point: Point3, normal: Point3): number {
  let sum = 0;
  for (const lamp of lampsOf(space)) {
    const { x, y, z } = lamp.source;
    const [dx, dy, dz] = [x - point.x, y - point.y, z - point.z];
    const distance = Math.hypot(dx, dy, dz);
    if (distance === 0) continue;
    const towards = { x: dx / distance, y: dy / distance, z: dz / distance };
    const cosine = towards.x * normal.x + towards.y * normal.y + towards.z * normal.z;
    sum += 0.5 * (1 + cosine) * luxOf(lamp, point, towards);
  }
  return sum;
}

/** A point of a crown's surface, where light is caught, and the way that it faces; angles in radians from its middle. */
export function crownSurface(
  crown: Crown,
  azimuth: number,
  elevation: number,
): { point: Point3; normal: Point3 } {
  const { radiusMeters: r, halfHeightMeters: h } = crown;
  const level = Math.cos(elevation);
  const [x, y, z] = [Math.cos(azimuth) * level, Math.sin(azimuth) * level, Math.sin(elevation)];
  // The normal of an ellipsoid: the gradient of its equation.
  const [nx, ny, nz] = [x / r, y / r, z / h];
  const n = Math.hypot(nx, ny, nz);
  return {
    point: { x: crown.x + x * r, y: crown.y + y * r, z: crown.z + z * h },
    normal: { x: nx / n, y: ny / n, z: nz / n },
  };
}
