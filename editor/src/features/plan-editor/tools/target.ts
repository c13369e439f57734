import { sheetPoint } from '@lampwright/geometry/estimate';
import type { Aim, FaceRecord, TreeRecord } from '@lampwright/geometry/plan';
import { applyHomography, homographyFromPoints, uprightPoint } from '@lampwright/geometry/sheet';
import { meters } from '@lampwright/geometry/units';
import { boxAround, type Point } from '../../../plan-view/camera';
import { insidePolygon, nearestOn } from './hit';
import type { ToolContext } from './tool';
import { cameraOf, isOnGround, sheetOf } from './uprights';

/** The edge of a face is met within this many window pixels on a drawing from above. */
const EDGE_REACH = 8;

export type PointAim = Extract<Aim, { kind: 'point' }>;

/** What a place on the sheet is when light is aimed at it. */
export interface AimTarget {
  readonly on: 'ground' | 'face' | 'tree';
  readonly aim: PointAim;
}

const at = ({ x, y }: Point, heightMeters: number): PointAim => ({
  kind: 'point',
  at: { x, y },
  heightMeters: Math.min(100, Math.max(0, heightMeters)),
});

/**
 * What light aimed at a place of the sheet would be aimed at: on a marked crown or face at the height that was
 * clicked, else the ground. On a drawing from above, half-way up what stands there. Null for the sky.
 */
export function aimTarget(ctx: ToolContext, p: Point): AimTarget | null {
  const photo = sheetOf(ctx)?.view === 'photo';
  // What was marked last lies over what was marked before it.
  const records = [...ctx.doc().values()].filter((r) => 'sheetId' in r && r.sheetId === ctx.sheetId());
  for (const record of records.reverse())
    if (record.kind === 'tree' && insidePolygon(record.outline, p))
      return { on: 'tree', aim: photo ? onCrown(ctx, record, p) : at(p, middleHeight(record)) };
  for (const record of records) {
    if (record.kind !== 'face') continue;
    const aim = photo ? onFace(record, p) : onEdge(ctx, record, p);
    if (aim !== null) return { on: 'face', aim };
  }
  return isOnGround(ctx, p) ? { on: 'ground', aim: at(p, 0) } : null;
}

const middleHeight = (tree: TreeRecord): number => (tree.heightMeters + tree.crownBaseMeters) / 2;

function onCrown(ctx: ToolContext, tree: TreeRecord, p: Point): PointAim {
  const scale = ctx.scale();
  const camera = cameraOf(sheetOf(ctx), scale);
  const foot = scale?.groundFromSheet(sheetPoint(tree.foot)) ?? null;
  const point = camera === null || foot === null ? null : uprightPoint(camera, foot, p);
  const below =
    point === null || scale === null
      ? null
      : scale.sheetFromGround({ x: meters(point.x), y: meters(point.y) });
  if (point !== null && below !== null) return at(below, Math.min(point.z, tree.heightMeters));
  // Without a camera: by the share of the crown's extent on the sheet.
  const box = boxAround(tree.outline)!;
  const share = (box.bottom - p.y) / Math.max(box.bottom - box.top, 1);
  return at(
    { x: p.x, y: tree.foot.y },
    tree.crownBaseMeters + share * (tree.heightMeters - tree.crownBaseMeters),
  );
}

const unitSquare = [
  { x: 0, y: 0 },
  { x: 1, y: 0 },
  { x: 1, y: 1 },
  { x: 0, y: 1 },
] as const;

/** Where on the foot, and how high over it, a place in one of the face's panels is; null outside of all. */
function onFace(face: FaceRecord, p: Point): PointAim | null {
  const { foot, top, heightMeters } = face;
  if (top === null) return null;
  for (let i = 0; i + 1 < foot.length; i++) {
    const panel = [foot[i]!, foot[i + 1]!, top[i + 1]!, top[i]!];
    if (!insidePolygon(panel, p)) continue;
    const pairs = panel.map((to, k) => ({ to, from: unitSquare[k]! }));
    const toSheet = homographyFromPoints(pairs);
    const toPanel = homographyFromPoints(pairs.map(({ from, to }) => ({ from: to, to: from })));
    const place = toPanel && applyHomography(toPanel, p);
    const below = place && toSheet && applyHomography(toSheet, { x: place.x, y: 0 });
    if (place && below) return at(below, place.y * heightMeters);
  }
  return null;
}

function onEdge(ctx: ToolContext, face: FaceRecord, p: Point): PointAim | null {
  const near = nearestOn(face.foot, p);
  if (near === null || near.distance * ctx.zoom() > EDGE_REACH) return null;
  return at(near.at, face.heightMeters / 2);
}

/** Where on the ground, in metres, a target is or stands above; null without a scale. */
export function groundOfTarget(ctx: Pick<ToolContext, 'scale'>, { aim }: AimTarget): Point | null {
  return ctx.scale()?.groundFromSheet(sheetPoint(aim.at)) ?? null;
}
