import { colours } from './face.js';
import { leadingOf, type Paper, type TextStyle } from './paper.js';

export interface Column {
  readonly title: string;
  /** Points; the one column without takes what is left. */
  readonly width?: number;
  readonly align?: 'left' | 'right';
}

export interface Row {
  readonly cells: readonly string[];
  readonly strong?: boolean;
  /** The smaller words under the first cells that have some, by column. */
  readonly below?: readonly string[];
}

const CELL: TextStyle = { size: 9 };
const STRONG: TextStyle = { size: 9, weight: 'semibold' };
const BELOW: TextStyle = { size: 8, colour: colours.quiet };
const HEAD: TextStyle = { size: 8, weight: 'medium', colour: colours.quiet };
const GAP = 10;
const PAD = 3;

interface SetLine {
  readonly text: string;
  readonly style: TextStyle;
}

/** A table whose heads stand again on every page that it goes on to; rows of any height flow on. */
export function drawTable(paper: Paper, columns: readonly Column[], rows: readonly Row[]): void {
  const places = placesOf(paper, columns);
  const head = () => drawHead(paper, columns, places);
  const firstRow = rows[0];
  if (!firstRow) return;
  paper.need(
    headHeight(paper, columns, places) +
      2 * PAD +
      Math.min(4, linesOf(paper, firstRow, places)) * leadingOf(CELL),
  );
  head();
  for (const row of rows) drawRow(paper, columns, places, row, head);
  paper.y += PAD;
}

interface Place {
  readonly x: number;
  readonly width: number;
}

function placesOf(paper: Paper, columns: readonly Column[]): Place[] {
  const fixed = columns.reduce((sum, { width = 0 }) => sum + width, 0);
  const rest = paper.width - fixed - GAP * (columns.length - 1);
  let x = paper.left;
  return columns.map(({ width = rest }) => {
    const place = { x, width };
    x += width + GAP;
    return place;
  });
}

const headLines = (paper: Paper, columns: readonly Column[], places: readonly Place[]) =>
  columns.map(({ title }, i) => paper.wrap(title, places[i]!.width, HEAD));

const headHeight = (paper: Paper, columns: readonly Column[], places: readonly Place[]) =>
  Math.max(...headLines(paper, columns, places).map(({ length }) => length)) * leadingOf(HEAD) + PAD + 1;

function drawHead(paper: Paper, columns: readonly Column[], places: readonly Place[]): void {
  const lines = headLines(paper, columns, places);
  const height = headHeight(paper, columns, places);
  lines.forEach((titles, i) => {
    // Heads of several lines end on the same one.
    const from = paper.y + height - PAD - 1 - titles.length * leadingOf(HEAD);
    titles.forEach((text, n) => {
      put(paper, text, places[i]!, columns[i]!, from + n * leadingOf(HEAD), HEAD);
    });
  });
  paper.y += height;
  paper.rule(paper.y - 1, colours.ink, 0.8);
}

function setRow(paper: Paper, row: Row, places: readonly Place[]): SetLine[][] {
  const style = row.strong ? STRONG : CELL;
  return places.map(({ width }, i) => {
    const below = row.below?.[i] ?? '';
    return [
      ...paper.wrap(row.cells[i] ?? '', width, style).map((text) => ({ text, style })),
      ...(below === '' ? [] : paper.wrap(below, width, BELOW).map((text) => ({ text, style: BELOW }))),
    ];
  });
}

const linesOf = (paper: Paper, row: Row, places: readonly Place[]) =>
  Math.max(...setRow(paper, row, places).map(({ length }) => length));

function drawRow(
  paper: Paper,
  columns: readonly Column[],
  places: readonly Place[],
  row: Row,
  head: () => void,
): void {
  const cells = setRow(paper, row, places);
  const leading = leadingOf(CELL);
  const count = Math.max(...cells.map(({ length }) => length));
  const wholePage = Math.floor((paper.bottom - paper.top - 60) / leading);
  let from = 0;
  while (from < count) {
    const left = count - from;
    const fits = Math.floor((paper.room - 2 * PAD) / leading);
    // A row that fits on a page stays whole; only a longer one is divided.
    if (fits < 1 || (fits < left && left <= wholePage)) {
      paper.addPage();
      head();
      continue;
    }
    const taken = Math.min(left, fits);
    cells.forEach((lines, i) => {
      lines.slice(from, from + taken).forEach(({ text, style }, n) => {
        put(paper, text, places[i]!, columns[i]!, paper.y + PAD + n * leading, style);
      });
    });
    paper.y += taken * leading + 2 * PAD;
    from += taken;
  }
  paper.rule(paper.y, colours.chalk, 0.6);
}

function put(
  paper: Paper,
  text: string,
  { x, width }: Place,
  column: Column,
  y: number,
  style: TextStyle,
): void {
  if (column.align === 'right') paper.lineTo(text, x + width, y, style);
  else paper.line(text, x, y, style);
}
