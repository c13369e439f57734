import { colours } from '../face.js';
import { leadingOf, type Paper } from '../paper.js';
import { boxOfPoints, type OnPage } from './projection.js';
import { type Box, boxAround, type PlacedMark, type Pt, Room, type Wire } from './room.js';
import type { DrawnLight, SheetContent } from './sheet-content.js';
import {
  areaNames,
  BLOCK,
  drawArea,
  drawCable,
  drawDot,
  drawFeed,
  drawHub,
  drawLead,
  drawSplice,
  drawTag,
  drawTransformer,
  tagSize,
} from './symbols.js';
import { drawTree, drawWall, treeOnPage, wallOnPage } from './uprights.js';

/** Where more than this share of the usual tags finds no room on its place, small ones are tried. */
const CROWDED = 0.2;

/** Draws the lights of a sheet with their tags; gives those whose tag found no room. */
function drawLights(
  paper: Paper,
  frame: Box,
  lights: readonly DrawnLight[],
  onPage: OnPage,
  room: () => Room,
): { readonly room: Room; readonly without: string[] } {
  const byId = new Map(lights.map((light) => [light.id, light]));
  const attempt = (sizeName: 'usual' | 'small') => {
    const taken = room();
    const marks = lights.flatMap(({ id, at, tag }) => {
      const place = onPage(at);
      const { width, height } = tagSize(paper, tag, sizeName);
      return place && within(place, frame) ? { id, at: place, width, height } : [];
    });
    const placed = new Map<string, PlacedMark>(taken.place(marks).map((mark) => [mark.id, mark]));
    const onPlace = [...placed.values()].filter(({ aside }) => !aside).length;
    return { sizeName, room: taken, marks, placed, onPlace };
  };
  const usual = attempt('usual');
  const small = usual.onPlace < (1 - CROWDED) * usual.marks.length ? attempt('small') : usual;
  const { sizeName, room: taken, marks, placed } = small.onPlace > usual.onPlace ? small : usual;
  for (const { id, at } of marks) {
    const mark = placed.get(id);
    if (mark && !mark.aside) continue;
    if (mark) drawLead(paper, at, mark.at);
    drawDot(paper, at);
  }
  for (const [id, { at }] of placed) {
    const { tag, offered } = byId.get(id)!;
    drawTag(paper, at, tag, tagSize(paper, tag, sizeName), offered);
  }
  return { room: taken, without: lights.filter(({ id }) => !placed.has(id)).map(({ tag }) => tag) };
}

/** A picture with its lights marked, and nothing of the wiring. Gives the tags that found no room. */
export function markPicture(
  paper: Paper,
  frame: Box,
  lights: readonly DrawnLight[],
  onPage: OnPage,
): string[] {
  return drawLights(paper, frame, lights, onPage, () => new Room(frame, [])).without;
}

export interface DrawingOptions {
  /** A picture lies under it, which shows areas, walls and trees itself. */
  readonly overPicture: boolean;
}

/** Draws areas, cable, nodes and lights of a sheet into a frame. Gives the tags that found no room. */
export function drawSheet(
  paper: Paper,
  frame: Box,
  content: SheetContent,
  onPage: OnPage,
  { overPicture }: DrawingOptions,
): string[] {
  const { doc } = paper;
  const lines = content.cables.map((cable) => ({
    ...cable,
    line: cable.points.flatMap((point) => onPage(point) ?? []),
  }));
  const wires: Wire[] = lines.flatMap(({ line, ends }) =>
    line.slice(1).map((b, i) => ({ a: line[i]!, b, ends })),
  );
  const areas = content.areas.flatMap((area) => {
    const points = area.points.map(onPage);
    return points.every((point) => point !== null) ? { area, points } : [];
  });
  // What lies within another is drawn over it: a pool on its lawn.
  areas.sort((a, b) => sizeOf(b.points) - sizeOf(a.points));
  doc.save();
  doc.rect(frame.left, frame.top, frame.right - frame.left, frame.bottom - frame.top).clip();
  if (!overPicture) {
    for (const { area, points } of areas) drawArea(paper, area.use, points, false);
    for (const tree of content.trees) {
      const drawn = treeOnPage(tree, content.sheet, onPage);
      if (drawn) drawTree(paper, drawn);
    }
    for (const wall of content.walls) {
      const foot = wallOnPage(wall, onPage);
      if (foot) drawWall(paper, foot);
    }
  }
  for (const { line, weight } of [...lines].sort((a, b) => b.weight - a.weight))
    if (line.length > 1) drawCable(paper, line, weight);
  const nodes = content.nodes.flatMap((node) => {
    const place = onPage(node.at);
    return place ? { ...node, place } : [];
  });
  for (const { place, kind, tag } of nodes) {
    switch (kind) {
      case 'transformer':
        drawTransformer(paper, place, tag);
        break;
      case 'feed':
        drawFeed(paper, place, tag);
        break;
      case 'hub':
        drawHub(paper, place, tag);
        break;
      case 'splice':
        drawSplice(paper, place);
        break;
    }
  }
  const { room, without } = drawLights(paper, frame, content.lights, onPage, () => {
    const taken = new Room(frame, wires);
    for (const { place, kind } of nodes) {
      const size = kind === 'splice' ? 6 : BLOCK;
      taken.take(boxAround(place, size, size));
    }
    return taken;
  });
  if (!overPicture) nameAreas(paper, frame, areas, room);
  doc.restore();
  return without;
}

const NAME = { size: 6.6, colour: colours.quiet } as const;

/** Names stand in the middle of what is seen of their area, or nowhere: the legend tells what its hatching is. */
function nameAreas(
  paper: Paper,
  frame: Box,
  areas: readonly { readonly area: SheetContent['areas'][number]; readonly points: readonly Pt[] }[],
  room: Room,
): void {
  for (const { area, points } of areas) {
    if (area.use === 'lot-line') continue;
    const name = paper.clean(area.name || areaNames[area.use]).replaceAll('\n', ' ');
    const seen = boxOfPoints(points);
    if (!seen) continue;
    const box = {
      left: Math.max(seen.left, frame.left),
      right: Math.min(seen.right, frame.right),
      top: Math.max(seen.top, frame.top),
      bottom: Math.min(seen.bottom, frame.bottom),
    };
    const width = paper.widthOf(name, NAME) + 4;
    const height = leadingOf(NAME);
    if (width > box.right - box.left || height > box.bottom - box.top) continue;
    const middle = { x: (box.left + box.right) / 2, y: (box.top + box.bottom) / 2 };
    const places = [0, -0.2, 0.2, -0.35, 0.35].flatMap((dy) =>
      [0, -0.2, 0.2, -0.3, 0.3].map((dx) => ({
        x: middle.x + dx * (box.right - box.left),
        y: middle.y + dy * (box.bottom - box.top),
      })),
    );
    const place = places.find((at) => {
      const label = boxAround(at, width, height);
      return corners(label).every((corner) => inPolygon(corner, points)) && room.free(label);
    });
    if (!place) continue;
    room.take(boxAround(place, width, height));
    const { doc } = paper;
    doc.save().fillColor(colours.paper).fillOpacity(0.75);
    doc
      .roundedRect(place.x - width / 2, place.y - height / 2, width, height, 2)
      .fill()
      .restore();
    paper.lineCentred(name, place.x, place.y - height / 2, NAME);
  }
}

/** Twice the area within, by the shoelace formula. */
const sizeOf = (points: readonly Pt[]): number =>
  Math.abs(
    points.reduce((sum, a, i) => {
      const b = points[(i + 1) % points.length] ?? a;
      return sum + a.x * b.y - b.x * a.y;
    }, 0),
  );

const corners = ({ left, top, right, bottom }: Box): Pt[] => [
  { x: left, y: top },
  { x: right, y: top },
  { x: right, y: bottom },
  { x: left, y: bottom },
];

function inPolygon({ x, y }: Pt, polygon: readonly Pt[]): boolean {
  let inside = false;
  for (let i = 0, j = polygon.length - 1; i < polygon.length; j = i++) {
    const a = polygon[i]!;
    const b = polygon[j]!;
    if (a.y > y !== b.y > y && x < ((b.x - a.x) * (y - a.y)) / (b.y - a.y) + a.x) inside = !inside;
  }
  return inside;
}

const within = ({ x, y }: Pt, { left, top, right, bottom }: Box): boolean =>
  x >= left && x <= right && y >= top && y <= bottom;
