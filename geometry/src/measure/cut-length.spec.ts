import { describe, expect, it } from 'vitest';
import { meters } from '../units/brand.js';
import { cutLength } from './cut-length.js';

const parts = {
  planMeters: meters(10),
  measuredMeters: null,
  slackFromMeters: meters(0.5),
  slackToMeters: meters(0.25),
  riseMeters: meters(2),
};

describe('cutLength', () => {
  it('adds slack at both ends and rise to the drawn length', () => {
    expect(cutLength(parts)).toBe(12.75);
  });

  it('puts a measured length in place of the drawn one, and still adds slack and rise', () => {
    expect(cutLength({ ...parts, measuredMeters: meters(11) })).toBe(13.75);
    expect(cutLength({ ...parts, measuredMeters: meters(0) })).toBe(2.75);
  });

  it('waits while nothing is known, and does with a measured length alone', () => {
    expect(cutLength({ ...parts, planMeters: null })).toBeNull();
    expect(cutLength({ ...parts, planMeters: null, measuredMeters: meters(11) })).toBe(13.75);
  });

  it.each([
    ['planMeters', -1],
    ['measuredMeters', Number.NaN],
    ['slackFromMeters', -0.1],
    ['riseMeters', Number.POSITIVE_INFINITY],
  ])('refuses %s of %d, quoting it', (name, value) => {
    expect(() => cutLength({ ...parts, [name]: meters(value) })).toThrow(`${name} is ${value}`);
  });
});
