import type { PlanDocument } from '@lampwright/geometry/plan';
import { type Camera, markRadius, toWindow } from '../src/plan-view/camera';
import { chalk, fontFamily, ink, paper } from '../src/plan-view/palette';

interface BareScene {
  readonly camera: Camera;
  readonly doc: PlanDocument;
  readonly picture: HTMLCanvasElement;
}

/**
 * The same plan as one would draw it without any care: everything, in one pass over one canvas, each frame.
 * What the plan page's drawing is measured against.
 */
export function drawBare(ctx: CanvasRenderingContext2D, { camera, doc, picture }: BareScene): void {
  const { width, height } = ctx.canvas;
  ctx.clearRect(0, 0, width, height);
  ctx.drawImage(picture, camera.x, camera.y, picture.width * camera.zoom, picture.height * camera.zoom);
  ctx.lineCap = 'round';
  for (const [colour, weight] of [
    [paper, 6.5],
    [ink, 3],
  ] as const)
    for (const record of doc.values()) {
      if (record.kind !== 'cable') continue;
      const from = doc.get(record.fromId);
      const to = doc.get(record.toId);
      if (from === undefined || to === undefined || !('at' in from) || !('at' in to)) continue;
      const a = toWindow(camera, from.at);
      const b = toWindow(camera, to.at);
      ctx.beginPath();
      ctx.moveTo(a.x, a.y);
      ctx.lineTo(b.x, b.y);
      ctx.strokeStyle = colour;
      ctx.lineWidth = weight;
      ctx.stroke();
    }
  const r = markRadius(camera);
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  ctx.font = `600 ${Math.round(r * 0.92)}px ${fontFamily}`;
  for (const record of doc.values()) {
    if (record.kind !== 'fixture') continue;
    const p = toWindow(camera, record.at);
    ctx.beginPath();
    ctx.arc(p.x, p.y, r, 0, Math.PI * 2);
    ctx.fillStyle = paper;
    ctx.fill();
    ctx.beginPath();
    ctx.arc(p.x, p.y, r - 2, 0, Math.PI * 2);
    ctx.fillStyle = chalk;
    ctx.fill();
    ctx.strokeStyle = ink;
    ctx.lineWidth = 2;
    ctx.setLineDash([r * 0.36, r * 0.3]);
    ctx.stroke();
    ctx.setLineDash([]);
    ctx.fillStyle = ink;
    ctx.fillText('P', p.x, p.y + 1);
  }
}
