import { describe, expect, it } from 'vitest';
import { clockText, dayAfter, instantAt, knownZone, todayAt } from './clock.js';

const at = (year: number, month: number, day: number, clock: string, zone: string) => {
  const [hours, minutes] = clock.split(':').map(Number);
  return instantAt({ year, month, day }, hours! * 60 + minutes!, zone).toISOString();
};

// Changes of the clocks by the IANA time zone database: in the United States on 8 March and 1 November 2026 at
// 02:00, in the United Kingdom on 29 March at 01:00 and 25 October 2026 at 02:00, on Lord Howe Island by half an hour.
describe('a clock time as an instant', () => {
  it.each([
    ['in winter in New York', at(2026, 1, 15, '18:00', 'America/New_York'), '2026-01-15T23:00:00.000Z'],
    ['in summer in New York', at(2026, 7, 15, '18:00', 'America/New_York'), '2026-07-15T22:00:00.000Z'],
    ['before the clocks go forward', at(2026, 3, 8, '01:59', 'America/New_York'), '2026-03-08T06:59:00.000Z'],
    ['after they did', at(2026, 3, 8, '03:00', 'America/New_York'), '2026-03-08T07:00:00.000Z'],
    [
      'that clocks jump over, as much later',
      at(2026, 3, 8, '02:30', 'America/New_York'),
      '2026-03-08T07:30:00.000Z',
    ],
    [
      'that clocks show twice, the first time',
      at(2026, 11, 1, '01:30', 'America/New_York'),
      '2026-11-01T05:30:00.000Z',
    ],
    ['after the second', at(2026, 11, 1, '02:00', 'America/New_York'), '2026-11-01T07:00:00.000Z'],
    ['in London before the change', at(2026, 3, 28, '23:30', 'Europe/London'), '2026-03-28T23:30:00.000Z'],
    ['in London, jumped over', at(2026, 3, 29, '01:30', 'Europe/London'), '2026-03-29T01:30:00.000Z'],
    ['in London after it', at(2026, 3, 29, '23:30', 'Europe/London'), '2026-03-29T22:30:00.000Z'],
    ['in London, twice', at(2026, 10, 25, '01:30', 'Europe/London'), '2026-10-25T00:30:00.000Z'],
    ['at half an hour', at(2026, 7, 1, '20:15', 'Asia/Kolkata'), '2026-07-01T14:45:00.000Z'],
    ['at three quarters', at(2026, 7, 1, '00:00', 'Asia/Kathmandu'), '2026-06-30T18:15:00.000Z'],
    [
      'where clocks change by half an hour',
      at(2026, 10, 4, '02:15', 'Australia/Lord_Howe'),
      '2026-10-03T15:45:00.000Z',
    ],
  ])('%s', (_, instant, expected) => expect(instant).toBe(expected));

  it('is read back as it was given, wherever clocks show it at all', () => {
    for (const zone of ['America/New_York', 'Europe/London', 'Asia/Kolkata', 'Australia/Lord_Howe'])
      for (let day = 1; day <= 365; day += 1)
        for (const minutes of [0, 45, 245, 720, 1080, 1439]) {
          const instant = instantAt({ year: 2026, month: 1, day }, minutes, zone);
          const shown = new Date(Date.UTC(2026, 0, day));
          expect(todayAt(zone, instant)).toEqual({
            year: shown.getUTCFullYear(),
            month: shown.getUTCMonth() + 1,
            day: shown.getUTCDate(),
          });
          const clock = `${String(Math.floor(minutes / 60)).padStart(2, '0')}:${String(minutes % 60).padStart(2, '0')}`;
          expect(clockText(instant, zone, 'en-GB')).toBe(clock);
        }
  });
});

describe('days', () => {
  it('are those of the place, not of the machine', () => {
    const now = new Date('2026-03-01T02:00:00Z');
    expect(todayAt('America/New_York', now)).toEqual({ year: 2026, month: 2, day: 28 });
    expect(todayAt('Asia/Kolkata', now)).toEqual({ year: 2026, month: 3, day: 1 });
  });

  it('follow each other over months, years and leap days', () => {
    expect(dayAfter({ year: 2026, month: 12, day: 31 })).toEqual({ year: 2027, month: 1, day: 1 });
    expect(dayAfter({ year: 2028, month: 2, day: 28 })).toEqual({ year: 2028, month: 2, day: 29 });
  });
});

it('writes a time as people of the locale do', () => {
  const at = new Date('2026-07-02T02:30:00Z');
  expect(clockText(at, 'America/New_York', 'en-US').replace(/\s/, ' ')).toBe('10:30 PM');
  expect(clockText(at, 'America/New_York', 'de')).toBe('22:30');
});

it("falls back on the machine's zone where a name is unknown", () => {
  const own = new Intl.DateTimeFormat().resolvedOptions().timeZone;
  expect(knownZone('Nowhere/Marlow_Bend')).toBe(own);
  expect(knownZone('Asia/Kolkata')).toBe('Asia/Kolkata');
});
