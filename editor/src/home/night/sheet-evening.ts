import type { EveningPlace, NightScene } from '@lampwright/geometry/light';
import {
  clockText,
  type Evening,
  eveningOf,
  eveningSpan,
  sunAltitude,
  switchingOf,
  timeInWords,
  todayAt,
} from '@lampwright/geometry/night';
import { type EveningZone, zonesOf } from './zones';

/** The thumb of the evening line rests on clock times that people say. */
export const STEP_MINUTES = 5;

const MINUTE_MS = 60_000;
/** The sun is 12° down: night to the eye. */
const DARK_DEGREES = -12;
const SUNSET_DEGREES = -0.833;

/** A time on the evening line. */
export interface TimeMark {
  readonly minute: number;
  readonly clock: string;
}

/** One sheet through one evening, in minutes from where its line begins. */
export interface SheetEvening {
  readonly scene: NightScene;
  /** How long the line is. */
  readonly minutes: number;
  /** Where it stands at first: dark, with as many lights on as ever are. */
  readonly begin: number;
  readonly sunset: TimeMark | null;
  /** When the last lights go off; null: none are on this evening. */
  readonly off: TimeMark | null;
  readonly day: string;
  /** What must be said of this evening; null: nothing. */
  readonly note: string | null;
  /** What is switched together, of the lights on this sheet. */
  readonly zones: readonly EveningZone[];
  readonly at: (minute: number) => Moment;
}

export interface Moment {
  readonly minute: number;
  readonly clock: string;
  readonly sunDegrees: number;
  readonly sky: 'day' | 'dusk' | 'dark';
  /** Zones whose lights are on. */
  readonly on: ReadonlySet<string>;
}

/** Of today at the property. `scenes` are those of all sheets: the line is the same on each of them. */
export function sheetEvening(
  scene: NightScene,
  scenes: readonly NightScene[],
  where: EveningPlace,
  now: Date,
  locale: string,
  /** Names of the groups that lights are offered in. */
  groups: ReadonlyMap<string, string>,
): SheetEvening {
  const evening = eveningOf(where, todayAt(where.timeZone, now));
  const span = eveningSpan(
    evening,
    scenes.flatMap(({ zones }) => zones.map(({ schedule }) => schedule)),
  );
  const stepMs = STEP_MINUTES * MINUTE_MS;
  const startMs = Math.floor(span.start.getTime() / stepMs) * stepMs;
  const minutes = Math.ceil((span.end.getTime() - startMs) / stepMs) * STEP_MINUTES;
  const minuteOf = (at: Date): number => (at.getTime() - startMs) / MINUTE_MS;
  const timeAt = (minute: number): Date => new Date(startMs + minute * MINUTE_MS);
  const clock = (at: Date): string => clockText(at, evening.timeZone, locale);

  const zones = zonesOf(scene, groups, (schedule) => {
    const switching = switchingOf(schedule, evening, locale);
    if (!switching.on) return { stretch: null, hours: switching.reason };
    const words = (time: typeof schedule.on, at: Date): string =>
      time.kind === 'clock' ? clock(at) : timeInWords(time);
    return {
      stretch: { on: minuteOf(switching.on), off: minuteOf(switching.off) },
      hours: `${words(schedule.on, switching.on)} to ${words(schedule.off, switching.off)}`,
    };
  });

  const at = (minute: number): Moment => {
    const when = timeAt(minute);
    const sunDegrees = sunAltitude(evening, when);
    const lit = zones.filter(({ stretch }) => stretch && stretch.on <= minute && minute < stretch.off);
    return {
      minute,
      clock: clock(when),
      sunDegrees,
      sky: sunDegrees > SUNSET_DEGREES ? 'day' : sunDegrees > DARK_DEGREES ? 'dusk' : 'dark',
      on: new Set(lit.map(({ id }) => id)),
    };
  };

  const lastOff = Math.max(...zones.map(({ stretch }) => stretch?.off ?? Number.NEGATIVE_INFINITY));
  return {
    scene,
    minutes,
    begin: beginOf(at, zones, minutes),
    sunset: evening.sunset && { minute: minuteOf(evening.sunset), clock: clock(evening.sunset) },
    off: Number.isFinite(lastOff) ? { minute: lastOff, clock: clock(timeAt(lastOff)) } : null,
    day: new Intl.DateTimeFormat(locale, {
      month: 'short',
      day: 'numeric',
      timeZone: evening.timeZone,
    }).format(timeAt(0)),
    note: noteOf(evening, clock),
    zones,
    at,
  };
}

/**
 * The middle of the first stretch in which most lights are on in the dark. On a bright summer night it is not
 * dark before lights-out: then the darkest moment with most of them on.
 */
function beginOf(at: (minute: number) => Moment, zones: readonly EveningZone[], minutes: number): number {
  const moments: Moment[] = [];
  for (let minute = 0; minute <= minutes; minute += STEP_MINUTES) moments.push(at(minute));
  const lights = ({ on }: Moment): number =>
    zones.reduce((sum, zone) => sum + (on.has(zone.id) ? zone.lights : 0), 0);
  const most = Math.max(...moments.map(lights));
  const lit = moments.filter((moment) => lights(moment) === most);
  const dark = lit.filter(({ sky }) => sky === 'dark');
  const [first] = dark;
  if (!first) return lit.reduce((best, one) => (one.sunDegrees < best.sunDegrees ? one : best)).minute;
  const gap = dark.findIndex((moment, i) => moment.minute !== first.minute + i * STEP_MINUTES);
  const stretch = gap < 0 ? dark : dark.slice(0, gap);
  return stretch[Math.floor((stretch.length - 1) / 2)]!.minute;
}

function noteOf({ assumed, sunset, note }: Evening, clock: (at: Date) => string): string | null {
  if (!assumed || !sunset) return note;
  return `Where the garden lies is not known here, so sunset is taken as ${clock(sunset)}.`;
}
