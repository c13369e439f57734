import { describe, expect, it } from 'vitest';
import { count, formatAgo, formatDay } from './format';

const now = Date.parse('2026-12-01T14:02:00Z');
const before = (ms: number) => new Date(now - ms).toISOString();
const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

describe('formatAgo', () => {
  it.each([
    [20_000, 'just now'],
    [MINUTE, '1 minute ago'],
    [59 * MINUTE, '59 minutes ago'],
    [HOUR, '1 hour ago'],
    [23 * HOUR, '23 hours ago'],
    [DAY, 'yesterday'],
    [6 * DAY, '6 days ago'],
    // A clock that is a little ahead of the server's.
    [-5_000, 'just now'],
  ])('%i ms ago: %s', (ms, words) => {
    expect(formatAgo(before(ms), now, 'en-US')).toBe(words);
  });

  it('gives the date of what is older than a week', () => {
    expect(formatAgo('2026-11-12T12:00:00Z', now, 'en-US')).toBe('Nov 12, 2026');
  });
});

it('reads a bare date as that day, whatever the time zone', () => {
  expect(formatDay('2026-05-31', 'en-GB')).toBe('31 May 2026');
  expect(formatDay('2026-01-01', 'en-GB')).toBe('1 Jan 2026');
});

it('counts in words', () => {
  expect(count(0, 'fault')).toBe('0 faults');
  expect(count(1, 'fault')).toBe('1 fault');
  expect(count(2, 'way', 'ways')).toBe('2 ways');
});
