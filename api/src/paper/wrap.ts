/**
 * Breaks text into lines that are no wider than `width`. Breaks stand at blanks, after hyphens and slashes, and
 * within a word only where it is wider than a whole line. Line ends of the text are kept.
 * @param widthOf the width of a piece of text in the unit of `width`
 */
export function wrapText(text: string, width: number, widthOf: (piece: string) => number): string[] {
  return text.split('\n').flatMap((paragraph) => wrapParagraph(paragraph, width, widthOf));
}

/** A word with the blanks after it; a hyphenated one in its parts, but "2-core" and "P1-4" whole. */
const PIECES = /[^ ]*?(?:(?<=\p{L}{2})[-–—](?=[^ ])|[/@](?=[^ ])| +|$)/gu;

function wrapParagraph(paragraph: string, width: number, widthOf: (piece: string) => number): string[] {
  const lines: string[] = [];
  let line = '';
  let used = 0;
  const close = () => {
    lines.push(line.trimEnd());
    line = '';
    used = 0;
  };
  for (const piece of paragraph.match(PIECES) ?? []) {
    if (piece === '') continue;
    const word = piece.trimEnd();
    const wide = widthOf(word);
    if (used + wide > width && line !== '') close();
    if (wide <= width) {
      line += piece;
      used += word === piece ? wide : widthOf(piece);
      continue;
    }
    let rest = Array.from(word);
    while (rest.length > 0) {
      const fits = longestFit(rest, width, widthOf);
      line = rest.slice(0, fits).join('');
      used = widthOf(line);
      rest = rest.slice(fits);
      if (rest.length > 0) close();
    }
    const blanks = piece.slice(word.length);
    line += blanks;
    used += blanks === '' ? 0 : widthOf(blanks);
  }
  close();
  return lines;
}

/** How many of the signs go on one line; at least one, however narrow it is. */
function longestFit(signs: readonly string[], width: number, widthOf: (piece: string) => number): number {
  let fits = 1;
  let beyond = Math.min(signs.length, 512) + 1;
  while (beyond - fits > 1) {
    const middle = Math.floor((fits + beyond) / 2);
    if (widthOf(signs.slice(0, middle).join('')) <= width) fits = middle;
    else beyond = middle;
  }
  return fits;
}
