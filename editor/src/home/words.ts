import { formatMoney } from '@lampwright/geometry/price';
import type { Light, Line, ShareDocument, Stage } from './share';

/** The manner in which a proposal writes its sums, days and quantities: that of the company. */
type Manner = Pick<ShareDocument, 'currency' | 'locale'>;

/** Writes minor units as the company's papers write them: "$3,417.00". */
export const moneyOf =
  ({ currency, locale }: Manner) =>
  (amountMinor: number): string =>
    formatMoney(amountMinor, currency, locale);

const NARROW_SPACE = ' ';

/** "6 %", "6.625 %". */
export const percentOf = (percent: number, locale: string): string =>
  `${new Intl.NumberFormat(locale, { maximumFractionDigits: 4 }).format(percent)}${NARROW_SPACE}%`;

export function dayOf(iso: string, locale: string): string {
  // A bare date is that day wherever it is read: noon keeps it clear of every time zone’s midnight.
  const date = new Date(iso.length === 10 ? `${iso}T12:00:00` : iso);
  return new Intl.DateTimeFormat(locale, { day: 'numeric', month: 'short', year: 'numeric' }).format(date);
}

export const momentOf = (iso: string, locale: string): string =>
  new Intl.DateTimeFormat(locale, {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: 'numeric',
    minute: '2-digit',
  }).format(new Date(iso));

export const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;

/** Kept on one line: "proposal" alone at the end of one says nothing. */
export const together = (text: string): string => text.replaceAll(' ', '\u00a0');

/** "proposal 1042", and which revision where it is not the first. */
export const proposalInWords = ({ number, revision }: Pick<ShareDocument, 'number' | 'revision'>): string[] =>
  [`proposal ${number}`, ...(revision > 1 ? [`revision ${revision}`] : [])].map(together);

/** Parts of one line with dots between, which stay at the ends of lines. */
export const dotted = (parts: readonly string[]): string => parts.join('\u00a0· ');

/** "Path", "Path and Wall", "Path, Wall and Tree". */
export const listOf = (names: readonly string[]): string =>
  names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]}`;

const kinds: Readonly<Record<string, string>> = {
  path: 'path light',
  up: 'up-light',
  down: 'down-light',
  flood: 'flood light',
  'wall-wash': 'wall light',
  step: 'step light',
  'in-grade': 'in-grade light',
  bollard: 'bollard',
  linear: 'strip light',
  underwater: 'underwater light',
};

/** "path light": what it is in plain words. */
export const kindInWords = ({ kind }: Pick<Light, 'kind'>): string => kinds[kind] ?? 'light';

/** "path lights". */
export const kindsInWords = (light: Pick<Light, 'kind'>): string => `${kindInWords(light)}s`;

export const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/** Ends as sentences do. */
export const sentence = (text: string): string => (/[.!?…]$/.test(text) ? text : `${text}.`);

/** "5 path lights"; "4 lights" where they are of several kinds. */
export function lightsInWords(fixtures: number, lights: readonly Pick<Light, 'kind'>[]): string {
  const [first, ...others] = [...new Set(lights.map(({ kind }) => kind))];
  const kind = first !== undefined && others.length === 0 ? kinds[first] : undefined;
  return count(fixtures, kind ?? 'light');
}

export function quantityOf({ quantity, unit }: Pick<Line, 'quantity' | 'unit'>, locale: string): string {
  const n = new Intl.NumberFormat(locale, { maximumFractionDigits: 3 }).format(quantity);
  switch (unit) {
    case 'each':
      return `${n} ×`;
    case 'foot':
      return `${n} ft`;
    case 'meter':
      return `${n} m`;
    case 'visit':
      return `${n} ${quantity === 1 ? 'visit' : 'visits'}`;
  }
}

export function dueInWords(due: Stage['due']): string {
  switch (due) {
    case 'approval':
      return 'now';
    case 'start':
      return 'when work begins';
    case 'finish':
      return 'when the work is done';
  }
}

/** "Deposit, 30 %, now". */
export const stageInWords = (stage: Stage, locale: string): string =>
  [
    stage.name,
    ...(stage.percent === null ? [] : [percentOf(stage.percent, locale)]),
    dueInWords(stage.due),
  ].join(', ');
