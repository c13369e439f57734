import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { meters } from './brand.js';
import { formatLength } from './format.js';
import { type LengthFaultCode, METERS_PER_INCH, parseLength, type UnitSystem } from './length.js';

const inch = METERS_PER_INCH;

function read(text: string, preferred: UnitSystem = 'imperial'): number {
  const parsed = parseLength(text, { preferred });
  if (!parsed.ok) throw new Error(`${text}: ${parsed.message}`);
  return parsed.meters;
}

describe('parseLength', () => {
  it('knows that one foot is 0.3048 m exactly', () => {
    expect(read('1 ft')).toBe(0.3048);
  });

  it.each([
    [`12' 6 1/2"`, 150.5 * inch],
    [`12'6-1/2"`, 150.5 * inch],
    [`12'-6"`, 150 * inch],
    ['12ft 6in', 150 * inch],
    ['12 feet 6 inches', 150 * inch],
    ['12 ft. 6 in.', 150 * inch],
    [`12' 6.5"`, 150.5 * inch],
    [`12' 6`, 150 * inch],
    [`12′ 6½″`, 150.5 * inch],
    [`12’ 6 ½”`, 150.5 * inch],
    [`12' 6''`, 150 * inch],
    [`12' ⅛"`, 144.125 * inch],
    ['12.5 ft', 150 * inch],
    ['12,5 ft', 150 * inch],
    [`12½'`, 150 * inch],
    [`6"`, 6 * inch],
    [`3/4"`, 0.75 * inch],
    ['¾ in', 0.75 * inch],
    ['.5 in', 0.5 * inch],
    ['3.81 m', 3.81],
    ['3,81 m', 3.81],
    ['381 cm', 3.81],
    ['3810 mm', 3.81],
    ['3.81 Metres', 3.81],
    ['2 1/2 m', 2.5],
    ['0,125 m', 0.125],
    [`  42′\u00a04″ `, 508 * inch],
    ['0', 0],
  ])('reads %s', (text, expected) => {
    expect(read(text)).toBeCloseTo(expected, 12);
  });

  it('reads a bare number in the preferred big unit', () => {
    expect(parseLength('12.5', { preferred: 'imperial' })).toEqual({
      ok: true,
      meters: 12.5 * 0.3048,
      unitGiven: false,
    });
    expect(read('12,5', 'metric')).toBe(12.5);
  });

  it.each<[string, LengthFaultCode]>([
    ['', 'empty'],
    ['   ', 'empty'],
    ['twelve', 'unreadable'],
    ['12 6', 'unreadable'],
    ['12 yd', 'unreadable'],
    ['NaN', 'unreadable'],
    ['Infinity', 'unreadable'],
    ['1e3 m', 'unreadable'],
    ['3/0 in', 'unreadable'],
    ['1.2.3 m', 'unreadable'],
    [`6" 12'`, 'unreadable'],
    ['-3 m', 'negative'],
    ['−3 m', 'negative'],
    [`12' 12"`, 'inches'],
    [`12.5' 6"`, 'inches'],
    ['1,234 mm', 'ambiguous-comma'],
    ['10001 m', 'too-long'],
    ['9'.repeat(400), 'unreadable'],
  ])('refuses "%s" as %s', (text, code) => {
    const parsed = parseLength(text, { preferred: 'imperial' });
    expect(parsed).toMatchObject({ ok: false, code });
  });

  it('says what came and what is accepted', () => {
    const parsed = parseLength('12 yards', { preferred: 'imperial' });
    expect(parsed).toMatchObject({
      message:
        '“12 yards” is not a length. Write a length such as 12\' 6 1/2", 12.5 ft, 6", 3.81 m or 381 cm.',
    });
  });

  it('never throws, and what it reads is finite and in range (seed 411)', () => {
    const alphabet = fc.constantFrom(...`0123456789 .,/-'"′″½ftincm`);
    fc.assert(
      fc.property(fc.string({ unit: alphabet, maxLength: 12 }), (text) => {
        const parsed = parseLength(text, { preferred: 'metric' });
        if (parsed.ok) return parsed.meters >= 0 && parsed.meters <= 10_000;
        return parsed.message.length > 20;
      }),
      { seed: 411, numRuns: 2000 },
    );
  });
});

describe('a formatted length read back', () => {
  const anyLength = fc.double({ min: 0, max: 3000, noNaN: true });

  it.each([
    { system: 'imperial', precision: 'inch', step: inch },
    { system: 'imperial', precision: 'half-inch', step: inch / 2 },
    { system: 'metric', precision: 'inch', step: 0.01 },
  ] as const)('is the same to half a step: $system, $precision (seed 412)', ({ system, precision, step }) => {
    fc.assert(
      fc.property(anyLength, (length) => {
        const text = formatLength(meters(length), { system, precision });
        return Math.abs(read(text, system) - length) <= step / 2 + 1e-9;
      }),
      { seed: 412, numRuns: 1000 },
    );
  });

  it('is stable: formatting it again changes nothing (seed 413)', () => {
    fc.assert(
      fc.property(anyLength, (length) => {
        const once = formatLength(meters(length), { system: 'imperial', precision: 'half-inch' });
        const twice = formatLength(meters(read(once)), { system: 'imperial', precision: 'half-inch' });
        return once === twice;
      }),
      { seed: 413, numRuns: 1000 },
    );
  });
});
