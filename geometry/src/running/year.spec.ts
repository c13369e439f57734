import { describe, expect, it } from 'vitest';
import type { EveningPlace } from '../light/index.js';
import {
  changesPerYear,
  energyCostMinor,
  filamentLifeHours,
  hoursOf,
  kilowattHours,
  yearOfLight,
} from './index.js';

const at = (latitude: number, longitude: number, timeZone: string): EveningPlace => ({
  place: { latitude, longitude },
  timeZone,
});
const night = { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'sunrise', minutesAfter: 0 } } as const;

describe('a year of light', () => {
  it('has about 4306 hours from sunset to sunrise at 40° N (computed value, sun’s upper edge)', () => {
    const hours = hoursOf(yearOfLight(night, at(40, -75, 'America/New_York'), 2026));
    expect(hours).toBeGreaterThan(4306 - 10);
    expect(hours).toBeLessThan(4306 + 10);
  });

  it('counts every night once, the longest in December', () => {
    const months = yearOfLight(night, at(51.5, -0.12, 'Europe/London'), 2024);
    expect(months.reduce((sum, { nights }) => sum + nights, 0)).toBe(366);
    const perNight = months.map(({ hours, nights }) => hours / nights);
    expect(perNight.indexOf(Math.max(...perNight))).toBe(11);
    expect(perNight.indexOf(Math.min(...perNight))).toBe(5);
  });

  it('follows the clock through the change to summer time', () => {
    const clock = { on: { kind: 'clock', at: '20:00' }, off: { kind: 'clock', at: '23:00' } } as const;
    const months = yearOfLight(clock, at(40, -75, 'America/New_York'), 2026);
    expect(hoursOf(months)).toBeCloseTo(3 * 365, 6);
  });

  it('is dark where the sun does not set', () => {
    const june = yearOfLight(night, at(69.6, 18.9, 'Europe/Oslo'), 2026)[5]!;
    expect(june).toMatchObject({ month: 6, hours: 0, middle: null });
  });
});

describe('what running costs', () => {
  // Theraja, Electrical Technology III, example 49.5: two 80 W lamps with 25 % in their gear, 2500 h, 0.30 a unit.
  it('is 500 kWh and 150 for 2 × 80 W and 25 % gear over 2500 h at 0.30', () => {
    const kwh = kilowattHours(2 * 80 * 1.25, 2500);
    expect(kwh).toBeCloseTo(500, 9);
    expect(energyCostMinor(kwh, 30)).toBe(15_000);
  });

  it('counts lamp changes by life, which more volts shorten and fewer don’t lengthen', () => {
    expect(filamentLifeHours(2000, 12, 12)).toBe(2000);
    expect(filamentLifeHours(2000, 13.2, 12)).toBeCloseTo(2000 / 1.1 ** 13, 6);
    expect(filamentLifeHours(2000, 10.8, 12)).toBe(2000);
    expect(changesPerYear(5, 2000, 1000)).toBeCloseTo(2.5, 9);
  });
});
