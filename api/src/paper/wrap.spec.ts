import { describe, expect, it } from 'vitest';
import { cleanText, MISSING } from './clean-text.js';
import { wrapText } from './wrap.js';

/** Every sign one wide. */
const wrap = (text: string, width: number) => wrapText(text, width, (piece) => Array.from(piece).length);

describe('breaking text into lines', () => {
  it('breaks at blanks and keeps the ends of lines', () => {
    expect(wrap('one two three\n\nfour', 8)).toEqual(['one two', 'three', '', 'four']);
  });

  it('breaks after hyphens and slashes, and keeps them', () => {
    expect(wrap('cable, 2-core', 8)).toEqual(['cable,', '2-core']);
    expect(wrap('well-known and/or', 6)).toEqual(['well-', 'known', 'and/or']);
  });

  it('breaks a word only where it is wider than a line, and loses no sign of it', () => {
    const word = 'x'.repeat(10_000);
    const lines = wrap(`a ${word} b`, 80);
    expect(Math.max(...lines.map(({ length }) => length))).toBe(80);
    expect(lines.join('').replace(/[ ab]/g, '')).toBe(word);
  });

  it('does not part the two halves of a sign beyond the first plane', () => {
    for (const line of wrap('𝄞'.repeat(50), 7)) expect(line).toMatch(/^(𝄞)+$/u);
  });

  it('goes on where a line has room for nothing', () => {
    expect(wrap('ab c', 0.5)).toEqual(['a', 'b', 'c']);
  });
});

describe('text as it can be set', () => {
  const latin = (code: number) => code < 0x250 || code === MISSING.codePointAt(0);
  it.each([
    ['a family of four', '👨‍👩‍👧‍👦 home', `${MISSING.repeat(4)} home`],
    ['a tinted hand', 'ok 👍🏽', `ok ${MISSING}`],
    ['Hebrew', 'שלום', MISSING.repeat(4)],
    ['marks of direction', 'a\u202eb\u2066c', 'abc'],
    ['controls', 'a\u0000b\u0007c\td', 'a b c d'],
    ['line ends', 'a\r\nb\rc\u2028d', 'a\nb\nc\nd'],
    ['half a sign', 'a\ud83db', `a${MISSING}b`],
    ['a composed letter', 'e\u0301', 'é'],
    ['a narrow blank', '1\u202f000', '1\u00a0000'],
  ])('%s', (_what, text, set) => {
    expect(cleanText(text, latin)).toBe(set);
  });
});
