import { type AreaUse, areaUses } from '@lampwright/geometry/plan';
import type { RevisionDocument } from '../../modules/proposals/revision-document.js';
import { leadingOf, type Paper, type TextStyle } from '../paper.js';
import type { Pt } from './room.js';
import type { SheetContent } from './sheet-content.js';
import {
  areaNames,
  drawArea,
  drawCable,
  drawFeed,
  drawHub,
  drawSplice,
  drawTag,
  drawTransformer,
  tagSize,
} from './symbols.js';
import { drawTree, drawWall } from './uprights.js';

export interface LegendEntry {
  readonly text: string;
  draw(at: Pt): void;
}

const STYLE: TextStyle = { size: 7.6 };
const SIGN = 26;
const GAP = 5;
const LEAST = 19;

/** What is on a sheet, and only that. */
export function legendOf(
  paper: Paper,
  { lights, cables, nodes, areas, walls, trees }: SheetContent,
  document: RevisionDocument,
  overPicture: boolean,
): LegendEntry[] {
  const entries: LegendEntry[] = [];
  const shown = new Map(document.lights.map((light) => [light.recordId, light]));
  const initials = new Map<string, Set<string>>();
  for (const { id } of lights) {
    const light = shown.get(id);
    if (!light) continue;
    const kinds = initials.get(light.initial) ?? new Set();
    initials.set(light.initial, kinds.add(kindWords(light.kind)));
  }
  const tag = (text: string, offered: boolean) => (at: Pt) =>
    drawTag(paper, at, text, tagSize(paper, text), offered);
  for (const [initial, kinds] of [...initials].sort(([a], [b]) => (a < b ? -1 : 1)))
    entries.push({ text: [...kinds].sort().join(', '), draw: tag(initial, false) });
  if (lights.some(({ offered }) => offered))
    entries.push({ text: 'Dashed: offered as an addition, not included', draw: tag(' ', true) });
  for (const node of nodes.filter(({ kind }) => kind === 'transformer'))
    entries.push({
      text: node.name === '' ? 'Transformer' : `Transformer: ${node.name}`,
      draw: (at) => drawTransformer(paper, at, node.tag),
    });
  if (nodes.some(({ kind }) => kind === 'feed'))
    entries.push({
      text: 'Feed from a transformer on another sheet',
      draw: (at) => drawFeed(paper, at, 'T'),
    });
  for (const name of new Set(nodes.filter(({ kind }) => kind === 'hub').map((hub) => hub.name)))
    entries.push({ text: name || 'Hub', draw: (at) => drawHub(paper, at, 'H') });
  if (nodes.some(({ kind }) => kind === 'splice'))
    entries.push({ text: 'Buried splice', draw: (at) => drawSplice(paper, at) });
  const weights = new Map(cables.map(({ name, weight }) => [name, weight]));
  for (const [name, weight] of [...weights].sort(([, a], [, b]) => b - a))
    entries.push({
      text: name,
      draw: ({ x, y }) =>
        drawCable(
          paper,
          [
            { x: x - 11, y },
            { x: x + 11, y },
          ],
          weight,
        ),
    });
  if (!overPicture) {
    for (const use of areaUses)
      if (areas.some((area) => area.use === use)) entries.push(areaEntry(paper, use));
    if (walls.length > 0)
      entries.push({
        text: 'Wall that catches light',
        draw: ({ x, y }) =>
          drawWall(paper, [
            { x: x - 11, y },
            { x: x + 11, y },
          ]),
      });
    if (trees.length > 0)
      entries.push({
        text: 'Tree or shrub',
        draw: (foot) => drawTree(paper, { foot, crown: { radius: 7 } }),
      });
  }
  return entries;
}

function areaEntry(paper: Paper, use: AreaUse): LegendEntry {
  return {
    text: areaNames[use],
    draw: ({ x, y }) =>
      drawArea(
        paper,
        use,
        [
          { x: x - 11, y: y - 6 },
          { x: x + 11, y: y - 6 },
          { x: x + 11, y: y + 6 },
          { x: x - 11, y: y + 6 },
        ],
        false,
      ),
  };
}

function kindWords(kind: string): string {
  switch (kind) {
    case 'path':
      return 'Path light';
    case 'up':
      return 'Up-light';
    case 'down':
      return 'Down-light';
    case 'flood':
      return 'Flood light';
    case 'wall-wash':
      return 'Wall wash';
    case 'step':
      return 'Step light';
    case 'in-grade':
      return 'In-grade light';
    case 'bollard':
      return 'Bollard';
    case 'linear':
      return 'Linear light';
    case 'underwater':
      return 'Light under water';
    default:
      return kind === '' ? 'Light' : kind;
  }
}

const linesOf = (paper: Paper, { text }: LegendEntry, width: number) =>
  paper.wrap(text, width - SIGN - GAP, STYLE);

export const entryHeight = (paper: Paper, entry: LegendEntry, width: number): number =>
  Math.max(LEAST, linesOf(paper, entry, width).length * leadingOf(STYLE) + 4);

export function drawEntry(paper: Paper, entry: LegendEntry, x: number, y: number, width: number): void {
  const lines = linesOf(paper, entry, width);
  const height = entryHeight(paper, entry, width);
  entry.draw({ x: x + SIGN / 2, y: y + height / 2 });
  const top = y + (height - lines.length * leadingOf(STYLE)) / 2;
  lines.forEach((line, i) => {
    paper.line(line, x + SIGN + GAP, top + i * leadingOf(STYLE), STYLE);
  });
}
