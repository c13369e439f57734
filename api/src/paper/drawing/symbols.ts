import type { Conductor } from '@lampwright/geometry/catalogue';
import type { AreaUse } from '@lampwright/geometry/plan';
import { colours } from '../face.js';
import { leadingOf, type Paper } from '../paper.js';
import type { Pt } from './room.js';

/** How things look on a plan on paper: shapes and weights tell them apart, without a hue. */

export interface TagSize {
  readonly width: number;
  readonly height: number;
  readonly text: number;
}

/** Points across a tag; the small one is for crowded drawings, and can still be read. */
export function tagSize(paper: Paper, tag: string, size: 'usual' | 'small' = 'usual'): TagSize {
  const height = size === 'usual' ? 13 : 10;
  const text = size === 'usual' ? 6.6 : 5.4;
  return {
    height,
    text,
    width: Math.max(
      height,
      paper.widthOf(tag, { size: text, weight: 'semibold' }) + (size === 'usual' ? 5 : 3.4),
    ),
  };
}

/** A light: a disc with its tag, wider for a long one; dashed where it is only offered as an addition. */
export function drawTag(paper: Paper, at: Pt, tag: string, size: TagSize, offered: boolean): void {
  const { width, height, text } = size;
  const { doc } = paper;
  doc
    .save()
    .lineWidth(0.9)
    .fillColor(offered ? colours.paper : colours.chalk)
    .strokeColor(colours.ink);
  if (offered) doc.dash(2, { space: 1.6 });
  doc.roundedRect(at.x - width / 2, at.y - height / 2, width, height, height / 2).fillAndStroke();
  doc.restore();
  const style = { size: text, weight: 'semibold' } as const;
  paper.lineCentred(tag, at.x, at.y - leadingOf(style) / 2, style);
}

export function drawLead(paper: Paper, from: Pt, to: Pt): void {
  paper.doc.save().lineCap('round');
  paper.doc.lineWidth(2).strokeColor(colours.paper).moveTo(from.x, from.y).lineTo(to.x, to.y).stroke();
  paper.doc.lineWidth(0.6).strokeColor(colours.ink).moveTo(from.x, from.y).lineTo(to.x, to.y).stroke();
  paper.doc.restore();
}

export function drawDot(paper: Paper, at: Pt): void {
  paper.doc.save().lineWidth(0.7).fillColor(colours.ink).strokeColor(colours.paper);
  paper.doc.circle(at.x, at.y, 2.2).fillAndStroke().restore();
}

export const BLOCK = 17;

/** A transformer: a square with a double frame. */
export function drawTransformer(paper: Paper, at: Pt, tag: string): void {
  const half = BLOCK / 2;
  const { doc } = paper;
  doc.save().lineWidth(1.1).fillColor(colours.paper).strokeColor(colours.ink);
  doc.rect(at.x - half, at.y - half, BLOCK, BLOCK).fillAndStroke();
  doc
    .lineWidth(0.5)
    .rect(at.x - half + 2, at.y - half + 2, BLOCK - 4, BLOCK - 4)
    .stroke()
    .restore();
  centred(paper, at, tag, 6.6);
}

/** Where the feed of a transformer on another sheet comes in: a square with one frame, dashed. */
export function drawFeed(paper: Paper, at: Pt, tag: string): void {
  const half = BLOCK / 2 - 1;
  paper.doc.save().lineWidth(0.9).fillColor(colours.paper).strokeColor(colours.ink).dash(2.4, { space: 1.6 });
  paper.doc
    .rect(at.x - half, at.y - half, 2 * half, 2 * half)
    .fillAndStroke()
    .restore();
  centred(paper, at, tag, 6.6);
}

/** A hub: a square on its corner. */
export function drawHub(paper: Paper, at: Pt, tag: string): void {
  const r = BLOCK / 2 + 1.5;
  paper.doc.save().lineWidth(0.9).fillColor(colours.paper).strokeColor(colours.ink);
  paper.doc
    .moveTo(at.x, at.y - r)
    .lineTo(at.x + r, at.y)
    .lineTo(at.x, at.y + r)
    .lineTo(at.x - r, at.y)
    .closePath()
    .fillAndStroke()
    .restore();
  centred(paper, at, tag, 5.6);
}

/** A splice: a small solid dot. */
export function drawSplice(paper: Paper, at: Pt): void {
  paper.doc.save().lineWidth(0.8).fillColor(colours.ink).strokeColor(colours.paper);
  paper.doc.circle(at.x, at.y, 3).fillAndStroke().restore();
}

function centred(paper: Paper, at: Pt, text: string, size: number): void {
  const style = { size, weight: 'semibold' } as const;
  paper.lineCentred(text, at.x, at.y - leadingOf(style) / 2, style);
}

/** Copper area in mm² of the stranded gauges (ASTM B258 diameters), for line weights only. */
function areaMm2(conductor: Conductor): number {
  if ('mm2' in conductor) return conductor.mm2;
  if ('awg' in conductor) return (Math.PI / 4) * (0.127 * 92 ** ((36 - conductor.awg) / 39)) ** 2;
  // 1/58 Ω·mm²/m of copper gives the area that would have this resistance.
  return 1000 / 58 / conductor.ohmsPerKm;
}

/** Points across a cable's line: heavier cable is drawn heavier, from 0.6 (18 AWG) to 3 (8 AWG), each by more than a third. */
export function cableWeight(conductor: Conductor): number {
  return Math.min(3.6, Math.max(0.6, 0.6 * (areaMm2(conductor) / 0.82) ** 0.7));
}

/** Ink with a white casing, so that it reads over a picture and where it crosses another. */
export function drawCable(paper: Paper, points: readonly Pt[], weight: number): void {
  const { doc } = paper;
  doc.save().lineJoin('round').lineCap('round');
  for (const [colour, width] of [
    [colours.paper, weight + 2.6],
    [colours.ink, weight],
  ] as const) {
    path(paper, points);
    doc.lineWidth(width).strokeColor(colour).stroke();
  }
  doc.restore();
}

function path({ doc }: Paper, points: readonly Pt[], closed = false): void {
  points.forEach(({ x, y }, i) => {
    if (i === 0) doc.moveTo(x, y);
    else doc.lineTo(x, y);
  });
  if (closed) doc.closePath();
}

export const areaNames: Readonly<Record<AreaUse, string>> = {
  lawn: 'Lawn',
  bed: 'Bed',
  paved: 'Paved',
  building: 'Building',
  canopy: 'Canopy of a tree',
  water: 'Water',
  'lot-line': 'Lot line',
};

/** An area: its tint, its hatching within `frame`, its outline. `plain` leaves a picture under it to be seen. */
export function drawArea(paper: Paper, use: AreaUse, points: readonly Pt[], plain: boolean): void {
  const { doc } = paper;
  const tint = tintOf(use);
  if (!plain && tint !== null) {
    doc.save();
    path(paper, points, true);
    doc.fillColor(tint).fill().restore();
  }
  if (!plain) {
    doc.save();
    path(paper, points, true);
    doc.clip();
    hatch(paper, use, points);
    doc.restore();
  }
  doc
    .save()
    .lineJoin('round')
    .strokeColor(use === 'building' || use === 'lot-line' ? colours.ink : colours.quiet);
  outline(paper, use);
  path(paper, points, true);
  doc.stroke().restore();
}

function tintOf(use: AreaUse): string | null {
  switch (use) {
    case 'lawn':
      return '#F4F5EE';
    case 'bed':
      return '#EEEAE1';
    case 'paved':
      return '#F3F1EC';
    case 'building':
      return '#DEDCD7';
    case 'water':
      return '#EAF0F4';
    case 'canopy':
    case 'lot-line':
      return null;
  }
}

function outline({ doc }: Paper, use: AreaUse): void {
  switch (use) {
    case 'building':
      doc.lineWidth(1.2);
      break;
    case 'lot-line':
      doc.lineWidth(0.8).dash(10, { space: 3 });
      break;
    case 'canopy':
      doc.lineWidth(0.6).dash(3, { space: 2 });
      break;
    case 'lawn':
    case 'bed':
    case 'paved':
    case 'water':
      doc.lineWidth(0.4);
      break;
  }
}

const HATCH = '#B9B4A8';

function hatch(paper: Paper, use: AreaUse, points: readonly Pt[]): void {
  const { doc } = paper;
  const xs = points.map(({ x }) => x);
  const ys = points.map(({ y }) => y);
  const page = doc.page;
  const left = Math.max(0, Math.min(...xs));
  const right = Math.min(page.width, Math.max(...xs));
  const top = Math.max(0, Math.min(...ys));
  const bottom = Math.min(page.height, Math.max(...ys));
  if (left >= right || top >= bottom) return;
  doc.lineWidth(0.35).strokeColor(HATCH).fillColor(HATCH);
  switch (use) {
    case 'bed':
      for (let row = 0, y = Math.floor(top / 6) * 6; y <= bottom; y += 6, row += 1)
        for (let x = Math.floor(left / 9) * 9 + (row % 2) * 4.5; x <= right; x += 9) doc.rect(x, y, 0.9, 0.9);
      doc.fill();
      break;
    case 'water':
      for (let y = Math.floor(top / 5) * 5; y <= bottom; y += 5) doc.moveTo(left, y).lineTo(right, y);
      doc.stroke();
      break;
    case 'paved':
      for (let y = Math.floor(top / 9) * 9; y <= bottom; y += 9) doc.moveTo(left, y).lineTo(right, y);
      for (let x = Math.floor(left / 9) * 9; x <= right; x += 9) doc.moveTo(x, top).lineTo(x, bottom);
      doc.lineWidth(0.2).stroke();
      break;
    case 'building':
      for (let x = Math.floor((left - (bottom - top)) / 8) * 8; x <= right; x += 8)
        doc.moveTo(x, bottom).lineTo(x + (bottom - top), top);
      doc.stroke();
      break;
    case 'lawn':
    case 'canopy':
    case 'lot-line':
      break;
  }
}
