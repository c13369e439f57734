import { scaleOfSheet, sheetPoint } from '@lampwright/geometry/estimate';
import type { PlanPoint, SheetRecord } from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { Box, Pt } from './room.js';

/** From sheet pixels to points on the page; null where nothing of it can be seen. */
export type OnPage = (point: PlanPoint) => Pt | null;

/** From sheet pixels to metres on paper-wise ground: x to the right, y downwards. Null where there is no ground. */
export type ToGround = (point: PlanPoint) => Pt | null;

/** How the ground of a sheet lies on paper; null where the sheet has no scale. */
export function groundOf(sheet: SheetRecord, around: readonly PlanPoint[]): ToGround | null {
  const result = scaleOfSheet(sheet);
  if (!result.ok) return null;
  const { scale } = result;
  const turn = sheet.view === 'photo' ? turnOf(scale, around) : { cos: 1, sin: 0 };
  return (point) => {
    const ground = scale.groundFromSheet(sheetPoint(point));
    return (
      ground && {
        x: ground.x * turn.cos - ground.y * turn.sin,
        y: -(ground.x * turn.sin + ground.y * turn.cos),
      }
    );
  };
}

/** Turns the ground so that what is farther away in the photo is higher up on the paper. */
function turnOf(
  scale: SolvedScale,
  around: readonly PlanPoint[],
): { readonly cos: number; readonly sin: number } {
  const x = around.reduce((sum, point) => sum + point.x, 0) / around.length;
  const y = around.reduce((sum, point) => sum + point.y, 0) / around.length;
  const here = scale.groundFromSheet(sheetPoint({ x, y }));
  // A step down stays on the ground, where a step up may pass the horizon.
  const nearer = scale.groundFromSheet(sheetPoint({ x, y: y + 1 }));
  if (!here || !nearer) return { cos: 1, sin: 0 };
  const dx = here.x - nearer.x;
  const dy = here.y - nearer.y;
  const length = Math.hypot(dx, dy) || 1;
  // The turn that takes (dx, dy) to (0, 1).
  return { cos: dy / length, sin: dx / length };
}

export function boxOfPoints(points: readonly Pt[]): Box | null {
  if (points.length === 0) return null;
  const box = {
    left: Number.POSITIVE_INFINITY,
    top: Number.POSITIVE_INFINITY,
    right: Number.NEGATIVE_INFINITY,
    bottom: Number.NEGATIVE_INFINITY,
  };
  for (const { x, y } of points) {
    box.left = Math.min(box.left, x);
    box.right = Math.max(box.right, x);
    box.top = Math.min(box.top, y);
    box.bottom = Math.max(box.bottom, y);
  }
  return box;
}
