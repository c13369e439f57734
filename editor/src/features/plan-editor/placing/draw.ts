import { type Camera, markRadius, toWindow } from '../../../plan-view/camera';
import { drawAimLine, drawBeamEdge } from '../../../plan-view/draw/aim';
import type { MarkSprites } from '../../../plan-view/draw/sprites';
import type { ProposedPreview } from '../tools/proposed';

/** Proposed lights: dashed marks as of lights that nothing feeds yet, and where those point that are aimed. */
export function drawProposed(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  { lights, aims, initial }: ProposedPreview,
  sprites: MarkSprites,
): void {
  for (const { edge } of aims) drawBeamEdge(ctx, camera, edge);
  for (const aim of aims) drawAimLine(ctx, camera, aim);
  const r = markRadius(camera);
  for (const { at } of lights) {
    const p = toWindow(camera, at);
    sprites.stamp(ctx, p.x, p.y, r, { kind: 'unwired', tint: 0, notch: null }, initial);
  }
}
