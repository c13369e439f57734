import { type Box, type Camera, markRadius, overlap, type Point, type Size, toWindow } from '../camera';
import { type LabelWish, placeLabels } from '../labels';
import { grey, ink, paper } from '../palette';
import { labelEdge, type SceneFixture, type SceneMeasurement, type SceneNode } from '../scene';
import { type AreaShape, areaNamePlace, areaNameSize, drawAreaName } from './areas';
import { trace } from './cable';
import { markReach } from './fixture';
import { drawLabel, drawWorkingLabel, LABEL_HEIGHT, labelSize } from './labels';
import { drawHub, drawNote, drawSplice, drawTransformer } from './nodes';
import type { MarkSprites } from './sprites';

export function drawFixtures(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  fixtures: readonly SceneFixture[],
  sprites: MarkSprites,
): void {
  const r = markRadius(camera);
  const reach = markReach(r);
  for (const fixture of fixtures) {
    const p = toWindow(camera, fixture.at);
    if (outside(p, reach, window)) continue;
    sprites.stamp(ctx, p.x, p.y, r, fixture.look, fixture.initial);
  }
}

export function drawNodes(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  nodes: readonly SceneNode[],
): void {
  const r = markRadius(camera);
  for (const node of nodes) {
    const p = toWindow(camera, node.at);
    if (outside(p, r * 3, window)) continue;
    ctx.translate(p.x, p.y);
    switch (node.kind) {
      case 'transformer':
        drawTransformer(ctx, r, node.label, false, node.band);
        break;
      case 'feed':
        drawTransformer(ctx, r, node.label, true, node.band);
        break;
      case 'hub':
        drawHub(ctx, r);
        break;
      case 'splice':
        drawSplice(ctx, r);
        break;
      case 'note':
        drawNote(ctx, r);
        break;
    }
    ctx.translate(-p.x, -p.y);
  }
}

export function drawMeasurements(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  measurements: readonly SceneMeasurement[],
  chosen: (id: string) => boolean,
): void {
  for (const m of measurements) drawMeasurement(ctx, camera, m.points, '', chosen(m.id));
}

export function drawMeasurement(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  points: readonly Point[],
  text: string,
  chosen: boolean,
): void {
  ctx.lineJoin = 'round';
  ctx.lineCap = 'butt';
  ctx.beginPath();
  trace(ctx, camera, points);
  ctx.strokeStyle = paper;
  ctx.lineWidth = chosen ? 6 : 4;
  ctx.stroke();
  ctx.strokeStyle = ink;
  ctx.lineWidth = chosen ? 2.5 : 1.5;
  ctx.setLineDash([6, 4]);
  ctx.stroke();
  ctx.setLineDash([]);
  for (const p of points) {
    const q = toWindow(camera, p);
    ctx.beginPath();
    ctx.arc(q.x, q.y, 3.5, 0, Math.PI * 2);
    ctx.fillStyle = paper;
    ctx.fill();
    ctx.lineWidth = 1.5;
    ctx.stroke();
  }
  if (text === '') return;
  const a = points[points.length - 2] ?? points[0];
  const b = points[points.length - 1];
  if (a === undefined || b === undefined) return;
  const at = toWindow(camera, { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 });
  workingLabelAt(ctx, at, text);
}

/** A dark label that stands above a place of the window. */
export function workingLabelAt(ctx: CanvasRenderingContext2D, at: Point, text: string): void {
  const size = labelSize(ctx, text);
  const left = at.x - size.width / 2;
  const top = at.y - LABEL_HEIGHT - 8;
  drawWorkingLabel(ctx, { left, top, right: left + size.width, bottom: top + size.height }, text);
}

export interface Aside {
  readonly id: string;
  readonly at: Point;
  readonly text: string;
}

export interface LabelDemand {
  readonly hoveredId: string | null;
  readonly chosen: ReadonlySet<string>;
  /** Figures that stand beside a place rather than a mark: of the hovered cable, of measurements. */
  readonly asides: readonly Aside[];
  /** Places of the window that labels keep off as they do off marks. */
  readonly keepOff: readonly Point[];
  /** How plainly fixtures' figures are shown: 1, or less while they are of an older plan. */
  readonly alpha: number;
}

const RANK_HOVERED = 5;
const RANK_CHOSEN = 4;
const RANK_FAULT = 3;
const RANK_WORST = 2;
const RANK_UNWIRED = 1;
const RANK_AREA = 0;
/** Half the width of a place that labels keep off. */
const KEPT_OFF = 9;
/** Marks seen from so far away are small; then only faults and what is asked for keep their labels. */
const FAR_RADIUS = 6.5;

function rankOf(fixture: SceneFixture, demand: LabelDemand, far: boolean): number | null {
  if (demand.hoveredId === fixture.id) return RANK_HOVERED;
  if (demand.chosen.has(fixture.id)) return RANK_CHOSEN;
  switch (fixture.standing) {
    case 'fault':
      return RANK_FAULT;
    case 'worst':
      return far ? null : RANK_WORST;
    case 'unwired':
      return far ? null : RANK_UNWIRED;
    case null:
      return null;
  }
}

function textOf(fixture: SceneFixture, demand: LabelDemand): string {
  return demand.hoveredId === fixture.id ? fixture.fullText : fixture.text;
}

/** Draws the sparse figures beside the marks; none covers another or a mark. Returns how many were drawn. */
export function drawLabels(
  ctx: CanvasRenderingContext2D,
  camera: Camera,
  window: Size,
  fixtures: readonly SceneFixture[],
  nodes: readonly SceneNode[],
  areas: readonly AreaShape[],
  demand: LabelDemand,
): number {
  const r = markRadius(camera);
  const far = r < FAR_RADIUS;
  const wishes: LabelWish[] = [];
  const marks: Box[] = [];
  const byId = new Map<string, SceneFixture>();
  const view: Box = { left: 0, top: 0, right: window.width, bottom: window.height };
  for (const fixture of fixtures) {
    const at = toWindow(camera, fixture.at);
    const clear = demand.chosen.has(fixture.id) ? r + 8 : fixture.look.kind === 'overdriven' ? r + 3 : r;
    const mark = around(at, clear);
    if (!overlap(mark, view)) continue;
    marks.push(mark);
    const rank = rankOf(fixture, demand, far);
    if (rank === null) continue;
    byId.set(fixture.id, fixture);
    wishes.push({ id: fixture.id, at, clear, size: labelSize(ctx, textOf(fixture, demand)), rank });
  }
  for (const node of nodes) {
    if (node.kind === 'splice') continue;
    const mark = around(toWindow(camera, node.at), r * 1.3);
    if (overlap(mark, view)) marks.push(mark);
  }
  for (const p of demand.keepOff) marks.push(around(p, KEPT_OFF));
  const asides = new Map(demand.asides.map((aside) => [aside.id, aside]));
  for (const { id, at, text } of demand.asides) {
    const asked = id === demand.hoveredId || demand.chosen.has(id);
    wishes.push({
      id,
      at: toWindow(camera, at),
      clear: 4,
      size: labelSize(ctx, text),
      rank: asked ? RANK_HOVERED : RANK_WORST,
    });
  }
  const names = new Map<string, { text: string; at: Point }>();
  for (const area of areas) {
    const { at, width } = areaNamePlace(camera, area);
    const size = areaNameSize(ctx, area.label);
    // A name wider than its area would seem to be that of its neighbour.
    if (size.width > width && demand.hoveredId !== area.id) continue;
    names.set(area.id, { text: area.label, at });
    wishes.push({ id: area.id, at, clear: 0, size, rank: RANK_AREA, centred: true });
  }
  const placed = placeLabels(wishes, marks, window);
  for (const { id, box } of placed) {
    ctx.globalAlpha = 1;
    const aside = asides.get(id);
    if (aside !== undefined) drawWorkingLabel(ctx, box, aside.text);
    const name = names.get(id);
    if (name !== undefined) drawAreaName(ctx, name.at, name.text);
    const fixture = byId.get(id);
    if (fixture === undefined) continue;
    ctx.globalAlpha = demand.alpha;
    const edge = demand.hoveredId === id || demand.chosen.has(id) ? ink : grey;
    drawLabel(
      ctx,
      box,
      textOf(fixture, demand),
      labelEdge(fixture.look) === grey ? edge : labelEdge(fixture.look),
    );
  }
  ctx.globalAlpha = 1;
  return placed.length;
}

function around(p: Point, r: number): Box {
  return { left: p.x - r, top: p.y - r, right: p.x + r, bottom: p.y + r };
}

function outside(p: Point, reach: number, window: Size): boolean {
  return p.x < -reach || p.y < -reach || p.x > window.width + reach || p.y > window.height + reach;
}
