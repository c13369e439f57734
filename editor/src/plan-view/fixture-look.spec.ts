import { describe, expect, it } from 'vitest';
import { fixtureLook, groundOf, isFault, lookOrder, lookWord } from './fixture-look';
import { chalk } from './palette';

const window = { minVolts: 10, maxVolts: 15 };
const reading = (volts: number, aim: 'below' | 'inside' | 'above' | null = 'inside') =>
  ({ state: 'in-window', aim, volts }) as const;

describe('the look of a fixture', () => {
  it('claims nothing before there is an answer', () => {
    expect(fixtureLook(undefined, window)).toEqual({ kind: 'waiting', tint: 0, notch: null });
  });

  it('takes its kind from the state when something is wrong', () => {
    for (const state of ['dim', 'overdriven', 'dark', 'off', 'unwired'] as const)
      expect(fixtureLook({ state, aim: 'below', volts: 5 }, window)).toEqual({
        kind: state,
        tint: 0,
        notch: null,
      });
  });

  it('is plain chalk in the calm middle of its window', () => {
    const look = fixtureLook(reading(12), window);
    expect(look.tint).toBe(0);
    expect(groundOf(look)).toBe(chalk);
  });

  it('takes the tint of an edge within a fifth of its window, in thirds, and never the full hue', () => {
    expect(fixtureLook(reading(11), window).tint).toBe(0);
    expect(fixtureLook(reading(10.9), window).tint).toBeCloseTo(-1 / 3);
    expect(fixtureLook(reading(10), window).tint).toBe(-1);
    expect(fixtureLook(reading(15), window).tint).toBe(1);
    expect(fixtureLook(reading(14.4), window).tint).toBeCloseTo(2 / 3);
    expect(groundOf(fixtureLook(reading(10), window))).toBe('#a6c3cd');
  });

  it('marks what is off its aim with a notch, not with a colour', () => {
    expect(fixtureLook(reading(12, 'below'), window)).toEqual({ kind: 'in-window', tint: 0, notch: 'below' });
    expect(fixtureLook(reading(12, 'above'), window).notch).toBe('above');
    expect(fixtureLook(reading(12, null), window).notch).toBeNull();
  });

  it('has a word for each kind, and lists every kind once in the legend', () => {
    expect(new Set(lookOrder.map(lookWord)).size).toBe(lookOrder.length);
    expect(lookOrder.filter(isFault)).toEqual(['dark', 'dim', 'overdriven', 'unwired']);
  });
});
