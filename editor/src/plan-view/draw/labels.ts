import type { Box, Size } from '../camera';
import { fontFamily, ink, paper } from '../palette';
import { rounded } from './nodes';

export const LABEL_HEIGHT = 19;
const FONT = `600 11.5px ${fontFamily}`;
const PADDING = 6;

const widths = new Map<string, number>();

/** Figures are tabular, so a text's width can be kept. Cleared with the sprites when the typeface arrives. */
export function clearLabelWidths(): void {
  widths.clear();
}

export function labelSize(ctx: CanvasRenderingContext2D, text: string): Size {
  let width = widths.get(text);
  if (width === undefined) {
    ctx.font = FONT;
    width = Math.ceil(ctx.measureText(text).width) + PADDING * 2;
    widths.set(text, width);
  }
  return { width, height: LABEL_HEIGHT };
}

/** A label of a figure on the plan: ink on paper; its edge says what is wrong, never its text. */
export function drawLabel(ctx: CanvasRenderingContext2D, box: Box, text: string, edge: string): void {
  rounded(ctx, box.left + 0.5, box.top + 0.5, box.right - box.left - 1, box.bottom - box.top - 1, 4);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.strokeStyle = edge;
  ctx.lineWidth = 1.5;
  ctx.stroke();
  writeIn(ctx, box, text, ink);
}

/** A figure of the hand at work (a length being drawn): paper on ink. */
export function drawWorkingLabel(ctx: CanvasRenderingContext2D, box: Box, text: string): void {
  rounded(ctx, box.left, box.top, box.right - box.left, box.bottom - box.top, 4);
  ctx.fillStyle = ink;
  ctx.fill();
  writeIn(ctx, box, text, paper);
}

function writeIn(ctx: CanvasRenderingContext2D, box: Box, text: string, colour: string): void {
  ctx.font = FONT;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  ctx.fillStyle = colour;
  ctx.fillText(text, (box.left + box.right) / 2, (box.top + box.bottom) / 2 + 0.5);
}
