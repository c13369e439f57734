import { type Meters, meters } from './brand.js';

export type UnitSystem = 'imperial' | 'metric';

/** One foot is 0.3048 m exactly (international yard and pound agreement of 1959). */
export const METERS_PER_FOOT = 0.3048;
export const METERS_PER_INCH = METERS_PER_FOOT / 12;

/** No yard has a longer line; a longer entry is a slip. */
export const LONGEST_LENGTH_METERS = 10_000;

export type LengthFaultCode = 'empty' | 'unreadable' | 'ambiguous-comma' | 'negative' | 'inches' | 'too-long';

export interface LengthFault {
  readonly ok: false;
  readonly code: LengthFaultCode;
  /** A sentence that says what was typed and what is accepted. */
  readonly message: string;
}

export type ParsedLength =
  | {
      readonly ok: true;
      readonly meters: Meters;
      /** False when a bare number was read in the preferred unit. */
      readonly unitGiven: boolean;
    }
  | LengthFault;

const ACCEPTED = 'Write a length such as 12\' 6 1/2", 12.5 ft, 6", 3.81 m or 381 cm.';

const VULGAR_FRACTIONS: Readonly<Record<string, string>> = {
  '½': '1/2',
  '⅓': '1/3',
  '⅔': '2/3',
  '¼': '1/4',
  '¾': '3/4',
  '⅛': '1/8',
  '⅜': '3/8',
  '⅝': '5/8',
  '⅞': '7/8',
};

// A value is a mixed number (6 1/2, 6-1/2), a fraction (3/4) or a decimal with a point or a comma.
const VALUE = String.raw`(\d+[ -]+\d+ ?/ ?\d+|\d+ ?/ ?\d+|\d+(?:[.,]\d+)?|[.,]\d+)`;
const FEET = String.raw`(?:'|feet|foot|ft\.?)`;
const INCHES = String.raw`(?:"|inches|inch|in\.?)`;
const feetAndInches = new RegExp(`^${VALUE} ?${FEET}(?:[ -]*${VALUE} ?${INCHES}?)?$`);
const inchesOnly = new RegExp(`^${VALUE} ?${INCHES}$`);
const metric = new RegExp(`^${VALUE} ?(mm|cm|m|millimet(?:er|re)s?|centimet(?:er|re)s?|met(?:er|re)s?)\\.?$`);
const bare = new RegExp(`^${VALUE}$`);

/**
 * Reads a length as people type it: feet and inches with fractions, decimal feet, metres, centimetres,
 * millimetres; straight or typographic marks; point or comma as the decimal sign. A bare number is feet or
 * metres, whichever is preferred. Zero is a length; a negative or an absurdly long one is not.
 */
export function parseLength(text: string, options: { readonly preferred: UnitSystem }): ParsedLength {
  const typed = plain(text);
  if (typed === '') return fault('empty', ACCEPTED);
  if (/^[-–—]/.test(typed))
    return fault('negative', `A length can’t be negative: ${quote(text)}. ${ACCEPTED}`);
  // 3,810 may be thousands or a decimal comma; 0,125 and 12,5 can only be decimals.
  if (/(?<!\d)[1-9]\d{0,2},\d{3}(?!\d)/.test(typed)) {
    return fault(
      'ambiguous-comma',
      `${quote(text)} can be read two ways; write it without a comma before three digits.`,
    );
  }
  const read = readMeters(typed, options.preferred);
  if (read === null || !Number.isFinite(read.meters)) {
    return fault('unreadable', `${quote(text)} is not a length. ${ACCEPTED}`);
  }
  if (read.brokenInches) {
    return fault('inches', `In ${quote(text)} the feet must be whole and the inches below 12. ${ACCEPTED}`);
  }
  if (read.meters > LONGEST_LENGTH_METERS) {
    return fault('too-long', `${quote(text)} is more than 10 km; check the unit. ${ACCEPTED}`);
  }
  return { ok: true, meters: meters(read.meters), unitGiven: read.unitGiven };
}

interface Reading {
  readonly meters: number;
  readonly unitGiven: boolean;
  readonly brokenInches: boolean;
}

function readMeters(typed: string, preferred: UnitSystem): Reading | null {
  const withFeet = feetAndInches.exec(typed);
  if (withFeet) {
    const feet = valueIn(withFeet[1]!);
    if (withFeet[2] === undefined) return inUnit(feet, METERS_PER_FOOT);
    const inches = valueIn(withFeet[2]);
    return {
      meters: feet * METERS_PER_FOOT + inches * METERS_PER_INCH,
      unitGiven: true,
      brokenInches: !Number.isInteger(feet) || inches >= 12,
    };
  }
  const inches = inchesOnly.exec(typed);
  if (inches) return inUnit(valueIn(inches[1]!), METERS_PER_INCH);
  const metres = metric.exec(typed);
  if (metres) return inUnit(valueIn(metres[1]!), metricUnit(metres[2]!));
  const number = bare.exec(typed);
  if (!number) return null;
  return { ...inUnit(valueIn(number[1]!), preferred === 'imperial' ? METERS_PER_FOOT : 1), unitGiven: false };
}

function inUnit(value: number, metersPerUnit: number): Reading {
  return { meters: value * metersPerUnit, unitGiven: true, brokenInches: false };
}

function metricUnit(name: string): number {
  if (name.startsWith('mm') || name.startsWith('milli')) return 0.001;
  if (name.startsWith('c')) return 0.01;
  return 1;
}

/** A fraction over zero gives a value that is not finite, which the caller refuses. */
function valueIn(text: string): number {
  const mixed = /^(?:(\d+)[ -]+)?(\d+) ?\/ ?(\d+)$/.exec(text);
  if (mixed) return Number(mixed[1] ?? 0) + Number(mixed[2]) / Number(mixed[3]);
  return Number(text.replace(',', '.'));
}

/** The text in ASCII: typographic marks, fractions and spaces replaced, lower case, single spaces. */
function plain(text: string): string {
  return text
    .replace(/[½⅓⅔¼¾⅛⅜⅝⅞]/g, (sign) => ` ${VULGAR_FRACTIONS[sign]!}`)
    .replace(/⁄/g, '/')
    .replace(/[″”“ʺ＂]|''|′′|’’/g, '"')
    .replace(/[′’‘ʹ`´＇]/g, "'")
    .replace(/[−‐‑]/g, '-')
    .replace(/\s+/g, ' ')
    .trim()
    .toLowerCase();
}

function quote(text: string): string {
  const trimmed = text.trim();
  return `“${trimmed.length > 40 ? `${trimmed.slice(0, 40)}…` : trimmed}”`;
}

function fault(code: LengthFaultCode, message: string): LengthFault {
  return { ok: false, code, message };
}
