import { markRadius, type Point, toWindow } from '../../../plan-view/camera';
import { drawAimCross } from '../../../plan-view/draw/aim';
import { drawCables, trace } from '../../../plan-view/draw/cable';
import { drawHub, drawNote, drawSplice, drawTransformer } from '../../../plan-view/draw/nodes';
import { drawMeasurement, workingLabelAt } from '../../../plan-view/draw/scene';
import type { MarkSprites } from '../../../plan-view/draw/sprites';
import { drawFace, drawTree } from '../../../plan-view/draw/uprights';
import { ink, lamp, paper } from '../../../plan-view/palette';
import { drawProposed } from '../placing/draw';
import type { PlaceMark, Preview } from '../tools/tool';
import type { PaintState } from './paint-state';

/** A segment shorter than this, in window pixels, is only just begun: its length would cover it. */
const SHORTEST_TOLD = 24;

/** Shows what the tool at work is about to do. */
export function drawPreview(
  ctx: CanvasRenderingContext2D,
  state: PaintState,
  preview: Preview,
  sprites: MarkSprites,
): void {
  const { camera } = state;
  switch (preview.kind) {
    case 'move':
      return;
    case 'box': {
      const a = toWindow(camera, preview.a);
      const b = toWindow(camera, preview.b);
      ctx.fillStyle = 'rgba(22, 32, 46, 0.08)';
      ctx.fillRect(a.x, a.y, b.x - a.x, b.y - a.y);
      strokeTwice(ctx, () => ctx.strokeRect(a.x, a.y, b.x - a.x, b.y - a.y), [5, 4]);
      return;
    }
    case 'shape':
      drawShape(ctx, state, preview.id, preview.points);
      return;
    case 'cable': {
      const points = preview.pending === null ? preview.points : [...preview.points, preview.pending];
      if (points.length > 1) drawCables(ctx, camera, [{ points, weight: 2.5, colour: ink, dashed: false }]);
      for (const p of preview.points) bead(ctx, toWindow(camera, p));
      if (preview.snap !== null) snapRing(ctx, toWindow(camera, preview.snap), markRadius(camera));
      segmentLabel(ctx, state, points);
      return;
    }
    case 'polygon': {
      const points = preview.pending === null ? preview.points : [...preview.points, preview.pending];
      ctx.beginPath();
      trace(ctx, camera, points);
      ctx.fillStyle = 'rgba(237, 230, 216, 0.35)';
      ctx.fill();
      strokeTwice(ctx, () => ctx.stroke(), []);
      for (const p of preview.points.slice(0, 200)) bead(ctx, toWindow(camera, p));
      segmentLabel(ctx, state, points);
      return;
    }
    case 'polyline': {
      const points = preview.pending === null ? preview.points : [...preview.points, preview.pending];
      if (points.length > 0) drawMeasurement(ctx, camera, points, state.lengthText(points), true);
      return;
    }
    case 'face': {
      const foot = preview.pending === null ? preview.foot : [...preview.foot, preview.pending];
      drawFace(ctx, camera, { foot, top: preview.top }, true);
      segmentLabel(ctx, state, foot);
      return;
    }
    case 'tree': {
      const outline = preview.pending === null ? preview.outline : [...preview.outline, preview.pending];
      drawTree(ctx, camera, { foot: preview.foot, outline }, true);
      return;
    }
    case 'aim':
      drawAimCross(ctx, toWindow(camera, preview.at));
      return;
    case 'proposed':
      drawProposed(ctx, camera, preview, sprites);
      return;
    case 'place':
      ctx.globalAlpha = 0.85;
      placeMark(ctx, toWindow(camera, preview.at), markRadius(camera), preview.mark, sprites);
      ctx.globalAlpha = 1;
      if (preview.snapped) snapRing(ctx, toWindow(camera, preview.at), markRadius(camera));
      return;
    case 'scale': {
      const points = preview.pending === null ? [...preview.points] : [...preview.points, preview.pending];
      if (preview.shape === 'rectangle' && points.length > 2) points.push(points[0]!);
      ctx.beginPath();
      trace(ctx, camera, points);
      strokeTwice(ctx, () => ctx.stroke(), []);
      if (preview.pending !== null) crosshair(ctx, toWindow(camera, preview.pending));
      for (const p of preview.points) crosshair(ctx, toWindow(camera, p));
      return;
    }
  }
}

function drawShape(
  ctx: CanvasRenderingContext2D,
  state: PaintState,
  id: string,
  points: readonly Point[],
): void {
  const { camera, scene } = state;
  const cable = scene.cables.find((c) => c.id === id);
  if (cable !== undefined) {
    drawCables(ctx, camera, [{ ...cable, points }]);
    for (const p of points.slice(1, -1)) bead(ctx, toWindow(camera, p));
    return;
  }
  ctx.beginPath();
  trace(ctx, camera, points);
  if (scene.areas.some((a) => a.id === id)) ctx.closePath();
  strokeTwice(ctx, () => ctx.stroke(), [4, 3]);
  for (const p of points.slice(0, 200)) bead(ctx, toWindow(camera, p));
}

function segmentLabel(ctx: CanvasRenderingContext2D, state: PaintState, points: readonly Point[]): void {
  const a = points.at(-2);
  const b = points.at(-1);
  if (a === undefined || b === undefined) return;
  const p = toWindow(state.camera, a);
  const q = toWindow(state.camera, b);
  if (Math.hypot(p.x - q.x, p.y - q.y) < SHORTEST_TOLD) return;
  const text = state.lengthText([a, b]);
  if (text === '') return;
  workingLabelAt(ctx, { x: (p.x + q.x) / 2, y: (p.y + q.y) / 2 }, text);
}

function placeMark(
  ctx: CanvasRenderingContext2D,
  p: Point,
  r: number,
  mark: PlaceMark,
  sprites: MarkSprites,
): void {
  if (mark.kind === 'fixture') {
    sprites.stamp(ctx, p.x, p.y, r, { kind: 'unwired', tint: 0, notch: null }, mark.initial);
    return;
  }
  ctx.translate(p.x, p.y);
  switch (mark.kind) {
    case 'transformer':
      drawTransformer(ctx, r, 'T', false, 'calm');
      break;
    case 'hub':
      drawHub(ctx, r);
      break;
    case 'splice':
      drawSplice(ctx, r);
      break;
    case 'note':
      drawNote(ctx, r);
      break;
  }
  ctx.translate(-p.x, -p.y);
}

function strokeTwice(ctx: CanvasRenderingContext2D, stroke: () => void, dash: number[]): void {
  ctx.lineJoin = 'round';
  ctx.strokeStyle = paper;
  ctx.lineWidth = 3.5;
  stroke();
  ctx.strokeStyle = ink;
  ctx.lineWidth = 1.5;
  ctx.setLineDash(dash);
  stroke();
  ctx.setLineDash([]);
}

function bead(ctx: CanvasRenderingContext2D, p: Point): void {
  ctx.beginPath();
  ctx.arc(p.x, p.y, 4, 0, Math.PI * 2);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.strokeStyle = ink;
  ctx.lineWidth = 1.5;
  ctx.stroke();
}

/** The lamp's own colour where a click will join something: light means "on". */
function snapRing(ctx: CanvasRenderingContext2D, p: Point, r: number): void {
  for (const [colour, width] of [
    [ink, 5],
    [lamp, 3],
  ] as const) {
    ctx.beginPath();
    ctx.arc(p.x, p.y, r + 4, 0, Math.PI * 2);
    ctx.strokeStyle = colour;
    ctx.lineWidth = width;
    ctx.stroke();
  }
}

function crosshair(ctx: CanvasRenderingContext2D, p: Point): void {
  const arms = (): void => {
    ctx.beginPath();
    for (const [x, y] of [
      [1, 0],
      [-1, 0],
      [0, 1],
      [0, -1],
    ] as const) {
      ctx.moveTo(p.x + x * 3, p.y + y * 3);
      ctx.lineTo(p.x + x * 11, p.y + y * 11);
    }
    ctx.stroke();
  };
  strokeTwice(ctx, arms, []);
}
