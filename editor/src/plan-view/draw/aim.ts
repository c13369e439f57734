import { type Camera, type Point, toWindow } from '../camera';
import { ink, lamp, paper } from '../palette';
import { trace } from './cable';

/** A light's aim in sheet pixels. */
export interface AimShape {
  readonly mark: Point;
  readonly from: Point;
  readonly to: Point;
  readonly edge: readonly (readonly Point[])[];
}

/** A lamp that is this far above its mark, in window pixels, is joined to it by a plumb line. */
const PLUMB_FROM = 7;
const ARM = 6.5;

/** Where a beam has half of its peak: a dashed line in the lamp's own colour, cased so that it reads over any ground. */
export function drawBeamEdge(ctx: CanvasRenderingContext2D, camera: Camera, edge: AimShape['edge']): void {
  if (edge.length === 0) return;
  ctx.lineJoin = 'round';
  ctx.lineCap = 'butt';
  ctx.beginPath();
  for (const line of edge) trace(ctx, camera, line);
  ctx.strokeStyle = 'rgba(22, 32, 46, 0.7)';
  ctx.lineWidth = 3.5;
  ctx.stroke();
  ctx.strokeStyle = lamp;
  ctx.lineWidth = 2;
  ctx.setLineDash([7, 5]);
  ctx.stroke();
  ctx.setLineDash([]);
}

/** The middle of a beam, from the light to what it meets; a lamp high above its mark hangs on a plumb line. */
export function drawAimLine(ctx: CanvasRenderingContext2D, camera: Camera, aim: AimShape): void {
  const mark = toWindow(camera, aim.mark);
  const from = toWindow(camera, aim.from);
  const to = toWindow(camera, aim.to);
  ctx.lineCap = 'round';
  if (Math.hypot(mark.x - from.x, mark.y - from.y) >= PLUMB_FROM) {
    twice(ctx, [2, 3], 1, () => segment(ctx, mark, from));
    ctx.beginPath();
    ctx.arc(from.x, from.y, 3, 0, Math.PI * 2);
    ctx.fillStyle = lamp;
    ctx.fill();
    ctx.strokeStyle = ink;
    ctx.lineWidth = 1.25;
    ctx.stroke();
  }
  twice(ctx, [], 1.25, () => segment(ctx, from, to));
}

/** The cross that is dragged to aim. */
export function drawAimCross(ctx: CanvasRenderingContext2D, p: Point): void {
  ctx.lineCap = 'round';
  twice(ctx, [], 1.75, () => {
    ctx.beginPath();
    ctx.moveTo(p.x - ARM, p.y);
    ctx.lineTo(p.x + ARM, p.y);
    ctx.moveTo(p.x, p.y - ARM);
    ctx.lineTo(p.x, p.y + ARM);
    ctx.stroke();
  });
}

function segment(ctx: CanvasRenderingContext2D, a: Point, b: Point): void {
  ctx.beginPath();
  ctx.moveTo(a.x, a.y);
  ctx.lineTo(b.x, b.y);
  ctx.stroke();
}

function twice(ctx: CanvasRenderingContext2D, dash: number[], width: number, stroke: () => void): void {
  ctx.strokeStyle = paper;
  ctx.lineWidth = width + 2.5;
  stroke();
  ctx.strokeStyle = ink;
  ctx.lineWidth = width;
  ctx.setLineDash(dash);
  stroke();
  ctx.setLineDash([]);
}
