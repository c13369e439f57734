import { type Box, overlap, type Point, type Size } from './camera';

/** A figure that wants to stand beside its mark, in window pixels. */
export interface LabelWish {
  readonly id: string;
  readonly at: Point;
  /** Distance from the mark's middle that the label keeps. */
  readonly clear: number;
  readonly size: Size;
  /** Stands on its place instead of beside it: the name of an area. */
  readonly centred?: boolean;
  /** Higher ones are placed first; what finds no room is left out, never squeezed in. */
  readonly rank: number;
}

export interface PlacedLabel {
  readonly id: string;
  readonly box: Box;
}

const GAP = 5;
const CELL = 64;

/** Boxes in a coarse grid, so that 2000 marks cost what is near, not what there is. */
class Taken {
  private readonly cells = new Map<number, Box[]>();

  add(box: Box): void {
    for (const key of keysOf(box)) {
      const cell = this.cells.get(key);
      if (cell === undefined) this.cells.set(key, [box]);
      else cell.push(box);
    }
  }

  hits(box: Box): boolean {
    for (const key of keysOf(box))
      for (const other of this.cells.get(key) ?? []) if (overlap(box, other)) return true;
    return false;
  }
}

function* keysOf(box: Box): Generator<number> {
  for (let cx = Math.floor(box.left / CELL); cx <= Math.floor(box.right / CELL); cx++)
    for (let cy = Math.floor(box.top / CELL); cy <= Math.floor(box.bottom / CELL); cy++)
      yield cx * 65_536 + cy;
}

/**
 * Places labels beside their marks so that none covers another label or a mark. Right, left, above, below,
 * then the corners; highest rank first. Labels that find no room are left out (they come back as one zooms
 * in). Marks and labels out of the window take no part.
 */
export function placeLabels(
  wishes: readonly LabelWish[],
  marks: readonly Box[],
  window: Size,
): PlacedLabel[] {
  const view: Box = { left: 0, top: 0, right: window.width, bottom: window.height };
  const taken = new Taken();
  for (const mark of marks) if (overlap(mark, view)) taken.add(mark);
  const placed: PlacedLabel[] = [];
  const ranked = [...wishes].sort((a, b) => b.rank - a.rank || (a.id < b.id ? -1 : 1));
  for (const wish of ranked) {
    if (!onWindow(wish.at, wish.clear, view)) continue;
    const box = candidates(wish).find((c) => inside(c, view) && !taken.hits(c));
    if (box === undefined) continue;
    taken.add(box);
    placed.push({ id: wish.id, box });
  }
  return placed;
}

function onWindow(p: Point, r: number, view: Box): boolean {
  return p.x > view.left - r && p.x < view.right + r && p.y > view.top - r && p.y < view.bottom + r;
}

function inside(box: Box, view: Box): boolean {
  return box.left >= view.left && box.right <= view.right && box.top >= view.top && box.bottom <= view.bottom;
}

function candidates({ at, clear, size, centred }: LabelWish): Box[] {
  const dx = clear + GAP;
  const dy = clear + GAP;
  const { width: w, height: h } = size;
  const corner = dx * Math.SQRT1_2;
  const at0 = (left: number, top: number): Box => ({ left, top, right: left + w, bottom: top + h });
  if (centred) return [at0(at.x - w / 2, at.y - h / 2)];
  return [
    at0(at.x + dx, at.y - h / 2),
    at0(at.x - dx - w, at.y - h / 2),
    at0(at.x - w / 2, at.y - dy - h),
    at0(at.x - w / 2, at.y + dy),
    at0(at.x + corner, at.y - corner - h),
    at0(at.x + corner, at.y + corner),
    at0(at.x - corner - w, at.y - corner - h),
    at0(at.x - corner - w, at.y + corner),
  ];
}
