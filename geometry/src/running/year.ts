import type { EveningPlace } from '../light/index.js';
import { type CalendarDate, dayAfter, eveningOf, switchedOn } from '../night/index.js';
import type { Schedule } from '../plan/index.js';

const HOUR_MS = 3_600_000;

/** How long lights on one schedule are on in the nights of one month. */
export interface MonthOfLight {
  /** From 1. */
  readonly month: number;
  /** Nights that begin in the month. */
  readonly nights: number;
  readonly hours: number;
  /** On and off of the night that begins on the fifteenth; null where the lights stay off then. */
  readonly middle: { readonly on: Date; readonly off: Date } | null;
}

/** Twelve months of nights at a place, each counted to the month in which it begins. */
export function yearOfLight(schedule: Schedule, where: EveningPlace, year: number): MonthOfLight[] {
  const months = Array.from({ length: 12 }, (_, i) => ({
    month: i + 1,
    nights: 0,
    hours: 0,
    middle: null as MonthOfLight['middle'],
  }));
  for (let date: CalendarDate = { year, month: 1, day: 1 }; date.year === year; date = dayAfter(date)) {
    const stretch = switchedOn(schedule, eveningOf(where, date));
    const month = months[date.month - 1]!;
    month.nights += 1;
    if (date.day === 15) month.middle = stretch;
    if (stretch) month.hours += (stretch.off.getTime() - stretch.on.getTime()) / HOUR_MS;
  }
  return months;
}

export const hoursOf = (months: readonly MonthOfLight[]): number =>
  months.reduce((sum, { hours }) => sum + hours, 0);

/** Kilowatt-hours of a load of so many watts at the outlet, transformer and cable losses in it. */
export const kilowattHours = (watts: number, hours: number): number => (watts * hours) / 1000;

/** Minor units, whole, for so many kilowatt-hours; the tariff may have fractions of a minor unit. */
export const energyCostMinor = (kwh: number, minorPerKwh: number): number => Math.round(kwh * minorPerKwh);
