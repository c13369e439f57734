import { sheetPoint } from '@lampwright/geometry/estimate';
import { recordOf, type SheetRecord } from '@lampwright/geometry/plan';
import {
  heightAbove,
  photoCamera,
  planCamera,
  type SheetCamera,
  type SolvedScale,
  uprightPoint,
} from '@lampwright/geometry/sheet';
import type { Point } from '../../../plan-view/camera';
import type { ToolContext } from './tool';

type World = Pick<ToolContext, 'doc' | 'sheetId' | 'scale'>;

/** A crown whose lower edge is no higher than this, as the camera tells it, is a shrub's: it begins at the ground. */
const SHRUB_BASE_METERS = 0.3;

/** The open sheet; undefined where it is gone. */
export function sheetOf(world: Pick<ToolContext, 'doc' | 'sheetId'>): SheetRecord | undefined {
  return recordOf(world.doc(), world.sheetId(), 'sheet');
}

export const NOT_ON_GROUND = 'That is above the horizon of this photo: click where it stands on the ground.';

/** False for places that the sheet's scale knows to be no ground. */
export function isOnGround(world: World, p: Point): boolean {
  const scale = world.scale();
  return scale === null || scale.groundFromSheet(sheetPoint(p)) !== null;
}

/** How the open sheet sees what stands up; null without a scale, and where a photo doesn't tell its camera. */
export function cameraOf(sheet: SheetRecord | undefined, scale: SolvedScale | null): SheetCamera | null {
  if (sheet === undefined || scale === null) return null;
  return sheet.view === 'plan' ? planCamera(scale.groundMatrix) : photoCamera(scale.groundMatrix, sheet);
}

/** The upper edge over a foot as a photo sees it, and how high it is: null where the photo doesn't tell. */
export interface UpperEdge {
  readonly top: readonly Point[];
  readonly heightMeters: number | null;
}

/**
 * The upper edge of a face of even height, from one click above the first point of its foot. By the photo's camera
 * where that is known, else by how large things are seen at each point, else as high everywhere on the sheet.
 */
export function upperEdge(world: World, foot: readonly Point[], click: Point): UpperEdge {
  const scale = world.scale();
  return byCamera(world, scale, foot, click) ?? { top: byDepth(scale, foot, click), heightMeters: null };
}

function byCamera(
  world: World,
  scale: SolvedScale | null,
  foot: readonly Point[],
  click: Point,
): UpperEdge | null {
  const camera = cameraOf(sheetOf(world), scale);
  if (camera === null || scale === null) return null;
  const ground = foot.map((p) => scale.groundFromSheet(sheetPoint(p)));
  const [first] = ground;
  const height = first ? heightAbove(camera, first, click) : null;
  if (height === null) return null;
  const top = ground.map((g) => (g === null ? null : camera.project({ x: g.x, y: g.y, z: height })));
  return top.every((p) => p !== null) ? { top, heightMeters: height } : null;
}

/** What stands at a place is seen the smaller the nearer to the horizon its foot is. */
function byDepth(scale: SolvedScale | null, foot: readonly Point[], click: Point): Point[] {
  const first = foot[0]!;
  const size = ({ x, y }: Point): number => {
    if (scale === null) return 1;
    const m = scale.groundMatrix;
    return m[6] * x + m[7] * y + m[8];
  };
  const dx = click.x - first.x;
  const dy = click.y - first.y;
  const unit = size(first);
  return foot.map((p) => {
    const share = unit > 0 ? size(p) / unit : 1;
    const k = share > 0 ? share : 1;
    return { x: p.x + dx * k, y: p.y + dy * k };
  });
}

/** How high a face is, by the camera, in the mean of its points; null where the photo doesn't tell. */
export function faceHeight(world: World, foot: readonly Point[], top: readonly Point[]): number | null {
  const scale = world.scale();
  const camera = cameraOf(sheetOf(world), scale);
  if (camera === null || scale === null) return null;
  const heights = foot.flatMap((p, i) => {
    const ground = scale.groundFromSheet(sheetPoint(p));
    const seen = top[i];
    const height = ground === null || seen === undefined ? null : heightAbove(camera, ground, seen);
    return height === null ? [] : [height];
  });
  return heights.length === 0 ? null : heights.reduce((sum, h) => sum + h, 0) / heights.length;
}

export interface CrownHeights {
  readonly heightMeters: number;
  readonly crownBaseMeters: number;
}

/** How high a crown reaches and begins, as seen over its foot; null where the sheet doesn't tell. */
export function crownHeights(world: World, foot: Point, outline: readonly Point[]): CrownHeights | null {
  const scale = world.scale();
  const camera = cameraOf(sheetOf(world), scale);
  const ground = scale?.groundFromSheet(sheetPoint(foot)) ?? null;
  if (camera === null || ground === null || camera.eye === null) return null;
  const heights = outline.map((p) => uprightPoint(camera, ground, p)?.z ?? 0);
  const heightMeters = Math.max(...heights);
  const lowest = Math.min(...heights);
  if (!(heightMeters > 0)) return null;
  const crownBaseMeters = lowest < SHRUB_BASE_METERS || lowest >= heightMeters ? 0 : lowest;
  return { heightMeters, crownBaseMeters };
}
