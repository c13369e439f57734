import type { RevisionDocument } from '../../modules/proposals/revision-document.js';
import { colours } from '../face.js';
import { leadingOf, type Orientation, type Paper, type TextStyle } from '../paper.js';
import type { Picture } from '../pictures.js';
import { drawSheet } from './draw-sheet.js';
import { drawEntry, entryHeight, type LegendEntry, legendOf } from './legend.js';
import { boxOfPoints, groundOf, type OnPage, type ToGround } from './projection.js';
import type { Box, Pt } from './room.js';
import { type DrawingScale, POINTS_PER_METER, scaleBarFor, scaleThatFits } from './scales.js';
import type { SheetContent } from './sheet-content.js';

const TITLE: TextStyle = { size: 15, weight: 'semibold' };
const UNDER: TextStyle = { size: 8.5, colour: colours.quiet };
const NOTE: TextStyle = { size: 8, colour: colours.quiet };
const LEGEND_WIDTH = 142;
const LEGEND_GAP = 14;
const LEGEND_HEAD = 16;
const LEGEND_COLUMNS = 3;
/** Of the strip with the scale bar. */
const SCALE_STRIP = 32;
/** Kept around what is drawn, so that tags at its edge have room. */
const PADDING = 20;
/** How much of the ground around is shown: this share of what is drawn, and at least some steps of it. */
const AROUND_SHARE = 0.2;
const AROUND_METERS = 2;

interface Layout {
  readonly orientation: Orientation;
  readonly legend: 'right' | 'below';
  readonly frame: { readonly width: number; readonly height: number };
}

/** Draws a sheet of the plan: to a standard scale that is stated, or as a picture that says it has none. */
export function planPage(
  paper: Paper,
  content: SheetContent,
  document: RevisionDocument,
  picture: Picture | null,
): void {
  const { sheet } = content;
  const overPicture = picture !== null && sheet.view === 'plan';
  const ground = groundOf(sheet, pointsOf(content));
  const extent = ground && extentOf(content, ground);
  const plain = picture !== null && !extent;
  const legend = legendOf(paper, content, document, overPicture || plain);
  const name = paper.clean(sheet.name || 'Plan').replaceAll('\n', ' ');
  const heads = (width: number) => paper.wrap(`Plan: ${name}`, width, TITLE);
  const layouts = layoutsOf(
    paper,
    legend,
    (width) => heads(width).length * leadingOf(TITLE) + leadingOf(UNDER) + 8,
  );
  const scaled = extent && bestScale(document.units, extent, layouts);
  const layout = scaled?.layout ?? largestFor(content, layouts);

  paper.addPage(layout.orientation);
  paper.bookmark(`Plan: ${name}`);
  for (const line of heads(paper.width)) {
    paper.line(line, paper.left, paper.y, TITLE);
    paper.y += leadingOf(TITLE);
  }
  paper.line(subtitle(content, scaled?.scale ?? null), paper.left, paper.y, UNDER);
  paper.y += leadingOf(UNDER) + 8;
  const frame: Box = {
    left: paper.left,
    top: paper.y,
    right: paper.left + layout.frame.width,
    bottom: paper.y + layout.frame.height,
  };
  const onPage =
    scaled && extent && ground
      ? scaledPlaces(ground, extent, scaled.scale, frame)
      : fittedPlaces(content, frame);
  if (picture && (overPicture || !scaled))
    layPicture(paper, frame, content, onPage, picture, overPicture ? 0.5 : 0.85);
  const without = drawSheet(paper, frame, content, onPage, { overPicture: overPicture || plain });
  paper.doc.save().lineWidth(0.8).strokeColor(colours.ink);
  paper.doc.rect(frame.left, frame.top, layout.frame.width, layout.frame.height).stroke().restore();
  drawScale(paper, frame, document.units, scaled?.scale ?? null);
  paper.y = frame.bottom + SCALE_STRIP;
  const rest = drawLegend(paper, legend, layout, frame);
  const notes = notesOf(content, onPage, without);
  if (rest.length > 0 || notes.length > 0) continued(paper, rest, notes, layout, name);
}

function subtitle({ sheet }: SheetContent, scale: DrawingScale | null): string {
  if (!scale) return 'Not to scale: this sheet has no scale yet.';
  const from = sheet.view === 'photo' ? 'Seen from above, worked out from the photo.' : 'Seen from above.';
  return `${from} Scale ${scale.text} when printed at 100 %; check with the bar below.`;
}

const pointsOf = ({ lights, cables, nodes }: SheetContent) => [
  ...lights.map(({ at }) => at),
  ...nodes.map(({ at }) => at),
  ...cables.flatMap(({ points }) => points),
];

/** The ground that the drawing shows: all lights, nodes and cable, and what lies close around them. */
function extentOf(content: SheetContent, ground: ToGround): Box | null {
  const places: Pt[] = [];
  for (const point of pointsOf(content)) {
    const place = ground(point);
    // One of them above the horizon: there is no drawing from above that holds all.
    if (!place) return null;
    places.push(place);
  }
  const least = boxOfPoints(places);
  if (!least) return null;
  const around = Math.max(
    AROUND_METERS,
    AROUND_SHARE * Math.max(least.right - least.left, least.bottom - least.top),
  );
  const areas = boxOfPoints(
    content.areas.flatMap(({ points }) => points.flatMap((point) => ground(point) ?? [])),
  );
  if (!areas) return least;
  return {
    left: Math.min(least.left, Math.max(areas.left, least.left - around)),
    top: Math.min(least.top, Math.max(areas.top, least.top - around)),
    right: Math.max(least.right, Math.min(areas.right, least.right + around)),
    bottom: Math.max(least.bottom, Math.min(areas.bottom, least.bottom + around)),
  };
}

function layoutsOf(
  paper: Paper,
  legend: readonly LegendEntry[],
  headHeight: (width: number) => number,
): Layout[] {
  return (['portrait', 'landscape'] as const).flatMap((orientation) => {
    const inner = paper.innerSize(orientation);
    const height = inner.height - headHeight(inner.width) - SCALE_STRIP;
    const columnWidth = (inner.width - (LEGEND_COLUMNS - 1) * LEGEND_GAP) / LEGEND_COLUMNS;
    const below = Math.min(belowHeight(paper, legend, columnWidth), inner.height / 3);
    return [
      { orientation, legend: 'right', frame: { width: inner.width - LEGEND_WIDTH - LEGEND_GAP, height } },
      { orientation, legend: 'below', frame: { width: inner.width, height: height - below - LEGEND_GAP } },
    ] as const;
  });
}

/** Rows of a legend in columns under the drawing, read across. */
function rowsBelow(paper: Paper, legend: readonly LegendEntry[], columnWidth: number) {
  const rows: { entries: LegendEntry[]; height: number }[] = [];
  for (let i = 0; i < legend.length; i += LEGEND_COLUMNS) {
    const entries = legend.slice(i, i + LEGEND_COLUMNS);
    rows.push({
      entries,
      height: Math.max(...entries.map((entry) => entryHeight(paper, entry, columnWidth))),
    });
  }
  return rows;
}

const belowHeight = (paper: Paper, legend: readonly LegendEntry[], columnWidth: number): number =>
  rowsBelow(paper, legend, columnWidth).reduce((sum, { height }) => sum + height, 0);

function bestScale(
  units: RevisionDocument['units'],
  extent: Box,
  layouts: readonly Layout[],
): { readonly layout: Layout; readonly scale: DrawingScale } | null {
  let best: { layout: Layout; scale: DrawingScale } | null = null;
  for (const layout of layouts) {
    const { width, height } = layout.frame;
    const scale = scaleThatFits(
      units,
      { width: extent.right - extent.left, height: extent.bottom - extent.top },
      { width: width - 2 * PADDING, height: height - 2 * PADDING },
    );
    if (scale && (!best || scale.ratio < best.scale.ratio)) best = { layout, scale };
  }
  return best;
}

/** The layout on which the whole sheet comes out largest. */
function largestFor({ sheet }: SheetContent, layouts: readonly Layout[]): Layout {
  const factor = ({ frame }: Layout) => Math.min(frame.width / sheet.widthPx, frame.height / sheet.heightPx);
  return layouts.reduce((best, layout) => (factor(layout) > factor(best) ? layout : best));
}

function scaledPlaces(ground: ToGround, extent: Box, scale: DrawingScale, frame: Box): OnPage {
  const pointsPerMeter = POINTS_PER_METER / scale.ratio;
  const x0 = (frame.left + frame.right) / 2 - (pointsPerMeter * (extent.left + extent.right)) / 2;
  const y0 = (frame.top + frame.bottom) / 2 - (pointsPerMeter * (extent.top + extent.bottom)) / 2;
  return (point) => {
    const place = ground(point);
    return place && { x: x0 + place.x * pointsPerMeter, y: y0 + place.y * pointsPerMeter };
  };
}

/** The whole sheet in the frame; no scale is meant. */
function fittedPlaces({ sheet }: SheetContent, frame: Box): OnPage {
  const width = frame.right - frame.left;
  const height = frame.bottom - frame.top;
  const factor = Math.min(width / sheet.widthPx, height / sheet.heightPx);
  const x0 = frame.left + (width - sheet.widthPx * factor) / 2;
  const y0 = frame.top + (height - sheet.heightPx * factor) / 2;
  return ({ x, y }) => ({ x: x0 + x * factor, y: y0 + y * factor });
}

/** Lays a sheet's picture under its drawing, paler than the drawing. */
function layPicture(
  { doc }: Paper,
  frame: Box,
  { sheet }: SheetContent,
  onPage: OnPage,
  picture: Picture,
  opacity: number,
): void {
  const from = onPage({ x: 0, y: 0 });
  const to = onPage({ x: sheet.widthPx, y: sheet.heightPx });
  if (!from || !to) return;
  doc.save();
  doc.rect(frame.left, frame.top, frame.right - frame.left, frame.bottom - frame.top).clip();
  doc.opacity(opacity);
  doc.image(picture.image, from.x, from.y, { width: to.x - from.x, height: to.y - from.y });
  doc.restore();
}

const BAR_LONGEST = 170;
const BAR_HEIGHT = 5;

function drawScale(
  paper: Paper,
  frame: Box,
  units: RevisionDocument['units'],
  scale: DrawingScale | null,
): void {
  const { doc } = paper;
  const y = frame.bottom + 9;
  const style = { size: 7.6 } as const;
  if (!scale) {
    paper.line('Not to scale', frame.left, y - 3, { size: 9, weight: 'semibold' });
    return;
  }
  const bar = scaleBarFor(units, scale, Math.min(BAR_LONGEST, (frame.right - frame.left) / 2));
  const length = (bar.lengthMeters / scale.ratio) * POINTS_PER_METER;
  const part = length / bar.divisions;
  doc.save().lineWidth(0.6).strokeColor(colours.ink);
  for (let i = 0; i < bar.divisions; i += 1) {
    doc.rect(frame.left + i * part, y, part, BAR_HEIGHT);
    doc.fillAndStroke(i % 2 === 0 ? colours.ink : colours.paper, colours.ink);
  }
  doc.restore();
  const [zero = '', half = '', whole = ''] = bar.labels;
  paper.line(zero, frame.left, y + BAR_HEIGHT, style);
  if (bar.divisions % 2 === 0) paper.lineCentred(half, frame.left + length / 2, y + BAR_HEIGHT, style);
  paper.lineCentred(whole, frame.left + length, y + BAR_HEIGHT, style);
  paper.line(`Scale ${scale.text}`, frame.left + length + 22, y - 4, { size: 9, weight: 'semibold' });
}

/** Draws the legend where it has its place; gives what found no room there. */
function drawLegend(paper: Paper, legend: readonly LegendEntry[], layout: Layout, frame: Box): LegendEntry[] {
  const head = { size: 8.5, weight: 'semibold' } as const;
  if (layout.legend === 'right') {
    const x = frame.right + LEGEND_GAP;
    let y = frame.top + LEGEND_HEAD;
    paper.line('On this sheet', x, frame.top, head);
    for (const [i, entry] of legend.entries()) {
      const height = entryHeight(paper, entry, LEGEND_WIDTH);
      if (y + height > frame.bottom) return legend.slice(i);
      drawEntry(paper, entry, x, y, LEGEND_WIDTH);
      y += height;
    }
    return [];
  }
  return legendRows(paper, legend);
}

/** Rows of entries from where the page is written, down to its foot; gives the rest. */
function legendRows(paper: Paper, legend: readonly LegendEntry[]): LegendEntry[] {
  const columnWidth = (paper.width - (LEGEND_COLUMNS - 1) * LEGEND_GAP) / LEGEND_COLUMNS;
  const rows = rowsBelow(paper, legend, columnWidth);
  for (const [i, { entries, height }] of rows.entries()) {
    if (paper.y + height > paper.bottom + 1) return rows.slice(i).flatMap((row) => row.entries);
    entries.forEach((entry, column) => {
      drawEntry(paper, entry, paper.left + column * (columnWidth + LEGEND_GAP), paper.y, columnWidth);
    });
    paper.y += height;
  }
  return [];
}

function notesOf({ areas }: SheetContent, onPage: OnPage, without: readonly string[]): string[] {
  const unseen = areas.filter(({ points }) => points.some((point) => onPage(point) === null));
  return [
    ...(without.length > 0
      ? [
          `These tags have no room on the drawing; their lights are dots there, and the schedule lists them: ${without.join(', ')}.`,
        ]
      : []),
    ...(unseen.length > 0
      ? [
          `Not drawn, since they reach the horizon of the photo: ${unseen.map(({ name, use }) => name || use).join(', ')}.`,
        ]
      : []),
  ];
}

/** What the drawing's own page has no room for. */
function continued(
  paper: Paper,
  legend: readonly LegendEntry[],
  notes: readonly string[],
  layout: Layout,
  name: string,
): void {
  if (layout.legend === 'right') paper.y = paper.bottom;
  let rest = [...legend];
  if (rest.length > 0) {
    paper.addPage();
    paper.flow(`Plan: ${name}, legend continued`, { size: 11, weight: 'semibold' }, { after: 8 });
    for (rest = legendRows(paper, rest); rest.length > 0; rest = legendRows(paper, rest)) paper.addPage();
  }
  for (const note of notes) paper.flow(note, NOTE, { after: 4 });
}
