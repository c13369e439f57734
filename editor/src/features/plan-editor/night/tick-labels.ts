import { clockText, type Evening } from '@lampwright/geometry/night';
import { type EveningLine, shareOf, type Tick } from './moments';

/** A word under the evening line, its edges in pixels from the line's start. */
export interface TickLabel {
  readonly key: string;
  readonly text: string;
  readonly left: number;
}

/** Pixels of a letter of the small type, on the wide side, and what is left free between two labels. */
const LETTER = 6.6;
const GAP = 14;
/** How far a label that stands aside still goes past its tick. */
const EDGE = 12;

const rank = (tick: Tick, last: boolean): number =>
  tick.kind === 'sunset' ? 0 : last ? 1 : tick.kind === 'off' ? 2 : 3;

/** What happens, in words; zones are named where not all of them do it. */
function wordOf({ kind, zones }: Tick, zoneCount: number, last: boolean): string {
  switch (kind) {
    case 'sunset':
      return 'Sunset';
    case 'on':
    case 'off': {
      const word = kind === 'on' ? 'On' : 'Off';
      // After the last lights-out all are off, whoever was first.
      return last || zones.length === zoneCount
        ? word
        : `${zones.length === 1 ? zones[0] : zones.length} ${kind}`;
    }
  }
}

/** The labels that fit under a line so many pixels wide: the sunset and the last lights-out first. */
export function tickLabels(
  evening: Evening,
  line: EveningLine,
  zoneCount: number,
  width: number,
  locale: string,
): TickLabel[] {
  const last = line.ticks.findLast(({ kind }) => kind === 'off');
  const placed: { key: string; text: string; left: number; right: number }[] = [];
  const wishes = [...line.ticks].sort((a, b) => rank(a, a === last) - rank(b, b === last));
  for (const tick of wishes) {
    const text = `${wordOf(tick, zoneCount, tick === last)} ${clockText(tick.at, evening.timeZone, locale)}`;
    const own = text.length * LETTER;
    const middle = shareOf(line, tick.at) * width;
    const free = (left: number) =>
      placed.every((other) => left >= other.right + GAP || other.left >= left + own + GAP);
    // Under its tick, or else to one side with the tick over its edge.
    const left = [middle - own / 2, middle - own + EDGE, middle - EDGE]
      .map((wish) => Math.max(0, Math.min(width - own, wish)))
      .find(free);
    if (left === undefined) continue;
    placed.push({ key: `${tick.kind} ${tick.at.getTime()}`, text, left, right: left + own });
  }
  return placed.sort((a, b) => a.left - b.left).map(({ key, text, left }) => ({ key, text, left }));
}
