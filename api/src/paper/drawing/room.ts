/** Finding room for tags among marks, wires and one another. Lengths in points. */

export interface Pt {
  readonly x: number;
  readonly y: number;
}

export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export const boxAround = ({ x, y }: Pt, width: number, height: number): Box => ({
  left: x - width / 2,
  top: y - height / 2,
  right: x + width / 2,
  bottom: y + height / 2,
});

export interface Wire {
  readonly a: Pt;
  readonly b: Pt;
  /** What it ends at or passes through on purpose. */
  readonly ends: readonly string[];
}

const CELL = 24;

/** Things by the cells of a coarse grid that they reach into, so that looking costs what is near. */
class Grid<T> {
  private readonly cells = new Map<number, T[]>();

  add(box: Box, thing: T): void {
    for (const key of keysOf(box)) {
      const cell = this.cells.get(key);
      if (cell) cell.push(thing);
      else this.cells.set(key, [thing]);
    }
  }

  *near(box: Box): Generator<T> {
    for (const key of keysOf(box)) yield* this.cells.get(key) ?? [];
  }
}

function* keysOf({ left, top, right, bottom }: Box): Generator<number> {
  for (let x = Math.floor(left / CELL); x <= Math.floor(right / CELL); x += 1)
    for (let y = Math.floor(top / CELL); y <= Math.floor(bottom / CELL); y += 1) yield x * 65_536 + y;
}

const overlap = (a: Box, b: Box): boolean =>
  a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

/** Whether a straight line touches a box (Liang and Barsky's clipping). */
export function crosses({ a, b }: { readonly a: Pt; readonly b: Pt }, box: Box): boolean {
  const dx = b.x - a.x;
  const dy = b.y - a.y;
  let from = 0;
  let to = 1;
  for (const [p, q] of [
    [-dx, a.x - box.left],
    [dx, box.right - a.x],
    [-dy, a.y - box.top],
    [dy, box.bottom - a.y],
  ] as const) {
    if (p === 0) {
      if (q < 0) return false;
    } else if (p < 0) from = Math.max(from, q / p);
    else to = Math.min(to, q / p);
    if (from > to) return false;
  }
  return true;
}

const boxOfLine = ({ a, b }: { readonly a: Pt; readonly b: Pt }): Box => ({
  left: Math.min(a.x, b.x),
  top: Math.min(a.y, b.y),
  right: Math.max(a.x, b.x),
  bottom: Math.max(a.y, b.y),
});

const grown = (box: Box, by: number): Box => ({
  left: box.left - by,
  top: box.top - by,
  right: box.right + by,
  bottom: box.bottom + by,
});

export interface Mark {
  readonly id: string;
  readonly at: Pt;
  readonly width: number;
  readonly height: number;
}

export interface PlacedMark {
  readonly id: string;
  /** The middle of the tag. */
  readonly at: Pt;
  /** It stands beside its place, with a line that leads there. */
  readonly aside: boolean;
}

/** Between a tag and another, and between a tag and a wire beside it. */
const CLEAR = 0.5;
const CLEAR_OF_WIRE = 1.5;
/** Of the dot that marks a place whose tag stands aside. */
const DOT = 2.2;
const TURNS = 24;
const RINGS = 14;

/** What is taken on one drawing. */
export class Room {
  private readonly boxes = new Grid<Box>();
  private readonly wires = new Grid<Wire>();
  private readonly leads = new Grid<{ readonly a: Pt; readonly b: Pt }>();

  constructor(
    private readonly frame: Box,
    wires: readonly Wire[],
  ) {
    for (const wire of wires)
      if (overlap(grown(boxOfLine(wire), 1), frame)) this.wires.add(clippedBox(wire, frame), wire);
  }

  take(box: Box): void {
    this.boxes.add(box, box);
  }

  /** Whether a box lies on the drawing with nothing under it but the wires of `own`. */
  free(box: Box, own?: string): boolean {
    const { frame } = this;
    if (box.left < frame.left || box.right > frame.right || box.top < frame.top || box.bottom > frame.bottom)
      return false;
    const wide = grown(box, CLEAR);
    for (const other of this.boxes.near(wide)) if (overlap(wide, other)) return false;
    const wider = grown(box, CLEAR_OF_WIRE);
    for (const lead of this.leads.near(wider)) if (crosses(lead, wider)) return false;
    for (const wire of this.wires.near(wider))
      if ((own === undefined || !wire.ends.includes(own)) && crosses(wire, wider)) return false;
    return true;
  }

  private leadFree(lead: { readonly a: Pt; readonly b: Pt }, skip: Box): boolean {
    for (const other of this.boxes.near(boxOfLine(lead)))
      if (!(other.left === skip.left && other.top === skip.top) && crosses(lead, other)) return false;
    return true;
  }

  /**
   * Places tags: on their places where there is room, else beside them. What finds no room is left out.
   * The places themselves are kept clear first, so that no tag covers somebody else's light.
   */
  place(marks: readonly Mark[]): PlacedMark[] {
    const dots = new Map(marks.map(({ id, at }) => [id, boxAround(at, 2 * DOT, 2 * DOT)]));
    const placed = new Map<string, PlacedMark>();
    const aside: Mark[] = [];
    const others = new Grid<string>();
    for (const [id, dot] of dots) others.add(dot, id);
    for (const mark of marks) {
      const box = boxAround(mark.at, mark.width, mark.height);
      let alone = true;
      for (const id of others.near(box)) if (id !== mark.id && overlap(box, dots.get(id)!)) alone = false;
      if (alone && this.free(box, mark.id)) {
        this.take(box);
        placed.set(mark.id, { id: mark.id, at: mark.at, aside: false });
      } else aside.push(mark);
    }
    for (const { id } of aside) this.take(dots.get(id)!);
    for (const mark of aside) {
      const at = this.beside(mark, dots.get(mark.id)!);
      if (at) placed.set(mark.id, { id: mark.id, at, aside: true });
    }
    return marks.flatMap(({ id }) => placed.get(id) ?? []);
  }

  private beside(mark: Mark, dot: Box): Pt | null {
    for (let ring = 0; ring < RINGS; ring += 1) {
      const distance = Math.max(mark.width, mark.height) / 2 + DOT + 4 + ring * 6;
      for (let turn = 0; turn < TURNS; turn += 1) {
        // To the upper right first, then alternately to either side of it.
        const step = turn % 2 === 0 ? turn / 2 : -(turn + 1) / 2;
        const angle = -Math.PI / 4 + (step * 2 * Math.PI) / TURNS;
        const at = { x: mark.at.x + distance * Math.cos(angle), y: mark.at.y + distance * Math.sin(angle) };
        const box = boxAround(at, mark.width, mark.height);
        const lead = { a: mark.at, b: at };
        if (!this.free(box) || !this.leadFree(lead, dot)) continue;
        this.take(box);
        this.leads.add(boxOfLine(lead), lead);
        return at;
      }
    }
    return null;
  }
}

/** A wire's box on the drawing: one that runs far off it costs no more than what is seen. */
function clippedBox(wire: Wire, frame: Box): Box {
  const box = boxOfLine(wire);
  return {
    left: Math.max(box.left, frame.left - 1),
    top: Math.max(box.top, frame.top - 1),
    right: Math.min(box.right, frame.right + 1),
    bottom: Math.min(box.bottom, frame.bottom + 1),
  };
}
