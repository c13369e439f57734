import { type FixtureLook, groundOf } from '../fixture-look';
import { chalk, dimBlue, fontFamily, grey, ink, overRed, paper } from '../palette';

const TURN = Math.PI * 2;

/** Points of the burst around an overdriven fixture. */
export const BURST_POINTS = 12;

/**
 * Draws one fixture's mark, its middle at the origin. `r` is the disc's outer radius in the units of the
 * context; nothing is drawn farther out than `markReach(r)`.
 */
export function drawFixture(
  ctx: CanvasRenderingContext2D,
  r: number,
  look: FixtureLook,
  initial: string,
): void {
  const line = Math.max(1.25, r * 0.16);
  const ring = r - line * 0.5 - 1;
  switch (look.kind) {
    case 'in-window':
      halo(ctx, r);
      disc(ctx, ring, groundOf(look));
      outline(ctx, ring, ink, line);
      letter(ctx, r, initial, ink, null);
      if (look.notch !== null) notch(ctx, r, look.notch);
      return;
    case 'dim':
      halo(ctx, r);
      disc(ctx, ring, paper);
      ctx.beginPath();
      ctx.arc(0, 0, ring, 0, Math.PI);
      ctx.closePath();
      ctx.fillStyle = dimBlue;
      ctx.fill();
      outline(ctx, ring, dimBlue, line * 1.15);
      letter(ctx, r, initial, ink, paper);
      return;
    case 'overdriven':
      burst(ctx, r + 4, r + 0.5, paper);
      burst(ctx, r + 2, r - 2.5, overRed);
      disc(ctx, r * 0.62, paper);
      letter(ctx, r * 0.92, initial, ink, null);
      return;
    case 'dark':
      halo(ctx, r);
      disc(ctx, r - 1, ink);
      cross(ctx, r * 0.42, paper, line * 1.2);
      return;
    case 'off':
      outline(ctx, ring, paper, line * 2.6);
      stroke(ctx, [-ring, 0, ring, 0], paper, line * 2.6);
      outline(ctx, ring, grey, line);
      stroke(ctx, [-ring, 0, ring, 0], grey, line);
      return;
    case 'unwired':
      halo(ctx, r);
      disc(ctx, ring, paper);
      ctx.setLineDash([r * 0.36, r * 0.3]);
      outline(ctx, ring, ink, line);
      ctx.setLineDash([]);
      letter(ctx, r, initial, ink, null);
      return;
    case 'waiting':
      halo(ctx, r);
      disc(ctx, ring, chalk);
      outline(ctx, ring, grey, line);
      letter(ctx, r, initial, ink, null);
      return;
  }
}

/** How far from its middle a mark of radius `r` reaches. */
export function markReach(r: number): number {
  return r + 5;
}

/** The double ink ring of what is chosen; a single one for what is hovered. */
export function drawChoice(ctx: CanvasRenderingContext2D, r: number, hoverOnly: boolean): void {
  outline(ctx, r + 2.5, paper, 3);
  outline(ctx, r + 2.5, ink, 1.75);
  if (hoverOnly) return;
  outline(ctx, r + 6, paper, 3);
  outline(ctx, r + 6, ink, 1.75);
}

function halo(ctx: CanvasRenderingContext2D, r: number): void {
  disc(ctx, r, paper);
}

function disc(ctx: CanvasRenderingContext2D, r: number, fill: string): void {
  ctx.beginPath();
  ctx.arc(0, 0, r, 0, TURN);
  ctx.fillStyle = fill;
  ctx.fill();
}

function outline(ctx: CanvasRenderingContext2D, r: number, colour: string, width: number): void {
  ctx.beginPath();
  ctx.arc(0, 0, r, 0, TURN);
  ctx.strokeStyle = colour;
  ctx.lineWidth = width;
  ctx.stroke();
}

function stroke(
  ctx: CanvasRenderingContext2D,
  [x0, y0, x1, y1]: readonly [number, number, number, number],
  colour: string,
  width: number,
): void {
  ctx.beginPath();
  ctx.moveTo(x0, y0);
  ctx.lineTo(x1, y1);
  ctx.strokeStyle = colour;
  ctx.lineWidth = width;
  ctx.stroke();
}

function cross(ctx: CanvasRenderingContext2D, r: number, colour: string, width: number): void {
  ctx.lineCap = 'round';
  stroke(ctx, [-r, -r, r, r], colour, width);
  stroke(ctx, [-r, r, r, -r], colour, width);
  ctx.lineCap = 'butt';
}

function burst(ctx: CanvasRenderingContext2D, outer: number, inner: number, fill: string): void {
  ctx.beginPath();
  for (let i = 0; i < BURST_POINTS * 2; i++) {
    const r = i % 2 === 0 ? outer : inner;
    const a = (i / (BURST_POINTS * 2)) * TURN - Math.PI / 2;
    ctx.lineTo(r * Math.cos(a), r * Math.sin(a));
  }
  ctx.closePath();
  ctx.fillStyle = fill;
  ctx.fill();
}

function notch(ctx: CanvasRenderingContext2D, r: number, side: 'below' | 'above'): void {
  const s = side === 'below' ? 1 : -1;
  const w = r * 0.32;
  ctx.beginPath();
  ctx.moveTo(-w, s * r);
  ctx.lineTo(w, s * r);
  ctx.lineTo(0, s * (r - w * 1.5));
  ctx.closePath();
  ctx.fillStyle = ink;
  ctx.fill();
}

function letter(
  ctx: CanvasRenderingContext2D,
  r: number,
  text: string,
  colour: string,
  casing: string | null,
): void {
  // Below this no letter can be read; the label and the ledger still say it.
  if (r < 7) return;
  ctx.font = `600 ${Math.round(r * 0.92)}px ${fontFamily}`;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  if (casing !== null) {
    ctx.strokeStyle = casing;
    ctx.lineWidth = r * 0.26;
    ctx.lineJoin = 'round';
    ctx.strokeText(text, 0, r * 0.06);
  }
  ctx.fillStyle = colour;
  ctx.fillText(text, 0, r * 0.06);
}
