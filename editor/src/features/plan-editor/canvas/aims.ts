import { markRadius, type Point, toWindow } from '../../../plan-view/camera';
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
  if (inHand === null) for (const p of aimCrosses(state)) drawAimCross(ctx, p);
}

/** Where the crosses of the chosen lights are in the window. */
export function aimCrosses({ camera, selection, aimOf }: PaintState): Point[] {
  const view = { zoom: () => camera.zoom, markRadius: () => markRadius(camera) };
  return [...selection].flatMap((id) => {
    const aim = aimOf(id);
    return aim === null ? [] : [toWindow(camera, handlePlace(view, aim))];
  });
}
