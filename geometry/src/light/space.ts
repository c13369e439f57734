import { applyHomography, type Matrix3, type PlanePoint } from '../sheet/matrix3.js';
import type { Beam } from './beam.js';
import type { LightSource, NightScene } from './night-scene.js';

/** A point in metres: x and y on the ground, z up. */
export interface Point3 {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** A vertical wall over a straight foot; nothing shines through it. */
export interface Wall {
  /** The face or building that it is of. */
  readonly id: string;
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
  readonly heightMeters: number;
}

/** What is under the roof of a building is cut off from all that is not, whatever may shine over its walls. */
export interface Roof {
  readonly id: string;
  readonly points: readonly PlanePoint[];
  readonly heightMeters: number;
}

/** A crown as an ellipsoid about an upright axis; it stops light and catches it. */
export interface Crown {
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly z: number;
  readonly radiusMeters: number;
  readonly halfHeightMeters: number;
}

/** What light comes from and meets on one sheet. */
export interface LightSpace {
  readonly sources: readonly LightSource[];
  readonly walls: readonly Wall[];
  readonly roofs: readonly Roof[];
  readonly crowns: readonly Crown[];
}

/** What can stop the light of one lamp. */
export interface Obstacles {
  readonly walls: readonly Wall[];
  readonly roofs: readonly { readonly roof: Roof; readonly overLamp: boolean }[];
  readonly crowns: readonly Crown[];
}

/** Light that ends on a wall is not stopped by it: rounding, in metres. */
const ROUNDING_METERS = 1e-3;
/** A ray through the edge where two walls meet must not slip between them: share of the wall's length. */
const JOINT = 1e-9;
/** Narrower than this a crown can't be: its outline was drawn on edge. */
const LEAST_RADIUS_METERS = 0.1;
/**
 * One wall that is marked twice (as a face and as the edge of a building) is marked within so many metres: clicks
 * at the far end of a yard are this far off on the ground.
 */
export const MARKED_TWICE_METERS = 0.3;

/** The walls, roofs and crowns of a scene, in metres. Marks that are not on the ground, above the horizon, are left out. */
export function spaceOf(scene: NightScene): LightSpace {
  const roofs = scene.buildings.flatMap(({ id, points, heightMeters }) => {
    const ground = points.map((p) => groundUnder(scene, p));
    return ground.every((p) => p !== null) ? [{ id, points: ground, heightMeters }] : [];
  });
  return {
    sources: scene.sources,
    walls: [
      ...scene.faces.flatMap((face) => wallsAlong(scene, face.id, face.foot, face.heightMeters)),
      ...scene.buildings.flatMap(({ id, points, heightMeters }) =>
        wallsAlong(scene, id, [...points, points[0]!], heightMeters),
      ),
    ],
    roofs,
    crowns: scene.trees.flatMap((tree) => crownOf(scene, tree) ?? []),
  };
}

/** Ground metres under a sheet pixel; null at the horizon and above it. */
export function groundUnder(scene: Pick<NightScene, 'groundMatrix'>, p: PlanePoint): PlanePoint | null {
  return applyHomography(scene.groundMatrix as unknown as Matrix3, p);
}

/** The bell of a lamp at its rated volts, of one of its quantity. */
export function beamOf(source: Pick<LightSource, 'peakCandela' | 'halfAngle' | 'shield'>): Beam {
  const { peakCandela, halfAngle, shield } = source;
  return { peakCandela, halfAngle: halfAngle ?? Number.POSITIVE_INFINITY, shield };
}

function wallsAlong(
  scene: NightScene,
  id: string,
  foot: readonly PlanePoint[],
  heightMeters: number,
): Wall[] {
  const ground = foot.map((p) => groundUnder(scene, p));
  return ground.flatMap((a, i) => {
    const b = ground[i + 1];
    if (!a || !b) return [];
    return [{ id, ax: a.x, ay: a.y, bx: b.x, by: b.y, heightMeters }];
  });
}

/**
 * The ellipsoid of a tree: over the middle of its outline. On a photo its width is that of the silhouette, seen
 * as far away as the foot is; on a drawing from above it has the area of the outline.
 */
function crownOf(scene: NightScene, tree: NightScene['trees'][number]): Crown | null {
  const foot = groundUnder(scene, tree.foot);
  if (!foot) return null;
  const halfHeightMeters = (tree.heightMeters - tree.crownBaseMeters) / 2;
  const z = tree.crownBaseMeters + halfHeightMeters;
  if (scene.view === 'photo') {
    const aside = groundUnder(scene, { x: tree.foot.x + 1, y: tree.foot.y });
    if (!aside) return null;
    const metersPerPixel = Math.hypot(aside.x - foot.x, aside.y - foot.y);
    const xs = tree.outline.map((p) => p.x);
    const [left, right] = [Math.min(...xs), Math.max(...xs)];
    const middle = groundUnder(scene, { x: (left + right) / 2, y: tree.foot.y }) ?? foot;
    const radiusMeters = Math.max(((right - left) / 2) * metersPerPixel, LEAST_RADIUS_METERS);
    return { id: tree.id, x: middle.x, y: middle.y, z, radiusMeters, halfHeightMeters };
  }
  const edge = tree.outline.map((p) => groundUnder(scene, p)).filter((p) => p !== null);
  if (edge.length < 3) return null;
  const { area, x, y } = middleOf(edge);
  const radiusMeters = Math.max(Math.sqrt(area / Math.PI), LEAST_RADIUS_METERS);
  return { id: tree.id, x, y, z, radiusMeters, halfHeightMeters };
}

/** Area and centre of gravity of a polygon, either way round; its first corner where it has no area. */
export function middleOf(points: readonly PlanePoint[]): { area: number; x: number; y: number } {
  let twice = 0;
  let x = 0;
  let y = 0;
  const o = points[0]!;
  points.forEach((p, i) => {
    const q = points[(i + 1) % points.length]!;
    const cross = (p.x - o.x) * (q.y - o.y) - (q.x - o.x) * (p.y - o.y);
    twice += cross;
    x += cross * (p.x + q.x - 2 * o.x);
    y += cross * (p.y + q.y - 2 * o.y);
  });
  if (twice === 0) return { area: 0, x: o.x, y: o.y };
  return { area: Math.abs(twice) / 2, x: o.x + x / (3 * twice), y: o.y + y / (3 * twice) };
}

/** What can stop the light of a lamp. */
export function obstaclesFor(
  space: Pick<LightSpace, 'walls' | 'roofs' | 'crowns'>,
  lamp: Pick<LightSource, 'x' | 'y' | 'z' | 'treeId'>,
): Obstacles {
  return {
    walls: space.walls,
    roofs: space.roofs.map((roof) => ({ roof, overLamp: isUnder(roof, lamp) })),
    crowns: crownsFor(lamp, space.crowns),
  };
}

/** Crowns that can stop a lamp's light: all but the one that it hangs in or stands inside of. */
export function crownsFor(
  lamp: Pick<LightSource, 'x' | 'y' | 'z' | 'treeId'>,
  crowns: readonly Crown[],
): Crown[] {
  return crowns.filter((crown) => crown.id !== lamp.treeId && insideness(crown, lamp) > 1);
}

/**
 * Whether something stands between a lamp (whose obstacles these are) and a point. A point of an upright surface
 * is asked about from {@link before} it.
 */
export function isStopped(lamp: Point3, to: Point3, { walls, roofs, crowns }: Obstacles): boolean {
  for (const wall of walls) if (wallBetween(wall, lamp, to)) return true;
  for (const { roof, overLamp } of roofs) if (isUnder(roof, to) !== overLamp) return true;
  for (const crown of crowns) if (crownBetween(crown, lamp, to)) return true;
  return false;
}

/**
 * A point of an upright surface moved off it, the way that its normal points level, so far that the same wall
 * marked a second time does not stand before it; a point of level ground as it is.
 */
export function before(point: Point3, normal: Point3): Point3 {
  const level = Math.hypot(normal.x, normal.y);
  if (level < 1e-9) return point;
  const off = MARKED_TWICE_METERS / level;
  return { x: point.x + normal.x * off, y: point.y + normal.y * off, z: point.z };
}

function wallBetween(wall: Wall, from: Point3, to: Point3): boolean {
  const wx = wall.bx - wall.ax;
  const wy = wall.by - wall.ay;
  const dx = to.x - from.x;
  const dy = to.y - from.y;
  const cross = dx * wy - dy * wx;
  if (cross === 0) return false;
  const ox = wall.ax - from.x;
  const oy = wall.ay - from.y;
  // Where the ray meets the wall's line: t along the ray, s along the wall.
  const t = (ox * wy - oy * wx) / cross;
  if (t <= 0 || t >= 1) return false;
  const s = (ox * dy - oy * dx) / cross;
  if (s < -JOINT || s > 1 + JOINT) return false;
  if (from.z + t * (to.z - from.z) > wall.heightMeters) return false;
  // The point's distance from the wall's plane.
  return ((1 - t) * Math.abs(cross)) / Math.hypot(wx, wy) > ROUNDING_METERS;
}

/** Whether a point is in the footprint of a roof and below it. */
export function isUnder(roof: Roof, p: Point3): boolean {
  if (p.z >= roof.heightMeters) return false;
  return isWithin(roof.points, p);
}

/** Whether a point is within a polygon: a line from outside to it enters an odd number of times. */
export function isWithin(points: readonly PlanePoint[], p: PlanePoint): boolean {
  let inside = false;
  for (let i = 0, j = points.length - 1; i < points.length; j = i++) {
    const a = points[i]!;
    const b = points[j]!;
    if (a.y > p.y !== b.y > p.y && p.x < a.x + ((p.y - a.y) / (b.y - a.y)) * (b.x - a.x)) inside = !inside;
  }
  return inside;
}

/** Squared distance from a crown's middle, where 1 is its surface. */
export function insideness(crown: Crown, p: Point3): number {
  return (
    ((p.x - crown.x) ** 2 + (p.y - crown.y) ** 2) / crown.radiusMeters ** 2 +
    (p.z - crown.z) ** 2 / crown.halfHeightMeters ** 2
  );
}

/** A ray that ends on or in a crown is caught by it, not stopped. */
function crownBetween(crown: Crown, from: Point3, to: Point3): boolean {
  if (insideness(crown, to) < 1.05) return false;
  const { radiusMeters: r, halfHeightMeters: h } = crown;
  const ox = (from.x - crown.x) / r;
  const oy = (from.y - crown.y) / r;
  const oz = (from.z - crown.z) / h;
  const dx = (to.x - from.x) / r;
  const dy = (to.y - from.y) / r;
  const dz = (to.z - from.z) / h;
  const a = dx * dx + dy * dy + dz * dz;
  const b = ox * dx + oy * dy + oz * dz;
  const c = ox * ox + oy * oy + oz * oz - 1;
  const d = b * b - a * c;
  if (d <= 0) return false;
  const root = Math.sqrt(d);
  return (-b - root) / a < 1 && (-b + root) / a > 0;
}
