import type { NightScene } from '../light/night-scene.js';
import { type Crown, groundUnder, type Point3, spaceOf } from '../light/space.js';
import type { Matrix3, PlanePoint } from '../sheet/matrix3.js';
import { pixelsAcross, type Viewer, viewerOf } from './camera.js';
import { rectangleIn } from './quad.js';

/** What a point of the sheet shows. */
export const SurfaceKind = { none: 0, ground: 1, face: 2, crown: 3 } as const;
export type SurfaceKind = (typeof SurfaceKind)[keyof typeof SurfaceKind];

/** One thing seen at a point of the sheet, and how much of what is seen there it is. */
export interface SurfacePoint {
  kind: SurfaceKind;
  /** Which mark: the same for all points of one surface. */
  owner: number;
  x: number;
  y: number;
  z: number;
  nx: number;
  ny: number;
  nz: number;
  /** Distance from the viewer, in the camera's unit. */
  depth: number;
  share: number;
  /** Of crowns: from the surface that is seen to the middle of the crown behind it, in metres on the ground. */
  inX: number;
  inY: number;
}

/** What the marks of a sheet are seen as; asked point by point. */
export interface Surfaces {
  readonly viewer: Viewer;
  /** By owner: the tree whose crown or trunk it is; null for all else. */
  readonly crownIds: readonly (string | null)[];
  /** Calls `take` with each thing seen at a sheet pixel; the object is used again for the next. */
  at(u: number, v: number, take: (point: SurfacePoint) => void): void;
}

export const GROUND_OWNER = 0;

/** A mark as it is seen on the sheet, within a box of sheet pixels. */
interface Patch extends Box {
  readonly owner: number;
  readonly crownId: string | null;
  /** Writes the point that is seen of it at a sheet pixel; false where it is not there. */
  readonly at: (u: number, v: number, into: SurfacePoint) => boolean;
}

export function surfacesOf(scene: NightScene): Surfaces {
  return scene.view === 'photo' ? onPhoto(scene) : onPlan(scene);
}

export const surfacePoint = (): SurfacePoint => ({
  kind: SurfaceKind.none,
  owner: -1,
  x: 0,
  y: 0,
  z: 0,
  nx: 0,
  ny: 0,
  nz: 1,
  depth: Number.POSITIVE_INFINITY,
  share: 1,
  inX: 0,
  inY: 0,
});

/** Of what is seen of a crown so much is its outermost leaves; the rest are seen between them, further in. */
const LEAVES_BEFORE = 0.7;
/** Those are so far in, from the surface to the middle of the crown; light comes to them from more sides. */
const INSIDE_SHARE = 0.5;
/** How much of the way that the bulge faces is left in there. */
const INSIDE_FACING = 0.4;

/** On a photo the nearest mark is seen, before the ground; above the horizon there is nothing. */
function onPhoto(scene: NightScene): Surfaces {
  const viewer = viewerOf(scene);
  const crowns = spaceOf(scene).crowns;
  const stand = standOf(scene, viewer);
  const patches: Patch[] = [];
  let owner = GROUND_OWNER;
  for (const face of scene.faces) patches.push(...facePatches(scene, viewer, stand, face, ++owner));
  for (const tree of scene.trees) {
    const crown = crowns.find(({ id }) => id === tree.id);
    if (!crown) continue;
    patches.push(crownPatch(viewer, stand, tree, crown, ++owner));
    patches.push(...trunkPatch(scene, viewer, stand, tree, crown, ++owner));
  }
  const m = scene.groundMatrix as unknown as Matrix3;
  const crownIds: (string | null)[] = new Array(owner + 1).fill(null);
  for (const patch of patches) crownIds[patch.owner] = patch.crownId;
  let near = surfacePoint();
  let other = surfacePoint();
  return {
    viewer,
    crownIds,
    at(u, v, take) {
      let seen = onGround(m, viewer, u, v, near);
      // What stands on the ground hides it, however the ground runs on behind.
      let nearest = Number.POSITIVE_INFINITY;
      for (const patch of patches) {
        if (!isInBox(patch, u, v) || !patch.at(u, v, other) || !(other.depth < nearest)) continue;
        nearest = other.depth;
        seen = true;
        [near, other] = [other, near];
      }
      if (!seen) return;
      if (near.kind !== SurfaceKind.crown) {
        take(near);
        return;
      }
      const rim = near.share;
      near.share = rim * LEAVES_BEFORE;
      take(near);
      near.x += near.inX * INSIDE_SHARE;
      near.y += near.inY * INSIDE_SHARE;
      near.nx *= INSIDE_FACING;
      near.ny *= INSIDE_FACING;
      near.nz *= INSIDE_FACING;
      near.share = rim * (1 - LEAVES_BEFORE);
      take(near);
      near.share = 1;
    },
  };
}

function onGround(m: Matrix3, viewer: Viewer, u: number, v: number, into: SurfacePoint): boolean {
  into.owner = GROUND_OWNER;
  into.kind = SurfaceKind.ground;
  const w = m[6] * u + m[7] * v + m[8];
  if (!(w > 0)) return false;
  into.x = (m[0] * u + m[1] * v + m[2]) / w;
  into.y = (m[3] * u + m[4] * v + m[5]) / w;
  into.z = 0;
  into.nx = 0;
  into.ny = 0;
  into.nz = 1;
  into.depth = viewer.depthOf(into.x, into.y, 0);
  return true;
}

/** Where the picture is seen from, on the ground: below the viewer, or else before the middle of the lower edge. */
function standOf(scene: NightScene, viewer: Viewer): PlanePoint {
  if (viewer.eye) return viewer.eye;
  for (const below of [3, 2, 1.5, 1]) {
    const p = groundUnder(scene, { x: scene.widthPx / 2, y: scene.heightPx * below });
    if (p) return p;
  }
  return { x: 0, y: 0 };
}

type Face = NightScene['faces'][number];
type Tree = NightScene['trees'][number];

function facePatches(
  scene: NightScene,
  viewer: Viewer,
  stand: PlanePoint,
  face: Face,
  owner: number,
): Patch[] {
  const ground = face.foot.map((p) => groundUnder(scene, p));
  const top = face.top ?? ground.map((g) => (g ? pixelOf(viewer, { ...g, z: face.heightMeters }) : null));
  return face.foot.flatMap((footA, i): Patch[] => {
    const footB = face.foot[i + 1];
    const [a, b, topA, topB] = [ground[i], ground[i + 1], top[i], top[i + 1]];
    if (!footB || !a || !b || !topA || !topB) return [];
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    const m = rectangleIn([footA, footB, topB, topA], length, face.heightMeters);
    if (!m) return [];
    const [dx, dy] = [(b.x - a.x) / length, (b.y - a.y) / length];
    // Towards the side that is seen.
    const side = (stand.x - a.x) * dy - (stand.y - a.y) * dx >= 0 ? 1 : -1;
    return [
      {
        ...boxOf([footA, footB, topA, topB]),
        owner,
        crownId: null,
        at(u, v, into) {
          const w = m[6] * u + m[7] * v + m[8];
          if (!(w > 0)) return false;
          const along = (m[0] * u + m[1] * v + m[2]) / w;
          const up = (m[3] * u + m[4] * v + m[5]) / w;
          if (!(along >= 0 && along <= length && up >= 0 && up <= face.heightMeters)) return false;
          into.kind = SurfaceKind.face;
          into.owner = owner;
          into.x = a.x + dx * along;
          into.y = a.y + dy * along;
          into.z = up;
          into.nx = side * dy;
          into.ny = -side * dx;
          into.nz = 0;
          into.depth = viewer.depthOf(into.x, into.y, into.z);
          return true;
        },
      },
    ];
  });
}

/**
 * A crown on a photo: within its outline, from the crown's base at the lowest point to the top at the highest;
 * towards the viewer as far as its ellipsoid bulges there.
 */
function crownPatch(viewer: Viewer, stand: PlanePoint, tree: Tree, crown: Crown, owner: number): Patch {
  const box = boxOf(tree.outline);
  const { x: tx, y: ty } = towards(crown, stand);
  // Across the view, to the right of the photo.
  const across = rightOf(viewer, crown, { x: -ty, y: tx });
  const middle = (box.left + box.right) / 2;
  const metersAcross = (2 * crown.radiusMeters) / Math.max(box.right - box.left, 1e-9);
  const metersUp = (tree.heightMeters - tree.crownBaseMeters) / Math.max(box.bottom - box.top, 1e-9);
  return {
    ...box,
    owner,
    crownId: tree.id,
    at(u, v, into) {
      if (!isInside(tree.outline, u, v)) return false;
      const aside = (u - middle) * metersAcross;
      const z = tree.crownBaseMeters + (box.bottom - v) * metersUp;
      roundAt(crown, across, tx, ty, aside, z, into);
      into.owner = owner;
      into.depth = viewer.depthOf(into.x, into.y, into.z);
      return true;
    },
  };
}

/** Between these shares of its radius a crown grows thinner, by so much: outlines go around its outermost leaves. */
const RIM_FROM = 0.8;
const RIM_TO = 1.05;
const RIM_THIN = 0.6;

/** The point of a crown's ellipsoid that faces the viewer, so far aside and so high. */
function roundAt(
  crown: Crown,
  across: PlanePoint,
  tx: number,
  ty: number,
  aside: number,
  z: number,
  into: SurfacePoint,
): void {
  const s = aside / crown.radiusMeters;
  const h = (z - crown.z) / crown.halfHeightMeters;
  const out = Math.sqrt(Math.max(1 - s * s - h * h, 0));
  into.kind = SurfaceKind.crown;
  into.inX = -tx * out * crown.radiusMeters;
  into.inY = -ty * out * crown.radiusMeters;
  into.x = crown.x + across.x * aside + tx * out * crown.radiusMeters;
  into.y = crown.y + across.y * aside + ty * out * crown.radiusMeters;
  into.z = z;
  const rim = Math.min(Math.max((Math.sqrt(s * s + h * h) - RIM_FROM) / (RIM_TO - RIM_FROM), 0), 1);
  into.share = 1 - RIM_THIN * rim * rim * (3 - 2 * rim);
  const sx = (across.x * s + tx * out) / crown.radiusMeters;
  const sy = (across.y * s + ty * out) / crown.radiusMeters;
  const sz = h / crown.halfHeightMeters;
  const length = Math.hypot(sx, sy, sz) || 1;
  into.nx = sx / length;
  into.ny = sy / length;
  into.nz = sz / length;
}

/** Trunks are about this share of the tree's height thick, from the middle to the bark. */
const TRUNK_RADIUS_SHARE = 0.024;
/** Below a crown that hangs lower than this no trunk is seen. */
const LEAST_TRUNK_METERS = 0.6;

/** The trunk between foot and crown, which the plan does not say but light climbs first of all. */
function trunkPatch(
  scene: NightScene,
  viewer: Viewer,
  stand: PlanePoint,
  tree: Tree,
  crown: Crown,
  owner: number,
): Patch[] {
  if (tree.crownBaseMeters < LEAST_TRUNK_METERS) return [];
  const box = boxOf(tree.outline);
  const foot = tree.foot;
  if (!(foot.y > box.bottom)) return [];
  const stands = groundUnder(scene, foot);
  // Up to well inside of the crown, which hides the rest.
  const head = stands && pixelOf(viewer, { ...stands, z: crown.z });
  if (!head || !(foot.y > head.y)) return [];
  const radius = Math.min(Math.max(TRUNK_RADIUS_SHARE * tree.heightMeters, 0.04), 0.4);
  const perMeter = pixelsAcrossAt(viewer, stands);
  const half = radius * perMeter;
  const { x: tx, y: ty } = towards(crown, stand);
  const across = rightOf(viewer, crown, { x: -ty, y: tx });
  const metersUp = tree.crownBaseMeters / (foot.y - box.bottom);
  return [
    {
      left: Math.min(foot.x, head.x) - half,
      right: Math.max(foot.x, head.x) + half,
      top: head.y,
      bottom: foot.y,
      owner,
      crownId: tree.id,
      at(u, v, into) {
        const t = (foot.y - v) / (foot.y - head.y);
        // A trunk tapers to about two thirds below its crown.
        const width = half * (1 - 0.35 * t);
        const s = (u - (foot.x + (head.x - foot.x) * t)) / width;
        if (!(s >= -1 && s <= 1 && t >= 0 && t <= 1)) return false;
        const out = Math.sqrt(1 - s * s);
        into.kind = SurfaceKind.face;
        into.owner = owner;
        into.nx = across.x * s + tx * out;
        into.ny = across.y * s + ty * out;
        into.nz = 0;
        into.x = stands.x + into.nx * radius;
        into.y = stands.y + into.ny * radius;
        into.z = Math.min((foot.y - v) * metersUp, crown.z);
        into.depth = viewer.depthOf(into.x, into.y, into.z);
        return true;
      },
    },
  ];
}

/** Pixels to a metre across the view, at a place on the ground. */
function pixelsAcrossAt(viewer: Viewer, { x, y }: PlanePoint): number {
  const step = 0.01;
  const here = viewer.see(x, y, 0);
  const east = viewer.see(x + step, y, 0);
  const north = viewer.see(x, y + step, 0);
  if (!here || !east || !north) return 0;
  return Math.hypot(east.u - here.u, north.u - here.u) / step;
}

function pixelOf(viewer: Viewer, p: Point3): PlanePoint | null {
  const seen = viewer.see(p.x, p.y, p.z);
  return seen && { x: seen.u, y: seen.v };
}

/** The way along `axis` that goes right on the photo. */
function rightOf(viewer: Viewer, crown: Crown, axis: PlanePoint): PlanePoint {
  const here = viewer.see(crown.x, crown.y, 0);
  const there = viewer.see(crown.x + 0.1 * axis.x, crown.y + 0.1 * axis.y, 0);
  const isRight = !here || !there || there.u >= here.u;
  return isRight ? axis : { x: -axis.x, y: -axis.y };
}

function towards(from: PlanePoint, to: PlanePoint): PlanePoint {
  const dx = to.x - from.x;
  const dy = to.y - from.y;
  const length = Math.hypot(dx, dy);
  return length > 0 ? { x: dx / length, y: dy / length } : { x: 0, y: -1 };
}

/** Light on a wall seen from above shows in a band of so many metres at its foot … */
const BAND_METERS = 0.5;
/** … or of so many thousandths of the sheet's long edge, whichever is wider. */
const BAND_PER_MILLE = 4;
/** It is the light at this share of the wall's height, but no higher than {@link BAND_MOST_HEIGHT}. */
const BAND_HEIGHT_SHARE = 0.4;
const BAND_MOST_HEIGHT = 1.2;
/** Of what is seen from above under a tree, its crown is so much; the rest is the ground between its leaves. */
const CROWN_SHARE = 0.6;
/** Heights in a crown at which its light is taken: from its base at −1 to its top at 1. */
const CROWN_LEVELS = [-0.6, 0, 0.6] as const;

/**
 * A drawing from above: the ground, the crowns that light shines up into, and walls as a band of light at their
 * outer foot. Nothing inside of buildings.
 */
function onPlan(scene: NightScene): Surfaces {
  const viewer = viewerOf(scene);
  const m = scene.groundMatrix as unknown as Matrix3;
  const perPixel = 1 / pixelsAcross(m, scene.widthPx / 2, scene.heightPx / 2);
  const band = Math.max(
    BAND_METERS,
    (BAND_PER_MILLE / 1000) * Math.max(scene.widthPx, scene.heightPx) * perPixel,
  );
  const space = spaceOf(scene);
  const crowns = scene.trees.flatMap((tree) => {
    const crown = space.crowns.find(({ id }) => id === tree.id);
    return crown ? [{ tree, crown, box: boxOf(tree.outline) }] : [];
  });
  const buildings = scene.buildings.map(({ points }) => ({ points, box: boxOf(points) }));
  const wallOwner = crowns.length + 1;
  const point = surfacePoint();
  return {
    viewer,
    crownIds: [null, ...crowns.map(({ tree }) => tree.id), ...space.walls.map(() => null)],
    at(u, v, take) {
      if (!onGround(m, viewer, u, v, point)) return;
      const { x, y } = point;
      for (const { points, box } of buildings) if (isInBox(box, u, v) && isInside(points, u, v)) return;
      let left = 1;
      for (const [i, { tree, crown, box }] of crowns.entries()) {
        if (!isInBox(box, u, v) || !isInside(tree.outline, u, v)) continue;
        // Seen from above are leaves at all heights, lit from all around.
        Object.assign(point, { kind: SurfaceKind.crown, owner: i + 1, x, y, nx: 0, ny: 0, nz: 0 });
        point.share = (left * CROWN_SHARE) / CROWN_LEVELS.length;
        for (const level of CROWN_LEVELS) {
          point.z = crown.z + level * crown.halfHeightMeters;
          take(point);
        }
        left *= 1 - CROWN_SHARE;
      }
      for (const [i, wall] of space.walls.entries()) {
        const dx = wall.bx - wall.ax;
        const dy = wall.by - wall.ay;
        const length2 = dx * dx + dy * dy;
        if (length2 === 0) continue;
        const t = Math.min(Math.max(((x - wall.ax) * dx + (y - wall.ay) * dy) / length2, 0), 1);
        const ox = x - wall.ax - t * dx;
        const oy = y - wall.ay - t * dy;
        const distance = Math.hypot(ox, oy);
        if (!(distance < band) || distance === 0) continue;
        const fade = 1 - distance / band;
        Object.assign(point, { kind: SurfaceKind.face, owner: wallOwner + i, nz: 0 });
        point.nx = ox / distance;
        point.ny = oy / distance;
        // Just before the wall, on the side that is seen from.
        point.x = wall.ax + t * dx + point.nx * 0.001;
        point.y = wall.ay + t * dy + point.ny * 0.001;
        point.z = Math.min(wall.heightMeters * BAND_HEIGHT_SHARE, BAND_MOST_HEIGHT);
        point.share = left * fade;
        left -= point.share;
        take(point);
      }
      onGround(m, viewer, u, v, point);
      point.share = left;
      take(point);
      point.share = 1;
    },
  };
}

interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

function boxOf(points: readonly PlanePoint[]): Box {
  const xs = points.map((p) => p.x);
  const ys = points.map((p) => p.y);
  return { left: Math.min(...xs), right: Math.max(...xs), top: Math.min(...ys), bottom: Math.max(...ys) };
}

const isInBox = (box: Box, u: number, v: number): boolean =>
  u >= box.left && u <= box.right && v >= box.top && v <= box.bottom;

/** By the even-odd rule. */
export function isInside(points: readonly PlanePoint[], u: number, v: number): boolean {
  let inside = false;
  let p = points[points.length - 1]!;
  for (const q of points) {
    if (p.y > v !== q.y > v && u < p.x + ((q.x - p.x) * (v - p.y)) / (q.y - p.y)) inside = !inside;
    p = q;
  }
  return inside;
}
