import type { ControlZone, LightSource, NightScene } from '@lampwright/geometry/light';
import { scheduleInWords } from '@lampwright/geometry/night';
import { colours } from '../face.js';
import type { NightPicture } from '../night-picture.js';
import { leadingOf, type Orientation, type Paper, type TextStyle } from '../paper.js';
import { asItIs } from '../pictures.js';
import { BODY, SECTION, type Writing } from './parts.js';

const LABEL: TextStyle = { size: 8, weight: 'medium', colour: colours.quiet };
/** Shares of the width. */
const COLUMNS = [0.42, 0.3, 0.28] as const;
const COLUMN_GAP = 22;
const GAP = 9;
/** A picture that the words would leave less than this of its height is given it, and they go on overleaf. */
const LEAST_SHARE = 0.6;
const LUX_PER_FOOT_CANDLE = 10.764;

/** What is said of one thing, under its label. */
interface Saying {
  readonly label: string;
  readonly text: string;
}

/** The garden by the light of the plan, as large as a page holds it, and what it is worked out from. */
export function nightPage(writing: Writing, { scene, picture }: NightPicture): void {
  const { paper, document } = writing;
  const name = document.sheets.find(({ id }) => id === scene.sheetId)?.name.trim() || 'the garden';
  const title = paper.clean(`At night: ${name}`).replaceAll('\n', ' ');
  const sayings = [impression(writing, scene), shown(writing, scene), hours(writing, scene)];
  const aspect = scene.widthPx / scene.heightPx;
  const [landscape, portrait] = [layoutFor('landscape'), layoutFor('portrait')];
  // Words that find no room under a wide picture flow on from a page in portrait, as everything else does.
  const isBetter = landscape.wordsFit && !(portrait.wordsFit && portrait.width > landscape.width);
  const layout = isBetter ? landscape : portrait;

  paper.addPage(layout.orientation);
  paper.bookmark(title);
  for (const line of paper.wrap(title, paper.width, SECTION)) {
    paper.line(line, paper.left, paper.y, SECTION);
    paper.y += leadingOf(SECTION);
  }
  paper.y += GAP;
  const left = paper.left + (paper.width - layout.width) / 2;
  const height = layout.width / aspect;
  paper.doc.image(asItIs(paper, picture).image, left, paper.y, { width: layout.width, height });
  paper.y += height + GAP;
  if (layout.wordsFit) inColumns(paper, sayings);
  else
    for (const { label, text } of sayings) {
      paper.need(leadingOf(LABEL) + leadingOf(BODY));
      paper.flow(label, LABEL);
      paper.flow(text, BODY, { after: 6 });
    }

  function layoutFor(orientation: Orientation) {
    const inner = paper.innerSize(orientation);
    const head = paper.wrap(title, inner.width, SECTION).length * leadingOf(SECTION) + GAP;
    const words = heightInColumns(paper, sayings, inner.width) + GAP;
    const whole = Math.min(inner.height - head, inner.width / aspect);
    const height = Math.min(whole, inner.height - head - words);
    const wordsFit = height >= LEAST_SHARE * whole;
    return { orientation, wordsFit, width: (wordsFit ? height : whole) * aspect };
  }
}

/** Widths of the columns under a picture, for what is said in three. */
const columnWidths = (width: number): number[] =>
  COLUMNS.map((share) => (width - (COLUMNS.length - 1) * COLUMN_GAP) * share);

function heightInColumns(paper: Paper, sayings: readonly Saying[], width: number): number {
  const widths = columnWidths(width);
  const lines = sayings.map(({ text }, i) => paper.wrap(text, widths[i]!, BODY).length);
  return leadingOf(LABEL) + Math.max(...lines) * leadingOf(BODY);
}

function inColumns(paper: Paper, sayings: readonly Saying[]): void {
  const widths = columnWidths(paper.width);
  let x = paper.left;
  for (const [i, { label, text }] of sayings.entries()) {
    paper.line(label, x, paper.y, LABEL);
    for (const [row, line] of paper.wrap(text, widths[i]!, BODY).entries())
      paper.line(line, x, paper.y + leadingOf(LABEL) + row * leadingOf(BODY), BODY);
    x += widths[i]! + COLUMN_GAP;
  }
}

function impression({ say, document }: Writing, { whiteLux }: NightScene): Saying {
  const lux = say.number(Math.round(whiteLux * 10) / 10);
  const footCandles = say.number(Math.round((whiteLux / LUX_PER_FOOT_CANDLE) * 10) / 10);
  const white = document.units === 'imperial' ? `${footCandles} foot-candles (${lux} lux)` : `${lux} lux`;
  return {
    label: 'What this shows',
    text: `Artist’s impression: worked out from the place, aim, beam, colour and estimated volts of each planned light, on a dark night without moon or street light. White stands for a white surface under ${white}. The real garden will look a little different.`,
  };
}

const isIn = (taken: ReadonlySet<string>, { groupId }: Pick<LightSource, 'groupId'>): boolean =>
  groupId === null || taken.has(groupId);

/** The parts of the offer that the lights of this picture belong to. */
function shown({ document, taken, signature }: Writing, { sources }: NightScene): Saying {
  const here = new Set(sources.map(({ groupId }) => groupId));
  const named = document.price.groups.filter(({ id }) => here.has(id));
  const names = (groups: typeof named) =>
    list(groups.map(({ id, name }) => (id === null ? 'the lights that are always in' : `“${name}”`)));
  const on = named.filter(({ id }) => id === null || taken.has(id));
  const off = named.filter(({ id }) => id !== null && !taken.has(id));
  const agreed = signature ? 'as approved' : 'as offered';
  const without = off.length === 0 ? '' : ` Not shown, since not included: ${names(off)}.`;
  return { label: 'Lights shown', text: `Lit ${agreed}: ${names(on)}.${without}` };
}

/** "a, b and c". */
const list = (parts: readonly string[]): string =>
  parts.length < 2 ? (parts[0] ?? '') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1)}`;

/** When the lights of this picture are on: once for all that have the same hours. */
function hours({ taken }: Writing, { sources, zones }: NightScene): Saying {
  const lit = new Set(sources.filter((source) => isIn(taken, source)).map(({ zoneId }) => zoneId));
  const byHours = new Map<string, ControlZone[]>();
  for (const zone of zones) {
    if (!lit.has(zone.id)) continue;
    const words = scheduleInWords(zone.schedule);
    byHours.set(words, [...(byHours.get(words) ?? []), zone]);
  }
  const all = [...byHours];
  const lower = (words: string) => words.charAt(0).toLowerCase() + words.slice(1);
  const [first] = all;
  const text =
    all.length === 1 && first
      ? `On ${lower(first[0])}.`
      : `${all.map(([words, its]) => `${list(its.map(({ name }) => name))}: ${lower(words)}.`).join(' ')} The picture shows them all on.`;
  return { label: 'When they are on', text };
}
