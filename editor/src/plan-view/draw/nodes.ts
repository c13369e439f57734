import type { LoadBand } from '../cable-look';
import { fontFamily, ink, mix, overRed, paper } from '../palette';

/** A transformer: an ink tablet with its number. A feed is the same turned over: its transformer is elsewhere. */
export function drawTransformer(
  ctx: CanvasRenderingContext2D,
  r: number,
  label: string,
  feed: boolean,
  band: LoadBand,
): void {
  const half = r * 1.15;
  const wide = Math.max(half, label.length * r * 0.36 + r * 0.4);
  const rim = band === 'calm' ? 1.5 : 3.5;
  rounded(ctx, -wide - rim, -half - rim, (wide + rim) * 2, (half + rim) * 2, 5);
  // Over its limit it wears the hue of what is over; near it, a thinner part of that.
  ctx.fillStyle =
    band === 'over' ? overRed : band === 'near' ? mix(paper, overRed, 0.45) : feed ? ink : paper;
  ctx.fill();
  rounded(ctx, -wide, -half, wide * 2, half * 2, 4);
  ctx.fillStyle = feed ? paper : ink;
  ctx.fill();
  ctx.font = `600 ${Math.round(Math.max(8, r))}px ${fontFamily}`;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  ctx.fillStyle = feed ? ink : paper;
  ctx.fillText(label, 0, r * 0.06);
}

/** A hub: a ring of ink with its spokes. */
export function drawHub(ctx: CanvasRenderingContext2D, r: number): void {
  const s = r * 0.8;
  ctx.beginPath();
  ctx.arc(0, 0, s + 2, 0, Math.PI * 2);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.beginPath();
  ctx.arc(0, 0, s, 0, Math.PI * 2);
  ctx.strokeStyle = ink;
  ctx.lineWidth = 2;
  ctx.stroke();
  ctx.beginPath();
  for (let i = 0; i < 3; i++) {
    const a = (i * Math.PI) / 3;
    ctx.moveTo(-s * 0.6 * Math.cos(a), -s * 0.6 * Math.sin(a));
    ctx.lineTo(s * 0.6 * Math.cos(a), s * 0.6 * Math.sin(a));
  }
  ctx.lineWidth = 1.5;
  ctx.stroke();
}

/** A splice, or the capped end of a cable: a bead on the line. */
export function drawSplice(ctx: CanvasRenderingContext2D, r: number): void {
  ctx.beginPath();
  ctx.arc(0, 0, r * 0.42 + 1.75, 0, Math.PI * 2);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.beginPath();
  ctx.arc(0, 0, r * 0.42, 0, Math.PI * 2);
  ctx.fillStyle = ink;
  ctx.fill();
}

/** A note: a small sheet of paper with three lines. */
export function drawNote(ctx: CanvasRenderingContext2D, r: number): void {
  rounded(ctx, -r * 0.8, -r * 0.8, r * 1.6, r * 1.6, 3);
  ctx.fillStyle = paper;
  ctx.fill();
  ctx.strokeStyle = ink;
  ctx.lineWidth = 1.5;
  ctx.stroke();
  ctx.beginPath();
  for (const y of [-0.35, 0, 0.35]) {
    ctx.moveTo(-r * 0.45, y * r);
    ctx.lineTo(r * (y === 0.35 ? 0.1 : 0.45), y * r);
  }
  ctx.lineWidth = 1.25;
  ctx.stroke();
}

export function rounded(
  ctx: CanvasRenderingContext2D,
  x: number,
  y: number,
  width: number,
  height: number,
  radius: number,
): void {
  ctx.beginPath();
  ctx.roundRect(x, y, width, height, radius);
}
