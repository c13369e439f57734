import { applyHomography, type Matrix3, type PlanePoint } from '../sheet/index.js';
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

/** A crown as an ellipsoid about an upright axis; it stops light and catches it. */
export interface Crown {
  readonly id: string;
  readonly x: number;
  readonly y: number;
  readonly z: number;
  readonly radiusMeters: number;
  readonly halfHeightMeters: number;
}

/** What light meets on one sheet. */
export interface LightSpace {
  readonly sources: readonly LightSource[];
  readonly walls: readonly Wall[];
  readonly crowns: readonly Crown[];
}

/** Light that starts on a wall, or ends on it, is not stopped by that wall: within so many metres of it. */
const TOUCHING_METERS = 0.02;
/** Narrower than this a crown can't be: its outline was drawn on edge. */
const LEAST_RADIUS_METERS = 0.1;

/** The walls and crowns of a scene, in metres. Marks that are not on the ground, above the horizon, are left out. */
export function spaceOf(scene: NightScene): LightSpace {
  return {
    sources: scene.sources,
    walls: [
      ...scene.faces.flatMap((face) => wallsAlong(scene, face.id, face.foot, face.heightMeters)),
      ...scene.buildings.flatMap(({ id, points, heightMeters }) =>
        wallsAlong(scene, id, [...points, points[0]!], heightMeters),
      ),
    ],
    crowns: scene.trees.flatMap((tree) => crownOf(scene, tree) ?? []),
  };
}

/** Ground metres under a sheet pixel; null at the horizon and above it. */
export function groundUnder(scene: Pick<NightScene, 'groundMatrix'>, p: PlanePoint): PlanePoint | null {
  return applyHomography(scene.groundMatrix as unknown as Matrix3, p);
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

function middleOf(points: readonly PlanePoint[]): { area: number; x: number; y: number } {
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

/** Walls and crowns that may come between a lamp and anything; ask once a lamp, then {@link isStopped} a point. */
export function isStopped(
  from: Point3,
  to: Point3,
  walls: readonly Wall[],
  crowns: readonly Crown[],
): boolean {
  for (const wall of walls) if (wallBetween(wall, from, to)) return true;
  for (const crown of crowns) if (crownBetween(crown, from, to)) return true;
  return false;
}

/** Crowns that can stop a lamp's light: all but the one that it hangs in or stands inside of. */
export function crownsFor(source: Pick<LightSource, 'x' | 'y' | 'z' | 'treeId'>, crowns: readonly Crown[]) {
  return crowns.filter((crown) => crown.id !== source.treeId && insideness(crown, source) > 1);
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
  if (s < 0 || s > 1) return false;
  if (from.z + t * (to.z - from.z) > wall.heightMeters) return false;
  const perMeter = Math.abs(cross) / Math.hypot(wx, wy);
  return t * perMeter > TOUCHING_METERS && (1 - t) * perMeter > TOUCHING_METERS;
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
