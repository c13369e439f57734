import { getPosition, getTimes } from 'suncalc';
import type { EveningPlace } from '../light/index.js';
import type { Schedule, SwitchTime } from '../plan/index.js';
import { type CalendarDate, clockText, dayAfter, instantAt, knownZone, minutesOf } from './clock.js';

/** One evening at a place and the night after it, until noon. */
export interface Evening {
  date: CalendarDate;
  place: EveningPlace['place'];
  /** The place's, or this machine's own where it doesn't know that one. */
  timeZone: string;
  /** Null where the sun does not set that day. */
  sunset: Date | null;
  /** Of the next morning; null where the sun does not rise then. */
  sunrise: Date | null;
  /** The sun is 6° down: lights begin to show; null where it does not get as low. */
  civilDusk: Date | null;
  /** 12° down: night to the eye; null where it does not get as low. */
  nauticalDusk: Date | null;
  /** The place is not known: the sun is taken to set at 18:00. */
  assumed: boolean;
  /** What must be said of this evening: that its sunset is assumed, or that there is none. */
  note: string | null;
}

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const NOON = 12 * 60;
const radians = Math.PI / 180;

/** How far the middle of the sun is down as its edge sets, with usual refraction. */
const SUNSET_DEGREES = 0.833;
/** The refraction that suncalc adds to every altitude below the horizon. */
const HORIZON_REFRACTION_DEGREES = 0.4839;

/** Where no place is known: a day of spring or autumn at this latitude, with the sun due south at noon. */
const ASSUMED_LATITUDE = 40;
const ASSUMED_SUNSET = 18 * 60;

/** Its altitude so many hours after its noon, set lower so that it sets at 18:00. */
function assumedAltitude(hoursAfterNoon: number): number {
  const up = Math.cos(ASSUMED_LATITUDE * radians) * Math.cos(hoursAfterNoon * 15 * radians);
  return Math.asin(up) / radians - SUNSET_DEGREES;
}

function assumedDusk(degreesDown: number): number {
  const up = Math.sin((SUNSET_DEGREES - degreesDown) * radians) / Math.cos(ASSUMED_LATITUDE * radians);
  return Math.acos(up) / radians / 15;
}

/** The evening of that day at a place: `date` is as calendars there show it. */
export function eveningOf(where: EveningPlace, date: CalendarDate): Evening {
  const timeZone = knownZone(where.timeZone);
  const noon = instantAt(date, NOON, timeZone);
  const { place } = where;
  if (!place) {
    const sunset = instantAt(date, ASSUMED_SUNSET, timeZone);
    const hoursAfterNoon = (hours: number) => new Date(sunset.getTime() + (hours - 6) * HOUR);
    return {
      date,
      place,
      timeZone,
      sunset,
      sunrise: hoursAfterNoon(18),
      civilDusk: hoursAfterNoon(assumedDusk(6)),
      nauticalDusk: hoursAfterNoon(assumedDusk(12)),
      assumed: true,
      note: 'Where the property lies is not known: sunset is taken as 18:00.',
    };
  }
  const { latitude, longitude } = place;
  // suncalc takes the noon of the sun that is nearest to the instant: no clock is half a day off.
  const today = getTimes(noon, latitude, longitude);
  const tomorrow = getTimes(instantAt(dayAfter(date), NOON, timeZone), latitude, longitude);
  return {
    date,
    place,
    timeZone,
    sunset: today.sunset,
    sunrise: tomorrow.sunrise,
    civilDusk: today.dusk,
    nauticalDusk: today.nauticalDusk,
    assumed: false,
    note: today.alwaysUp
      ? 'The sun does not set here on this day.'
      : today.alwaysDown
        ? 'The sun does not rise here on this day.'
        : null,
  };
}

/** Degrees of the middle of the sun above the horizon, as the geometry has it: −0.8 at sunset, −6 at civil dusk. */
export function sunAltitude(evening: Evening, at: Date): number {
  const { place, sunset } = evening;
  if (place) {
    // Refraction is less where the sun is up: there this is up to half a degree low, which no picture shows.
    return getPosition(at, place.latitude, place.longitude).altitude - HORIZON_REFRACTION_DEGREES;
  }
  return assumedAltitude(6 + (at.getTime() - sunset!.getTime()) / HOUR);
}

const after = (sun: Date | null, minutes: number) => sun && new Date(sun.getTime() + minutes * MINUTE);

function timeOf(time: SwitchTime, evening: Evening): Date | null {
  switch (time.kind) {
    case 'sunset':
      return after(evening.sunset, time.minutesAfter);
    case 'sunrise':
      return after(evening.sunrise, time.minutesAfter);
    case 'clock': {
      const minutes = minutesOf(time.at);
      const day = minutes >= NOON ? evening.date : dayAfter(evening.date);
      return instantAt(day, minutes, evening.timeZone);
    }
  }
}

/** When lights on this schedule are on in this evening and the night after it, or why they are not. */
export type Switching = { on: Date; off: Date } | { on: null; off: null; reason: string };

/**
 * A clock time from noon on is of the evening, an earlier one of the next morning, so a stretch may cross
 * midnight. One that would end before it begins is not lit at all.
 */
export function switchingOf(schedule: Schedule, evening: Evening, locale: string): Switching {
  const on = timeOf(schedule.on, evening);
  const off = timeOf(schedule.off, evening);
  const never = (reason: string): Switching => ({ on: null, off: null, reason });
  if (!on || !off) {
    const missing = (on ? schedule.off : schedule.on).kind;
    return never(`There is no ${missing} this night to switch the lights ${on ? 'off' : 'on'} by.`);
  }
  if (on >= off) {
    const text = (at: Date) => clockText(at, evening.timeZone, locale);
    return never(`Off at ${text(off)} comes before on at ${text(on)}: the lights stay off this night.`);
  }
  return { on, off };
}

/** As `switchingOf`, for where the reason is not told; null: not on this night. */
export function switchedOn(schedule: Schedule, evening: Evening): { on: Date; off: Date } | null {
  const switching = switchingOf(schedule, evening, 'en');
  return switching.on ? switching : null;
}

export function isOn(schedule: Schedule, evening: Evening, at: Date): boolean {
  const stretch = switchedOn(schedule, evening);
  return stretch !== null && stretch.on <= at && at < stretch.off;
}

const BEFORE_SUNSET = 30 * MINUTE;
const BEFORE_FIRST_ON = 10 * MINUTE;
const AFTER_LAST_OFF = 15 * MINUTE;

/**
 * The stretch of time that is worth looking at: from half an hour before sunset (or just before lights that
 * come on earlier) to night and a quarter of an hour after the last lights-out.
 */
export function eveningSpan(evening: Evening, schedules: readonly Schedule[]): { start: Date; end: Date } {
  const stretches = schedules.flatMap((schedule) => switchedOn(schedule, evening) ?? []);
  const { date, timeZone, sunset, civilDusk, nauticalDusk } = evening;
  const dusk = sunset ?? civilDusk ?? instantAt(date, ASSUMED_SUNSET, timeZone);
  const night = nauticalDusk ?? new Date(dusk.getTime() + HOUR);
  return {
    start: new Date(
      Math.min(dusk.getTime() - BEFORE_SUNSET, ...stretches.map(({ on }) => on.getTime() - BEFORE_FIRST_ON)),
    ),
    end: new Date(Math.max(night.getTime(), ...stretches.map(({ off }) => off.getTime() + AFTER_LAST_OFF))),
  };
}

function lengthInWords(minutes: number): string {
  const hours = Math.floor(minutes / 60);
  const rest = minutes % 60;
  const parts = [
    hours > 0 && `${hours} ${hours === 1 ? 'hour' : 'hours'}`,
    rest > 0 && `${rest} ${rest === 1 ? 'minute' : 'minutes'}`,
  ];
  return parts.filter(Boolean).join(' ');
}

/** "sunset", "30 minutes before sunrise", "23:00". */
export function timeInWords(time: SwitchTime): string {
  if (time.kind === 'clock') return time.at;
  if (time.minutesAfter === 0) return time.kind;
  const side = time.minutesAfter > 0 ? 'after' : 'before';
  return `${lengthInWords(Math.abs(time.minutesAfter))} ${side} ${time.kind}`;
}

/** "From sunset until 23:00". */
export function scheduleInWords({ on, off }: Schedule): string {
  return `From ${timeInWords(on)} until ${timeInWords(off)}`;
}
