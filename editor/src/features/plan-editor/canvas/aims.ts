import { markRadius, toWindow } from '../../../plan-view/camera';
import { drawAimCross, drawAimLine, drawBeamEdge } from '../../../plan-view/draw/aim';
import { handlePlace } from '../tools/aiming';
import type { PaintState } from './paint-state';

/** The beams of the chosen lights, with the crosses that aim them; those in hand as they would be. */
export function drawAims(ctx: CanvasRenderingContext2D, state: PaintState): void {
  const { camera, selection, preview, aimOf } = state;
  const inHand = preview?.kind === 'aim' ? preview.aims : null;
  const aims = [...selection].flatMap((id) => aimOf(id, inHand?.get(id)) ?? []);
  for (const { edge } of aims) drawBeamEdge(ctx, camera, edge);
  for (const aim of aims) drawAimLine(ctx, camera, aim);
  const view = { zoom: () => camera.zoom, markRadius: () => markRadius(camera) };
  if (inHand === null) for (const aim of aims) drawAimCross(ctx, toWindow(camera, handlePlace(view, aim)));
}
