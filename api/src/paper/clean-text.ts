/** Stands in the place of what the typeface has no sign for, so that the reader sees that something is missing. */
export const MISSING = '□';

/** Signs that may be written otherwise before they count as missing. */
const alike: Readonly<Record<string, string>> = {
  '\u202f': '\u00a0',
  '\u2007': '\u00a0',
  '\u2009': ' ',
  '\u200a': ' ',
  '\u2010': '-',
  '\u2011': '-',
  '\u2043': '-',
};

/** Joiners, marks of direction and variation, soft hyphens: they shape other signs and show nothing themselves. */
const UNSEEN = /[\p{Cf}\p{Variation_Selector}]/gu;

/**
 * Text as it can be set: line ends as \n, other controls as a blank, and what the typeface lacks as `MISSING`;
 * one for a whole emoji, however many signs make it up.
 */
export function cleanText(text: string, has: (codePoint: number) => boolean): string {
  const plain = text
    .normalize('NFC')
    .replace(/\r\n?|[\u2028\u2029\u0085]/g, '\n')
    .replace(UNSEEN, '')
    .replace(/[^\P{Cc}\n]/gu, ' ');
  let set = '';
  let missing = false;
  for (const sign of plain) {
    const code = sign.codePointAt(0) ?? 0;
    if (sign === '\n' || has(code)) {
      set += sign;
      missing = false;
      continue;
    }
    const other = alike[sign];
    if (other !== undefined) {
      set += other;
      missing = false;
    } else if (!missing || !/\p{M}|\p{Emoji_Modifier}/u.test(sign)) {
      set += MISSING;
      missing = true;
    }
  }
  return set;
}
