import type { FaceRecord, SheetRecord, TreeRecord } from '@lampwright/geometry/plan';
import { colours } from '../face.js';
import type { Paper } from '../paper.js';
import type { OnPage } from './projection.js';
import type { Pt } from './room.js';

/** Points between the strokes across a wall, and half of their length. */
const STROKE_STEP = 5;
const STROKE_HALF = 1.8;
/** Where a tree stands. */
const FOOT_RADIUS = 1.6;

/** A tree as it is drawn: where it stands, and its crown from above. */
export interface DrawnTree {
  readonly foot: Pt;
  readonly crown: { readonly radius: number } | { readonly outline: readonly Pt[] };
}

/** A wall's foot on the page; null where not all of it can be seen. */
export function wallOnPage(face: FaceRecord, onPage: OnPage): readonly Pt[] | null {
  const foot = face.foot.map(onPage);
  return foot.every((p) => p !== null) ? foot : null;
}

/** A photo shows a crown's silhouette, which is as wide as the crown is from above; a drawing its edge itself. */
export function treeOnPage(tree: TreeRecord, sheet: SheetRecord, onPage: OnPage): DrawnTree | null {
  const foot = onPage(tree.foot);
  if (!foot) return null;
  if (sheet.view === 'plan') {
    const outline = tree.outline.map(onPage);
    return outline.every((p) => p !== null) ? { foot, crown: { outline } } : null;
  }
  const xs = tree.outline.map(({ x }) => x);
  const half = (Math.max(...xs) - Math.min(...xs)) / 2;
  const aside = onPage({ x: tree.foot.x + half, y: tree.foot.y });
  return aside && { foot, crown: { radius: Math.hypot(aside.x - foot.x, aside.y - foot.y) } };
}

/** A wall from above: its foot, with fine strokes slanting across it. */
export function drawWall(paper: Paper, foot: readonly Pt[]): void {
  const { doc } = paper;
  doc.save().lineCap('butt').lineJoin('miter').strokeColor(colours.ink);
  foot.forEach(({ x, y }, i) => {
    if (i === 0) doc.moveTo(x, y);
    else doc.lineTo(x, y);
  });
  doc.lineWidth(0.9).stroke();
  for (const { at, along } of stepsAlong(foot)) {
    const x = (along.x - along.y) * Math.SQRT1_2 * STROKE_HALF;
    const y = (along.y + along.x) * Math.SQRT1_2 * STROKE_HALF;
    doc.moveTo(at.x - x, at.y - y).lineTo(at.x + x, at.y + y);
  }
  doc.lineWidth(0.4).stroke().restore();
}

/** A tree or shrub from above: the edge of its crown, and a dot in a ring where it stands. */
export function drawTree(paper: Paper, { foot, crown }: DrawnTree): void {
  const { doc } = paper;
  doc.save().lineWidth(0.6).strokeColor(colours.ink).dash(3.2, { space: 1.4 });
  if ('radius' in crown) doc.circle(foot.x, foot.y, Math.max(crown.radius, 2 * FOOT_RADIUS));
  else
    crown.outline.forEach(({ x, y }, i) => {
      if (i === 0) doc.moveTo(x, y);
      else doc.lineTo(x, y);
    });
  if ('outline' in crown) doc.closePath();
  doc.stroke().undash();
  doc.lineWidth(0.5).fillColor(colours.paper);
  doc.circle(foot.x, foot.y, 2 * FOOT_RADIUS).fillAndStroke();
  doc
    .fillColor(colours.ink)
    .circle(foot.x, foot.y, FOOT_RADIUS / 1.6)
    .fill()
    .restore();
}

function stepsAlong(points: readonly Pt[]): { readonly at: Pt; readonly along: Pt }[] {
  const found: { at: Pt; along: Pt }[] = [];
  let next = STROKE_STEP / 2;
  points.slice(1).forEach((b, i) => {
    const a = points[i]!;
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    const along = { x: (b.x - a.x) / length, y: (b.y - a.y) / length };
    for (; next < length; next += STROKE_STEP)
      found.push({ at: { x: a.x + along.x * next, y: a.y + along.y * next }, along });
    next -= length;
  });
  return found;
}
