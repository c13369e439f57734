import { boxAround, type Camera, type Point, toWindow } from '../camera';
import { ink, paper } from '../palette';
import { trace } from './cable';

/** A wall, a house face or a fence: its foot on the ground, and on a photo its upper edge. */
export interface FaceShape {
  readonly id: string;
  readonly foot: readonly Point[];
  readonly top: readonly Point[] | null;
  readonly label: string;
}

/** A tree or shrub: where it stands, and its crown. */
export interface TreeShape {
  readonly id: string;
  readonly foot: Point;
  readonly outline: readonly Point[];
  readonly label: string;
}

const FAINT_PAPER = 'rgba(251, 248, 242, 0.6)';
const FAINT_INK = 'rgba(22, 32, 46, 0.62)';
/** Window pixels between the strokes that say "light ends here", and how long they are. */
const STROKE_STEP = 9;
const STROKE_LENGTH = 8;
/** More strokes than this along one line are seen as grey. */
const MOST_STROKES = 400;

/**
 * A wall face: an outline with fine strokes hanging from its upper edge; on a drawing from above its foot alone, with
 * the strokes slanting across it. The same in black and white.
 */
export function drawFace(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  face: Pick<FaceShape, 'foot' | 'top'>,
  chosen: boolean,
): void {
  const foot = face.foot.map((p) => toWindow(camera, p));
  const top = face.top?.map((p) => toWindow(camera, p)) ?? null;
  line(ctx, chosen, () => {
    ctx.beginPath();
    join(ctx, top === null ? foot : [...foot, ...[...top].reverse()]);
    if (top !== null) ctx.closePath();
  });
  strokes(ctx, chosen, () => {
    if (top === null) {
      for (const { at, along } of steps(foot)) slant(ctx, at, along);
      return;
    }
    for (const [i, a] of top.entries()) {
      const b = top[i + 1];
      if (b === undefined) break;
      for (const { at, share } of steps([a, b])) hang(ctx, at, mixed(foot[i]!, foot[i + 1]!, share));
    }
  });
  if (!chosen) return;
  for (const p of foot) grip(ctx, p);
  for (const p of top ?? []) grip(ctx, p);
}

/** A tree or shrub: its crown's outline with strokes inwards, a line for its trunk and a mark where it stands. */
export function drawTree(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  tree: Pick<TreeShape, 'foot' | 'outline'>,
  chosen: boolean,
): void {
  const outline = tree.outline.map((p) => toWindow(camera, p));
  const foot = toWindow(camera, tree.foot);
  line(ctx, chosen, () => {
    ctx.beginPath();
    join(ctx, outline);
    ctx.closePath();
    const trunk = trunkOf(foot, outline);
    if (trunk !== null) join(ctx, [foot, trunk]);
  });
  if (outline.length >= 3) {
    const box = boxAround(outline)!;
    const middle = { x: (box.left + box.right) / 2, y: (box.top + box.bottom) / 2 };
    strokes(ctx, chosen, () => {
      for (const { at } of steps([...outline, outline[0]!], STROKE_STEP * 1.6)) hang(ctx, at, middle);
    });
  }
  standing(ctx, foot, chosen);
  if (chosen && outline.length <= MOST_STROKES) for (const p of outline) grip(ctx, p);
}

/** Where a tree stands: a ring with its trunk in it. */
function standing(ctx: CanvasRenderingContext2D, p: Point, chosen: boolean): void {
  const r = chosen ? 6 : 4.5;
  ctx.beginPath();
  ctx.arc(p.x, p.y, r, 0, Math.PI * 2);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.strokeStyle = ink;
  ctx.lineWidth = chosen ? 2 : 1.25;
  ctx.stroke();
  ctx.beginPath();
  ctx.arc(p.x, p.y, 1.75, 0, Math.PI * 2);
  ctx.fillStyle = ink;
  ctx.fill();
}

/** Where the trunk meets the crown; null where the tree stands within its crown, as from above. */
function trunkOf(foot: Point, outline: readonly Point[]): Point | null {
  const box = boxAround(outline);
  if (box === null || foot.y <= box.bottom) return null;
  return { x: foot.x + ((box.left + box.right) / 2 - foot.x) * 0.2, y: box.bottom };
}

function line(ctx: CanvasRenderingContext2D, chosen: boolean, path: () => void): void {
  ctx.lineJoin = 'round';
  ctx.lineCap = 'round';
  path();
  ctx.strokeStyle = chosen ? paper : FAINT_PAPER;
  ctx.lineWidth = chosen ? 6 : 3.25;
  ctx.stroke();
  ctx.strokeStyle = chosen ? ink : FAINT_INK;
  ctx.lineWidth = chosen ? 2.5 : 1.25;
  ctx.stroke();
}

function strokes(ctx: CanvasRenderingContext2D, chosen: boolean, path: () => void): void {
  ctx.lineCap = 'butt';
  ctx.beginPath();
  path();
  ctx.strokeStyle = FAINT_PAPER;
  ctx.lineWidth = 2.25;
  ctx.stroke();
  ctx.strokeStyle = chosen ? ink : FAINT_INK;
  ctx.lineWidth = 1;
  ctx.stroke();
}

function hang(ctx: CanvasRenderingContext2D, at: Point, towards: Point): void {
  const length = Math.hypot(towards.x - at.x, towards.y - at.y);
  if (length < 1) return;
  const k = Math.min(STROKE_LENGTH, length / 3) / length;
  ctx.moveTo(at.x, at.y);
  ctx.lineTo(at.x + (towards.x - at.x) * k, at.y + (towards.y - at.y) * k);
}

function slant(ctx: CanvasRenderingContext2D, at: Point, along: Point): void {
  const h = STROKE_LENGTH / 2;
  // Half-way between along the wall and across it.
  const x = (along.x - along.y) * Math.SQRT1_2 * h;
  const y = (along.y + along.x) * Math.SQRT1_2 * h;
  ctx.moveTo(at.x - x, at.y - y);
  ctx.lineTo(at.x + x, at.y + y);
}

interface Step {
  readonly at: Point;
  /** The direction of the line there, of length 1. */
  readonly along: Point;
  /** How far along its part of the line it is, from 0 to 1. */
  readonly share: number;
}

/** Places along a line, evenly spaced. */
function steps(points: readonly Point[], step = STROKE_STEP): Step[] {
  const lengths = points.slice(1).map((p, i) => Math.hypot(p.x - points[i]!.x, p.y - points[i]!.y));
  const whole = lengths.reduce((sum, l) => sum + l, 0);
  const every = Math.max(step, whole / MOST_STROKES);
  const found: Step[] = [];
  let next = every / 2;
  for (const [i, length] of lengths.entries()) {
    const a = points[i]!;
    const b = points[i + 1]!;
    for (; next < length; next += every)
      found.push({
        at: mixed(a, b, next / length),
        along: { x: (b.x - a.x) / length, y: (b.y - a.y) / length },
        share: next / length,
      });
    next -= length;
  }
  return found;
}

function mixed(a: Point, b: Point, share: number): Point {
  return { x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share };
}

function join(ctx: CanvasRenderingContext2D, points: readonly Point[]): void {
  trace(ctx, { x: 0, y: 0, zoom: 1 }, points);
}

function grip(ctx: CanvasRenderingContext2D, p: Point): void {
  ctx.beginPath();
  ctx.arc(p.x, p.y, 3.5, 0, Math.PI * 2);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.strokeStyle = ink;
  ctx.lineWidth = 1.5;
  ctx.stroke();
}
