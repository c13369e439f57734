import { colours } from './face.js';
import type { Paper, TextStyle } from './paper.js';

const STYLE: TextStyle = { size: 7.4, colour: colours.quiet };

/** What stands at the foot of every page: whose it is, what it is, and which page of how many. */
export function drawFoot(paper: Paper, company: string, what: string, page: number, pages: number): void {
  const y = paper.bottom + 14;
  paper.rule(y - 6);
  const number = `Page ${page} of ${pages}`;
  const room = paper.width - paper.widthOf(number, STYLE) - 16;
  const fitted = (text: string, width: number): { text: string; style: TextStyle } => {
    const clean = paper.clean(text).replaceAll('\n', ' ');
    const size = Math.max(5.2, Math.min(STYLE.size, (STYLE.size * width) / paper.widthOf(clean, STYLE)));
    const style = { ...STYLE, size };
    // The name stands in full on the first page.
    const [line = '', more] = paper.wrap(clean, width - paper.widthOf('…', style), style);
    return { text: more === undefined ? line : `${line}…`, style };
  };
  const first = fitted(what, room);
  paper.line(first.text, paper.left, y, first.style);
  paper.lineTo(number, paper.right, y, STYLE);
  const second = fitted(company, paper.width);
  paper.line(second.text, paper.left, y + 11, second.style);
}
