import { clockText, eveningOf } from '@lampwright/geometry/night';
import { describe, expect, it } from 'vitest';
import {
  atMinutes,
  eveningLineOf,
  minutesInto,
  phaseAt,
  shareOf,
  skyColour,
  skyGradient,
  zonesOn,
} from './moments';
import { london, untilEleven, untilTen, zone } from './night.testkit';
import { tickLabels } from './tick-labels';

const evening = eveningOf(london, { year: 2015, month: 12, day: 1 });
const clock = (at: Date) => clockText(at, 'Europe/London', 'en-GB');
const zones = [zone('a', untilEleven), zone('b', untilTen), zone('c', untilEleven)];
const line = eveningLineOf(evening, zones);

describe('the evening line', () => {
  it('goes from before sunset to after the last lights-out, at full five minutes', () => {
    expect([clock(line.start), clock(line.end)]).toEqual(['15:25', '23:15']);
    expect(line.minutes).toBe(7 * 60 + 50);
  });

  it('has the sunset and each time of switching once, with who switches', () => {
    expect(line.ticks.map(({ kind, at, zones: who }) => [kind, clock(at), who])).toEqual([
      ['sunset', '15:55', []],
      ['on', '15:55', ['B', 'A', 'C']],
      ['off', '22:00', ['B']],
      ['off', '23:00', ['A', 'C']],
    ]);
  });

  it('begins in the dark with lights on', () => {
    expect(phaseAt(evening, line.first)).toBe('dark');
    expect(zonesOn(evening, zones, line.first, new Map()).size).toBe(3);
  });

  it('begins in the light where lights go off before it is dark', () => {
    const early = eveningLineOf(evening, [
      zone('a', { ...untilEleven, off: { kind: 'sunset', minutesAfter: 20 } }),
    ]);
    expect(
      zonesOn(
        evening,
        [zone('a', { ...untilEleven, off: { kind: 'sunset', minutesAfter: 20 } })],
        early.first,
        new Map(),
      ).size,
    ).toBe(1);
  });

  it('is the evening alone where nothing is switched', () => {
    const bare = eveningLineOf(evening, []);
    expect(bare.ticks.map(({ kind }) => kind)).toEqual(['sunset']);
    expect(bare.minutes).toBeGreaterThan(60);
  });

  it('finds moments by minutes and back', () => {
    expect(clock(atMinutes(line, 60))).toBe('16:25');
    expect(minutesInto(line, atMinutes(line, 123))).toBe(123);
    expect(shareOf(line, line.end)).toBe(1);
  });
});

it('tells daylight, dusk and dark', () => {
  const at = (text: string) => phaseAt(evening, new Date(`2015-12-01T${text}:00Z`));
  expect([at('15:30'), at('16:10'), at('17:40')]).toEqual(['daylight', 'dusk', 'dark']);
});

it('counts zones as they are looked at', () => {
  const at = new Date('2015-12-01T22:30:00Z');
  expect([...zonesOn(evening, zones, at, new Map())]).toEqual(['a', 'c']);
  expect([
    ...zonesOn(
      evening,
      zones,
      at,
      new Map([
        ['b', 'on'],
        ['c', 'off'],
      ]),
    ),
  ]).toEqual(['a', 'b']);
});

it('darkens the sky along the line', () => {
  const light = (colour: string) => Number.parseInt(colour.slice(1, 3), 16);
  const shades = [10, 3, -2, -6, -10, -15, -30].map((altitude) => light(skyColour(altitude)));
  expect(skyColour(10)).toBe('#CFDCE6');
  expect(shades.slice(2)).toEqual([...shades.slice(2)].sort((a, b) => b - a));
  expect(skyGradient(evening, line)).toMatch(/^linear-gradient\(to right, #[0-9a-f]{6} 0\.0%, .*100\.0%\)$/i);
});

describe('labels under the line', () => {
  const texts = (width: number) => tickLabels(evening, line, 3, width, 'en-GB').map(({ text }) => text);

  it('name who switches where not all do', () => {
    expect(texts(1400)).toEqual(['Sunset 15:55', 'B off 22:00', 'Off 23:00']);
  });

  it('leave out what does not fit, the sunset and the last lights-out never', () => {
    expect(texts(190)).toEqual(['Sunset 15:55', 'Off 23:00']);
  });

  it('step aside of a neighbour rather than go', () => {
    expect(texts(560)).toEqual(['Sunset 15:55', 'B off 22:00', 'Off 23:00']);
  });

  it('stay within the line', () => {
    for (const { left } of tickLabels(evening, line, 3, 300, 'en-GB')) {
      expect(left).toBeGreaterThanOrEqual(0);
      expect(left).toBeLessThan(300);
    }
  });
});
