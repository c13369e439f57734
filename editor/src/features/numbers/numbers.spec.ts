import { describe, expect, it } from 'vitest';
import type { Numbers } from './api';
import { daysWord, figuresOf, isEmpty } from './figures';
import { periodOf, readPeriod, writePeriod } from './period';

const today = new Date(2026, 1, 14, 9);

describe('the period', () => {
  it('goes from the first day to today', () => {
    expect(periodOf('month', today)).toEqual({ from: '2026-02-01', to: '2026-02-14' });
    expect(periodOf('quarter', today)).toEqual({ from: '2025-12-01', to: '2026-02-14' });
    expect(periodOf('year', today)).toEqual({ from: '2026-01-01', to: '2026-02-14' });
    expect(periodOf('last-year', today)).toEqual({ from: '2025-01-01', to: '2025-12-31' });
  });

  it('is read from the address it was written to', () => {
    const own = { from: '2026-01-05', to: '2026-01-20' };
    expect(readPeriod(writePeriod('own', own), today)).toEqual({ name: 'own', period: own });
    expect(readPeriod(writePeriod('month', periodOf('month', today)), today).name).toBe('month');
  });

  it('makes sense of an address that somebody wrote', () => {
    const read = (text: string) => readPeriod(new URLSearchParams(text), today);
    expect(read('from=2026-03-01&to=2026-01-01').period).toEqual({ from: '2026-01-01', to: '2026-03-01' });
    expect(read('from=soon&to=2026-01-01').name).toBe('year');
    expect(read('period=century').name).toBe('year');
    expect(read('period=own').name).toBe('year');
  });
});

const numbers: Numbers = {
  currency: 'USD',
  locale: 'en-US',
  from: '2026-01-01',
  to: '2026-02-14',
  sent: 8,
  won: 6,
  declined: 1,
  waiting: 1,
  wonShare: 0.75,
  sentMinor: 2_400_000,
  wonMinor: 1_800_000,
  medianDaysToYes: 3.4,
  outstandingMinor: 420_000,
  receivedMinor: 900_000,
};
const figure = (of: Numbers, name: string) => figuresOf(of).find((each) => each.name === name)!;

describe('the figures', () => {
  it('tells a share only of enough', () => {
    expect(figure(numbers, 'Won').figure).toBe('75%');
    const few = figure({ ...numbers, sent: 2, won: 1, wonShare: 0.5 }, 'Won');
    expect(few.figure).toBe('1 of 2');
    expect(few.sentence).toContain('Too few');
  });

  it('says when there is nothing to tell', () => {
    const none = { ...numbers, sent: 0, won: 0, wonShare: null, medianDaysToYes: null };
    expect(figure(none, 'Days to yes').figure).toBe('–');
    expect(isEmpty({ ...none, receivedMinor: 0, outstandingMinor: 0 })).toBe(true);
    expect(isEmpty(none)).toBe(false);
  });

  it('rounds days to halves', () => {
    expect(daysWord(3.4)).toBe('3.5 days');
    expect(daysWord(1)).toBe('1 day');
    expect(daysWord(0.2)).toBe('half a day or less');
  });
});
