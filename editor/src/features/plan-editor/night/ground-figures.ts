import type { Camera, Size } from '../../../plan-view/camera';
import { toWindow } from '../../../plan-view/camera';
import { fontFamily } from '../../../plan-view/palette';

/** A figure of light and where it stands on the sheet. */
export interface GroundFigure {
  readonly at: { readonly x: number; readonly y: number };
  readonly text: string;
}

const FONT = `500 12px ${fontFamily}`;
const HALO = 'rgba(12, 18, 25, 0.75)';
const TEXT = 'rgba(251, 248, 242, 0.92)';
/** Half of the room that a figure takes with what is left free around it, in window pixels. */
const HALF_WIDTH = 25;
const HALF_HEIGHT = 15;

/** Draws figures where there is room beside the marks at these sheet points, the first ones first. */
export function drawGroundFigures(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  figures: readonly GroundFigure[],
  marks: readonly GroundFigure['at'][],
): void {
  ctx.font = FONT;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  ctx.lineJoin = 'round';
  ctx.lineWidth = 3;
  ctx.strokeStyle = HALO;
  ctx.fillStyle = TEXT;
  // By cells as large as a figure's room: only neighbours can be in the way.
  const taken = new Map<string, { x: number; y: number }[]>();
  const take = (p: { x: number; y: number }) => {
    const key = `${Math.floor(p.x / (HALF_WIDTH * 2))} ${Math.floor(p.y / (HALF_HEIGHT * 2))}`;
    taken.set(key, [...(taken.get(key) ?? []), p]);
  };
  for (const at of marks) take(toWindow(camera, at));
  for (const { at, text } of figures) {
    const p = toWindow(camera, at);
    if (p.x < 0 || p.y < 0 || p.x > window.width || p.y > window.height) continue;
    const column = Math.floor(p.x / (HALF_WIDTH * 2));
    const row = Math.floor(p.y / (HALF_HEIGHT * 2));
    if (isCrowded(taken, column, row, p)) continue;
    take(p);
    ctx.strokeText(text, p.x, p.y);
    ctx.fillText(text, p.x, p.y);
  }
}

function isCrowded(
  taken: ReadonlyMap<string, readonly { x: number; y: number }[]>,
  column: number,
  row: number,
  p: { readonly x: number; readonly y: number },
): boolean {
  for (let i = column - 1; i <= column + 1; i++)
    for (let j = row - 1; j <= row + 1; j++)
      for (const other of taken.get(`${i} ${j}`) ?? [])
        if (Math.abs(other.x - p.x) < HALF_WIDTH * 2 && Math.abs(other.y - p.y) < HALF_HEIGHT * 2)
          return true;
  return false;
}
