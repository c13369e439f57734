import type { ControlZone } from '@lampwright/geometry/light';
import { type Evening, eveningSpan, isOn, sunAltitude, switchedOn } from '@lampwright/geometry/night';
import { mix } from '../../../plan-view/palette';

/** How a zone is looked at: switched on or off whatever its schedule says. A zone that is not named follows it. */
export type ZoneLooks = ReadonlyMap<string, 'on' | 'off'>;

const MINUTE = 60_000;
/** The line begins and ends at full steps of this. */
const STEP_MINUTES = 5;

/** How light it is, in a word. */
export type Phase = 'daylight' | 'dusk' | 'dark';

/** The sun's edge on the horizon, with usual refraction, and nautical dusk. */
const SET_DEGREES = -0.833;
const DARK_DEGREES = -12;

/** Something that happens on the evening line. */
export interface Tick {
  readonly at: Date;
  readonly kind: 'sunset' | 'on' | 'off';
  /** The zones that it is of; none for the sunset. */
  readonly zones: readonly string[];
}

/** Zones that are on at the same times, as one bar under the line. */
export interface Lane {
  readonly on: Date;
  readonly off: Date;
  readonly zones: readonly string[];
}

/** The evening as a line: from before sunset to after lights-out. */
export interface EveningLine {
  readonly start: Date;
  readonly end: Date;
  readonly minutes: number;
  readonly ticks: readonly Tick[];
  readonly lanes: readonly Lane[];
  /** Where a person begins to look: dark, with lights on. */
  readonly first: Date;
}

export function eveningLineOf(evening: Evening, zones: readonly ControlZone[]): EveningLine {
  const span = eveningSpan(
    evening,
    zones.map(({ schedule }) => schedule),
  );
  const step = STEP_MINUTES * MINUTE;
  const start = new Date(Math.floor(span.start.getTime() / step) * step);
  const end = new Date(Math.ceil(span.end.getTime() / step) * step);
  const lanes = lanesOf(evening, zones);
  return {
    start,
    end,
    minutes: Math.round((end.getTime() - start.getTime()) / MINUTE),
    ticks: ticksOf(evening, lanes),
    lanes,
    first: firstMoment(evening, lanes, start, end),
  };
}

function lanesOf(evening: Evening, zones: readonly ControlZone[]): Lane[] {
  const lanes = new Map<string, Lane & { zones: string[] }>();
  for (const { name, schedule } of zones) {
    const stretch = switchedOn(schedule, evening);
    if (stretch === null) continue;
    const key = `${stretch.on.getTime()} ${stretch.off.getTime()}`;
    const lane = lanes.get(key);
    if (lane === undefined) lanes.set(key, { ...stretch, zones: [name] });
    else lane.zones.push(name);
  }
  return [...lanes.values()].sort(
    (a, b) => a.on.getTime() - b.on.getTime() || a.off.getTime() - b.off.getTime(),
  );
}

function ticksOf({ sunset }: Evening, lanes: readonly Lane[]): Tick[] {
  const ticks: Tick[] = sunset === null ? [] : [{ at: sunset, kind: 'sunset', zones: [] }];
  for (const kind of ['on', 'off'] as const) {
    const byTime = new Map<number, string[]>();
    for (const lane of lanes) {
      const at = lane[kind].getTime();
      byTime.set(at, [...(byTime.get(at) ?? []), ...lane.zones]);
    }
    for (const [at, zones] of byTime) ticks.push({ at: new Date(at), kind, zones });
  }
  return ticks.sort((a, b) => a.at.getTime() - b.at.getTime());
}

/** Half an hour into the dark, if lights are on then; else the middle of the first stretch of light. */
function firstMoment(
  { sunset, nauticalDusk }: Evening,
  lanes: readonly Lane[],
  start: Date,
  end: Date,
): Date {
  const dark = (nauticalDusk ?? sunset ?? start).getTime() + 30 * MINUTE;
  const lit = lanes.some(({ on, off }) => on.getTime() <= dark && dark < off.getTime());
  const lane = lanes[0];
  const at = lit || lane === undefined ? dark : (lane.on.getTime() + lane.off.getTime()) / 2;
  return new Date(Math.min(Math.max(Math.round(at / MINUTE) * MINUTE, start.getTime()), end.getTime()));
}

export function phaseAt(evening: Evening, at: Date): Phase {
  const altitude = sunAltitude(evening, at);
  return altitude > SET_DEGREES ? 'daylight' : altitude > DARK_DEGREES ? 'dusk' : 'dark';
}

/** The zones that are on at a moment, or switched on for looking. */
export function zonesOn(
  evening: Evening,
  zones: readonly ControlZone[],
  at: Date,
  looks: ZoneLooks,
): ReadonlySet<string> {
  const on = zones.filter(({ id, schedule }) => {
    const look = looks.get(id);
    return look === undefined ? isOn(schedule, evening, at) : look === 'on';
  });
  return new Set(on.map(({ id }) => id));
}

const DAY = '#CFDCE6';
const SETTING = '#E9C9A0';
const AFTERGLOW = '#6F7F9C';
const NIGHT = '#1B2638';
/** The sky's colour by the sun's altitude, in degrees. */
const SKY: readonly (readonly [number, string])[] = [
  [8, DAY],
  [0, SETTING],
  [-5, AFTERGLOW],
  [-12, '#2B3A55'],
  [-18, NIGHT],
];

export function skyColour(altitude: number): string {
  const [highest] = SKY[0]!;
  if (altitude >= highest) return DAY;
  for (const [i, [low, colour]] of SKY.entries()) {
    if (i === 0 || altitude < low) continue;
    const [high, above] = SKY[i - 1]!;
    return mix(colour, above, (altitude - low) / (high - low));
  }
  return NIGHT;
}

const SHADES = 24;

/** The line's ground as a CSS gradient: the sky's colours along it. */
export function skyGradient(evening: Evening, { start, minutes }: EveningLine): string {
  const stops = Array.from({ length: SHADES + 1 }, (_, i) => {
    const at = new Date(start.getTime() + (minutes * MINUTE * i) / SHADES);
    return `${skyColour(sunAltitude(evening, at))} ${((i / SHADES) * 100).toFixed(1)}%`;
  });
  return `linear-gradient(to right, ${stops.join(', ')})`;
}

export const minutesInto = ({ start }: EveningLine, at: Date): number =>
  Math.round((at.getTime() - start.getTime()) / MINUTE);

export const atMinutes = ({ start }: EveningLine, minutes: number): Date =>
  new Date(start.getTime() + minutes * MINUTE);

/** Share of the line at which a moment lies, 0 to 1. */
export function shareOf({ start, minutes }: EveningLine, at: Date): number {
  return Math.min(1, Math.max(0, (at.getTime() - start.getTime()) / (minutes * MINUTE)));
}
