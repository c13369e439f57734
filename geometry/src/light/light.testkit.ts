import { type Axis, axisTo } from './aiming.js';
import { beamFromLumens, halfAngleOf } from './beam.js';
import type { LightSource } from './night-scene.js';
import type { Crown, LightSpace, Roof, Wall } from './space.js';

export const down: Axis = [0, 0, -1];
export const up: Axis = [0, 0, 1];

type Light = { candela: number } | { lumens: number };

let counted = 0;

/** A lamp at its rated light, straight down unless said otherwise. */
export function lamp(
  at: readonly [x: number, y: number, z: number],
  light: Light,
  beamDegrees = 360,
  more: Partial<LightSource> = {},
): LightSource {
  const halfAngle = halfAngleOf(beamDegrees);
  const peakCandela =
    'candela' in light ? light.candela : beamFromLumens(light.lumens, beamDegrees).peakCandela;
  return {
    id: `lamp${++counted}`,
    kind: 'up',
    x: at[0],
    y: at[1],
    z: at[2],
    axis: down,
    peakCandela,
    halfAngle: Number.isFinite(halfAngle) ? halfAngle : null,
    shield: 0,
    quantity: 1,
    output: 1,
    cctKelvin: 2700,
    zoneId: 'zone',
    groupId: null,
    treeId: null,
    ...more,
  };
}

export function spaceWith(parts: Partial<LightSpace>): LightSpace {
  return { sources: [], walls: [], roofs: [], crowns: [], ...parts };
}

export const wall = (
  a: readonly [number, number],
  b: readonly [number, number],
  heightMeters: number,
  id = 'wall',
): Wall => ({ id, ax: a[0], ay: a[1], bx: b[0], by: b[1], heightMeters });

/** The walls and the roof of a building. */
export function building(
  points: readonly (readonly [number, number])[],
  heightMeters: number,
  id = 'house',
): { walls: Wall[]; roofs: Roof[] } {
  return {
    walls: points.map((a, i) => wall(a, points[(i + 1) % points.length]!, heightMeters, id)),
    roofs: [{ id, points: points.map(([x, y]) => ({ x, y })), heightMeters }],
  };
}

export const crown = (
  at: readonly [number, number, number],
  radiusMeters: number,
  halfHeightMeters: number,
  id = 'tree',
): Crown => ({ id, x: at[0], y: at[1], z: at[2], radiusMeters, halfHeightMeters });

/** A unit vector drawn evenly over the sphere. */
export function randomAxis(random: () => number): Axis {
  const z = 2 * random() - 1;
  const turn = 2 * Math.PI * random();
  const level = Math.sqrt(1 - z * z);
  return [level * Math.cos(turn), level * Math.sin(turn), z];
}

export const towards = (x: number, y: number, z: number): Axis => axisTo({ x: 0, y: 0, z: 0 }, { x, y, z })!;
