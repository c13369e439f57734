import { describe, expect, it } from 'vitest';
import type { Schedule, SwitchTime } from '../plan/index.js';
import { seeded } from '../sheet/yard.testkit.js';
import { instantAt, todayAt } from './clock.js';
import {
  eveningOf,
  eveningSpan,
  isOn,
  scheduleInWords,
  sunAltitude,
  switchedOn,
  switchingOf,
} from './evening.js';

const MINUTE = 60_000;
const london = { place: { latitude: 51.5, longitude: -0.13 }, timeZone: 'Europe/London' };
const marlowBend = { place: { latitude: 40.2, longitude: -75 }, timeZone: 'America/New_York' };
const tromso = { place: { latitude: 69.65, longitude: 18.96 }, timeZone: 'Europe/Oslo' };
const nowhere = { place: null, timeZone: 'America/New_York' };

const minutesApart = (a: Date | null, b: Date | string) =>
  Math.abs(a!.getTime() - new Date(b).getTime()) / MINUTE;

const clock = (at: string): SwitchTime => ({ kind: 'clock', at });
const sunset = (minutesAfter = 0): SwitchTime => ({ kind: 'sunset', minutesAfter });
const sunrise = (minutesAfter = 0): SwitchTime => ({ kind: 'sunrise', minutesAfter });
const from = (on: SwitchTime, off: SwitchTime): Schedule => ({ on, off });

describe('sunset and dusk', () => {
  it("are those of a public astronomy library's tests: London, 1 December 2015", () => {
    const evening = eveningOf(london, { year: 2015, month: 12, day: 1 });
    expect(minutesApart(evening.sunset, '2015-12-01T15:55:00Z')).toBeLessThan(2);
    expect(minutesApart(evening.civilDusk, '2015-12-01T16:34:00Z')).toBeLessThan(2);
    expect(evening.note).toBeNull();
  });

  /**
   * The equations of the Solar Calculator of the NOAA Global Monitoring Laboratory (after Meeus, Astronomical
   * Algorithms), by the equation of time rather than sidereal time: the instant at which the sun's middle is at
   * `zenith` degrees before (−1) or after (1) the solar noon of a UTC day at that longitude.
   */
  function noaaEvent(dayUtc: number, place: typeof london.place, zenith: number, side: 1 | -1) {
    const rad = Math.PI / 180;
    const sin = (degrees: number) => Math.sin(degrees * rad);
    const cos = (degrees: number) => Math.cos(degrees * rad);
    const tan = (degrees: number) => Math.tan(degrees * rad);
    let minutes = 720 - 4 * place.longitude;
    for (let i = 0; i < 4; i += 1) {
      const julianDay = (dayUtc + minutes * MINUTE) / 86_400_000 + 2_440_587.5;
      const t = (julianDay - 2_451_545) / 36_525;
      const meanLongitude = 280.46646 + t * (36_000.76983 + t * 0.0003032);
      const anomaly = 357.52911 + t * (35_999.05029 - 0.0001537 * t);
      const eccentricity = 0.016708634 - t * (0.000042037 + 0.0000001267 * t);
      const center =
        sin(anomaly) * (1.914602 - t * (0.004817 + 0.000014 * t)) +
        sin(2 * anomaly) * (0.019993 - 0.000101 * t) +
        sin(3 * anomaly) * 0.000289;
      const node = 125.04 - 1934.136 * t;
      const longitude = meanLongitude + center - 0.00569 - 0.00478 * sin(node);
      const obliquity =
        23 + (26 + (21.448 - t * (46.815 + t * (0.00059 - t * 0.001813))) / 60) / 60 + 0.00256 * cos(node);
      const declination = Math.asin(sin(obliquity) * sin(longitude)) / rad;
      const y = tan(obliquity / 2) ** 2;
      const equationOfTime =
        (4 / rad) *
        (y * sin(2 * meanLongitude) -
          2 * eccentricity * sin(anomaly) +
          4 * eccentricity * y * sin(anomaly) * cos(2 * meanLongitude) -
          0.5 * y ** 2 * sin(4 * meanLongitude) -
          1.25 * eccentricity ** 2 * sin(2 * anomaly));
      const hourAngle =
        Math.acos(
          cos(zenith) / (cos(place.latitude) * cos(declination)) - tan(place.latitude) * tan(declination),
        ) / rad;
      minutes = 720 - 4 * place.longitude - equationOfTime + side * 4 * hourAngle;
    }
    return new Date(dayUtc + minutes * MINUTE);
  }

  it("agree within half a minute with NOAA's equations on every day of a year, 20 places (seed 501)", () => {
    const random = seeded(501);
    let worst = 0;
    for (let i = 0; i < 20; i += 1) {
      // Clocks on the hour by longitude, so that a day of the calendar is the sun's day.
      const longitude = Math.round(random() * 340 - 170);
      const hours = Math.round(longitude / 15);
      // Zones of the Etc area are named by what is added to reach UTC.
      const timeZone = hours === 0 ? 'Etc/UTC' : `Etc/GMT${hours > 0 ? '-' : '+'}${Math.abs(hours)}`;
      const place = { latitude: random() * 110 - 55, longitude };
      const year = 2024 + Math.floor(random() * 8);
      for (let day = 1; day <= 365; day += 1) {
        const evening = eveningOf({ place, timeZone }, { year, month: 1, day });
        const pairs = [
          [evening.sunset, noaaEvent(Date.UTC(year, 0, day), place, 90.833, 1)],
          [evening.sunrise, noaaEvent(Date.UTC(year, 0, day + 1), place, 90.833, -1)],
          [evening.civilDusk, noaaEvent(Date.UTC(year, 0, day), place, 96, 1)],
        ] as const;
        for (const [ours, theirs] of pairs) worst = Math.max(worst, minutesApart(ours, theirs));
      }
    }
    console.info(`worst difference from NOAA's equations: ${worst.toFixed(2)} minutes`);
    expect(worst).toBeLessThan(0.5);
  });

  it('are of the evening of that day on the calendar, all around the world', () => {
    for (const [timeZone, latitude, longitude] of [
      ['Pacific/Kiritimati', 1.9, -157.4],
      ['Pacific/Auckland', -36.8, 174.8],
      ['Asia/Urumqi', 43.8, 87.6],
      ['Asia/Shanghai', 39.5, 76],
      ['Asia/Kolkata', 22.6, 88.4],
      ['Pacific/Honolulu', 21.3, -157.9],
    ] as const) {
      const date = { year: 2026, month: 4, day: 2 };
      const evening = eveningOf({ place: { latitude, longitude }, timeZone }, date);
      expect(todayAt(timeZone, evening.sunset!)).toEqual(date);
      expect(todayAt(timeZone, evening.sunrise!)).toEqual({ ...date, day: 3 });
      const hours = (evening.sunrise!.getTime() - evening.sunset!.getTime()) / 60 / MINUTE;
      expect(hours).toBeGreaterThan(11);
      expect(hours).toBeLessThan(13);
    }
  });

  it('have the sun at their altitude', () => {
    for (const where of [london, marlowBend, nowhere]) {
      const evening = eveningOf(where, { year: 2026, month: 5, day: 14 });
      expect(sunAltitude(evening, evening.sunset!)).toBeCloseTo(-0.833, 1);
      expect(sunAltitude(evening, evening.civilDusk!)).toBeCloseTo(-6, 1);
      expect(sunAltitude(evening, evening.nauticalDusk!)).toBeCloseTo(-12, 1);
      expect(sunAltitude(evening, evening.sunrise!)).toBeCloseTo(-0.833, 1);
    }
  });

  it('are assumed where no place is known, and said to be', () => {
    const evening = eveningOf(nowhere, { year: 2026, month: 7, day: 4 });
    expect(evening.assumed).toBe(true);
    expect(evening.note).toContain('18:00');
    expect(evening.sunset).toEqual(new Date('2026-07-04T22:00:00Z'));
    expect(evening.sunrise).toEqual(new Date('2026-07-05T10:00:00Z'));
    expect(evening.civilDusk!.getTime()).toBeGreaterThan(evening.sunset!.getTime());
  });

  it('are missing in polar summer and winter, and said to be', () => {
    const summer = eveningOf(tromso, { year: 2026, month: 6, day: 21 });
    expect([summer.sunset, summer.sunrise, summer.civilDusk, summer.nauticalDusk]).toEqual([
      null,
      null,
      null,
      null,
    ]);
    expect(summer.note).toBe('The sun does not set here on this day.');
    const winter = eveningOf(tromso, { year: 2026, month: 12, day: 21 });
    expect(winter.sunset).toBeNull();
    expect(winter.note).toBe('The sun does not rise here on this day.');
    expect(winter.civilDusk).not.toBeNull();
    // The summer solstice in London has nautical dusk, but further north the sky stays light.
    const shetland = { place: { latitude: 60.2, longitude: -1.2 }, timeZone: 'Europe/London' };
    const white = eveningOf(shetland, { year: 2026, month: 6, day: 21 });
    expect(white.sunset).not.toBeNull();
    expect(white.nauticalDusk).toBeNull();
    expect(white.note).toBeNull();
  });
});

describe('a schedule', () => {
  const date = { year: 2026, month: 12, day: 1 };
  const evening = eveningOf(marlowBend, date);
  const at = (day: number, minutes: number) => instantAt({ ...date, day }, minutes, marlowBend.timeZone);

  it('runs from sunset to a clock time', () => {
    expect(switchedOn(from(sunset(), clock('23:00')), evening)).toEqual({
      on: evening.sunset,
      off: at(1, 23 * 60),
    });
  });

  it('crosses midnight', () => {
    expect(switchedOn(from(clock('22:15'), clock('01:30')), evening)).toEqual({
      on: at(1, 22 * 60 + 15),
      off: at(2, 90),
    });
  });

  it('counts from the sun before and after', () => {
    expect(switchedOn(from(sunset(-20), sunrise(45)), evening)).toEqual({
      on: new Date(evening.sunset!.getTime() - 20 * MINUTE),
      off: new Date(evening.sunrise!.getTime() + 45 * MINUTE),
    });
  });

  it('comes on again early where it is one of the morning', () => {
    const morning = switchedOn(from(clock('05:30'), sunrise()), evening);
    expect(morning).toEqual({ on: at(2, 330), off: evening.sunrise });
  });

  it('is an hour longer on the night when clocks are set back', () => {
    const hours = (day: number) => {
      const night = eveningOf(marlowBend, { year: 2026, month: 10, day });
      const { on, off } = switchedOn(from(clock('20:00'), clock('06:00')), night)!;
      return (off.getTime() - on.getTime()) / 60 / MINUTE;
    };
    expect(hours(30)).toBe(10);
    expect(hours(31)).toBe(11);
  });

  it('stays off where it would end before it begins, and says so', () => {
    const backwards = from(sunset(), clock('16:00'));
    expect(switchedOn(backwards, evening)).toBeNull();
    expect(isOn(backwards, evening, new Date(evening.sunset!.getTime() + MINUTE))).toBe(false);
    expect(switchingOf(backwards, evening, 'en-GB')).toEqual({
      on: null,
      off: null,
      reason: 'Off at 16:00 comes before on at 16:34: the lights stay off this night.',
    });
    expect(switchedOn(from(clock('21:00'), clock('21:00')), evening)).toBeNull();
  });

  it('stays off where the sun it waits for does not set, and says so', () => {
    const summer = eveningOf(tromso, { year: 2026, month: 6, day: 21 });
    expect(switchingOf(from(sunset(), clock('23:00')), summer, 'en')).toMatchObject({
      on: null,
      reason: 'There is no sunset this night to switch the lights on by.',
    });
    expect(switchingOf(from(clock('22:00'), sunrise()), summer, 'en')).toMatchObject({
      on: null,
      reason: 'There is no sunrise this night to switch the lights off by.',
    });
    expect(switchedOn(from(clock('22:00'), clock('23:00')), summer)).not.toBeNull();
  });

  it('is on from its first instant until, not at, its last', () => {
    const schedule = from(clock('20:00'), clock('23:00'));
    const on = at(1, 20 * 60).getTime();
    const off = at(1, 23 * 60).getTime();
    expect([on - 1, on, off - 1, off].map((time) => isOn(schedule, evening, new Date(time)))).toEqual([
      false,
      true,
      true,
      false,
    ]);
  });

  it.each([
    [from(sunset(), clock('23:00')), 'From sunset until 23:00'],
    [from(sunset(30), sunrise(-60)), 'From 30 minutes after sunset until 1 hour before sunrise'],
    [from(sunset(-1), sunrise(135)), 'From 1 minute before sunset until 2 hours 15 minutes after sunrise'],
  ])('is told in words: %#', (schedule, words) => expect(scheduleInWords(schedule)).toBe(words));
});

describe('the span of an evening', () => {
  const evening = eveningOf(marlowBend, { year: 2026, month: 9, day: 10 });

  it('goes from half an hour before sunset to a little after the last lights-out', () => {
    const { start, end } = eveningSpan(evening, [
      from(sunset(), clock('22:00')),
      from(sunset(30), clock('00:30')),
    ]);
    expect(minutesApart(start, evening.sunset!)).toBe(30);
    expect(end).toEqual(instantAt({ year: 2026, month: 9, day: 11 }, 45, 'America/New_York'));
  });

  it('begins before lights that come on earlier', () => {
    const early = from(sunset(-60), clock('22:00'));
    expect(minutesApart(eveningSpan(evening, [early]).start, evening.sunset!)).toBe(70);
  });

  it('reaches night without any lights', () => {
    const { start, end } = eveningSpan(evening, []);
    expect(minutesApart(start, evening.sunset!)).toBe(30);
    expect(end).toEqual(evening.nauticalDusk);
  });

  it('is a stretch of time where the sun neither sets nor rises', () => {
    for (const month of [6, 12]) {
      const polar = eveningOf(tromso, { year: 2026, month, day: 21 });
      const { start, end } = eveningSpan(polar, [from(sunset(), clock('23:00'))]);
      expect(end.getTime()).toBeGreaterThan(start.getTime());
    }
  });
});
