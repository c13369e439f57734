import { describe, expect, it } from 'vitest';
import { meters, squareMeters } from './brand.js';
import { formatArea, formatLength, formatLengthWithError } from './format.js';
import { METERS_PER_FOOT, METERS_PER_INCH } from './length.js';

const inches = (n: number) => meters(n * METERS_PER_INCH);
const imperial = { system: 'imperial' } as const;
const halfInches = { system: 'imperial', precision: 'half-inch' } as const;
const metric = { system: 'metric' } as const;

describe('formatLength', () => {
  it.each([
    [508, '42′ 4″'],
    [504, '42′ 0″'],
    [7, '7″'],
    [0, '0″'],
    [0.4, '0″'],
    [143.4, '11′ 11″'],
    [143.6, '12′ 0″'],
    [11.6, '1′ 0″'],
    [-7, '−7″'],
    [-0.1, '0″'],
  ])('shows %d inches as %s', (n, text) => {
    expect(formatLength(inches(n), imperial)).toBe(text);
  });

  it.each([
    [6.5, '6½″'],
    [0.5, '½″'],
    [12.5, '1′ ½″'],
    [143.7, '11′ 11½″'],
    [143.8, '12′ 0″'],
  ])('shows %d inches to the half inch as %s', (n, text) => {
    expect(formatLength(inches(n), halfInches)).toBe(text);
  });

  it('shows metres with two decimals', () => {
    expect(formatLength(meters(12.9), metric)).toBe('12.90 m');
    expect(formatLength(meters(-0.001), metric)).toBe('0.00 m');
    expect(formatLength(meters(-1.5), metric)).toBe('−1.50 m');
  });

  it('shows a dash for what is not a number', () => {
    expect(formatLength(meters(Number.NaN), metric)).toBe('—');
    expect(formatLength(meters(Number.POSITIVE_INFINITY), imperial)).toBe('—');
  });
});

describe('formatLengthWithError', () => {
  it('shows one standard deviation beside the length', () => {
    expect(formatLengthWithError(inches(508), inches(7), imperial)).toBe('42′ 4″ ± 7″');
    expect(formatLengthWithError(inches(508), inches(27), imperial)).toBe('42′ 4″ ± 2′ 3″');
    expect(formatLengthWithError(meters(12.9), meters(0.178), metric)).toBe('12.90 ± 0.18 m');
  });

  it('never claims a smaller error than its last digit', () => {
    expect(formatLengthWithError(inches(508), inches(0.01), imperial)).toBe('42′ 4″ ± 1″');
    expect(formatLengthWithError(inches(508), inches(0.01), halfInches)).toBe('42′ 4″ ± ½″');
    expect(formatLengthWithError(meters(3), meters(0.0001), metric)).toBe('3.00 ± 0.01 m');
  });

  it('shows an error without bounds as a dash', () => {
    expect(formatLengthWithError(meters(3), meters(Number.POSITIVE_INFINITY), metric)).toBe('3.00 ± — m');
  });
});

describe('formatArea', () => {
  it('shows square feet whole, small ones with a decimal', () => {
    const squareFeet = (n: number) => squareMeters(n * METERS_PER_FOOT ** 2);
    expect(formatArea(squareFeet(1234.4), imperial)).toBe('1,234 ft²');
    expect(formatArea(squareFeet(7.44), imperial)).toBe('7.4 ft²');
    expect(formatArea(squareFeet(9.96), imperial)).toBe('10 ft²');
  });

  it('shows square metres with a decimal, large ones whole', () => {
    expect(formatArea(squareMeters(114.63), metric)).toBe('114.6 m²');
    expect(formatArea(squareMeters(1005.5), metric)).toBe('1,006 m²');
  });
});
