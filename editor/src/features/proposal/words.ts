import type { Words, WordsKey } from './api';

/** The texts of a proposal in the order in which they are read. */
export const wordsKeys = [
  'scope',
  'exclusions',
  'timeline',
  'locate',
  'warranty',
  'terms',
  'cancellation',
] as const satisfies readonly WordsKey[];

export function wordsLabel(key: WordsKey): string {
  switch (key) {
    case 'scope':
      return 'Scope of the work';
    case 'exclusions':
      return 'Not included';
    case 'timeline':
      return 'Timeline';
    case 'locate':
      return 'Utility locate';
    case 'warranty':
      return 'Warranty';
    case 'terms':
      return 'Terms';
    case 'cancellation':
      return 'Right to cancel';
  }
}

export function wordsHint(key: WordsKey): string {
  switch (key) {
    case 'scope':
      return 'What the company does, beyond what the plan shows.';
    case 'exclusions':
      return 'What somebody else does, or nobody.';
    case 'timeline':
      return 'When the work can begin, and how long it takes.';
    case 'locate':
      return 'Who books the utility locate, and who marks private lines.';
    case 'warranty':
      return 'What is covered, and for how long.';
    case 'terms':
      return 'Payment, changes, access to the property.';
    case 'cancellation':
      return 'What the region’s law gives the client.';
  }
}

export const mostLetters: Readonly<Record<WordsKey, number>> = {
  scope: 8000,
  exclusions: 8000,
  timeline: 4000,
  locate: 4000,
  warranty: 8000,
  terms: 20_000,
  cancellation: 8000,
};

/** Plain text to its paragraphs, which empty lines part. */
export const paragraphsOf = (text: string): readonly string[] =>
  text
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter((paragraph) => paragraph !== '');

/** The job's own words with one text set, or given back to the company. */
export function withOwn(
  words: Words,
  own: readonly string[],
  key: WordsKey,
  text: string | null,
): Partial<Words> {
  const next: Partial<Record<WordsKey, string>> = {};
  for (const each of wordsKeys) if (own.includes(each)) next[each] = words[each];
  if (text === null) delete next[key];
  else next[key] = text;
  return next;
}

export const sameWords = (a: Words, b: Words): boolean => wordsKeys.every((key) => a[key] === b[key]);
