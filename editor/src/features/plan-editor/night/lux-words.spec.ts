import { expect, it } from 'vitest';
import { luxText } from './lux-words';

it('says lux and foot-candles to the digits that mean something', () => {
  expect([0.001, 0.3, 2.34, 12.3, 250].map((lux) => luxText(lux, 'metric'))).toEqual([
    '0 lx',
    '0.30 lx',
    '2.3 lx',
    '12 lx',
    '250 lx',
  ]);
  // One foot-candle is one lumen a square foot, of 0.3048 m a side exactly.
  expect(luxText(1 / 0.3048 ** 2, 'imperial')).toBe('1.0 fc');
  expect(luxText(1, 'imperial')).toBe('0.09 fc');
});

it('never rounds up into a figure of another length', () => {
  expect(luxText(0.999, 'metric')).toBe('1.0 lx');
  expect(luxText(9.97, 'metric')).toBe('10 lx');
});
