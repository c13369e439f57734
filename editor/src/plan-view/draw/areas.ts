import type { AreaUse } from '@lampwright/geometry/plan';
import { boxAround, type Camera, type Point, type Size, toWindow } from '../camera';
import { fontFamily, ink, paper } from '../palette';
import { trace } from './cable';

const FAINT_PAPER = 'rgba(251, 248, 242, 0.5)';
const FAINT_INK = 'rgba(22, 32, 46, 0.45)';
const AREA_FONT = `500 12px ${fontFamily}`;

/** Ground is drawn as a wash: it says where, and never competes with the marks on it. */
function washOf(use: AreaUse): string | null {
  switch (use) {
    case 'lawn':
      return 'rgba(91, 113, 82, 0.16)';
    case 'bed':
      return 'rgba(120, 84, 56, 0.2)';
    case 'paved':
      return 'rgba(237, 230, 216, 0.42)';
    case 'building':
      return 'rgba(22, 32, 46, 0.24)';
    case 'canopy':
      return 'rgba(91, 113, 82, 0.28)';
    case 'water':
      return 'rgba(160, 196, 214, 0.42)';
    case 'lot-line':
      return null;
  }
}

export interface AreaShape {
  readonly id: string;
  readonly use: AreaUse;
  readonly points: readonly Point[];
  readonly label: string;
}

export function drawArea(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  area: AreaShape,
  chosen: boolean,
): void {
  ctx.beginPath();
  trace(ctx, camera, area.points);
  ctx.closePath();
  const wash = washOf(area.use);
  if (wash !== null) {
    ctx.fillStyle = wash;
    ctx.fill();
  }
  ctx.lineJoin = 'round';
  // Unchosen outlines stay fainter than any cable, which is ink in a white casing too.
  const faint = !chosen && area.use !== 'lot-line';
  ctx.strokeStyle = faint ? FAINT_PAPER : paper;
  ctx.lineWidth = chosen ? 6 : 2.5;
  ctx.stroke();
  ctx.strokeStyle = faint ? FAINT_INK : ink;
  ctx.lineWidth = chosen ? 3 : 1;
  ctx.setLineDash(area.use === 'lot-line' ? [14, 5, 3, 5] : area.use === 'canopy' ? [2, 4] : []);
  ctx.stroke();
  ctx.setLineDash([]);
}

/** The name of an area, ink with a paper casing, in its place. */
export function drawAreaName(ctx: CanvasRenderingContext2D, at: Point, text: string): void {
  ctx.font = AREA_FONT;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  ctx.lineJoin = 'round';
  ctx.lineWidth = 3.5;
  ctx.strokeStyle = paper;
  ctx.strokeText(text, at.x, at.y);
  ctx.fillStyle = ink;
  ctx.fillText(text, at.x, at.y);
}

export function areaNameSize(ctx: CanvasRenderingContext2D, text: string): Size {
  ctx.font = AREA_FONT;
  return { width: Math.ceil(ctx.measureText(text).width) + 6, height: 16 };
}

/** Where the name of an area stands, and how wide the area is in the window; a lot line is named at its top. */
export function areaNamePlace(
  camera: Camera,
  area: AreaShape,
): { readonly at: Point; readonly width: number } {
  const box = boxAround(area.points)!;
  const width = (box.right - box.left) * camera.zoom;
  if (area.use !== 'lot-line') return { at: toWindow(camera, middle(area.points)), width };
  const top = toWindow(camera, { x: (box.left + box.right) / 2, y: box.top });
  return { at: { x: top.x, y: top.y - 12 }, width };
}

/** Centroid of a polygon by the shoelace sums; the mean of its corners where it has no area. */
export function middle(points: readonly Point[]): Point {
  let area = 0;
  let x = 0;
  let y = 0;
  points.forEach((p, i) => {
    const q = points[(i + 1) % points.length]!;
    const cross = p.x * q.y - q.x * p.y;
    area += cross;
    x += (p.x + q.x) * cross;
    y += (p.y + q.y) * cross;
  });
  if (Math.abs(area) > 1e-9) return { x: x / (3 * area), y: y / (3 * area) };
  const n = points.length;
  return {
    x: points.reduce((s, p) => s + p.x, 0) / n,
    y: points.reduce((s, p) => s + p.y, 0) / n,
  };
}
