import { z } from 'zod';
import { shown } from './fault.js';

/** Bounds of a number; a bound left out does not bind. Infinity and NaN are always refused. */
export interface Bounds {
  readonly above?: number;
  readonly atLeast?: number;
  readonly atMost?: number;
  readonly whole?: boolean;
}

const plain = new Intl.NumberFormat('en-US', { maximumFractionDigits: 6 });

function boundsInWords(unit: string, { above, atLeast, atMost, whole }: Bounds): string {
  const noun = whole ? 'a whole number' : 'a number';
  const suffix = unit ? ` ${unit}` : '';
  if (atLeast !== undefined && atMost !== undefined) {
    const range = `between ${plain.format(atLeast)} and ${plain.format(atMost)}${suffix}`;
    return whole ? `${noun} ${range}` : range;
  }
  if (above !== undefined && atMost !== undefined) {
    return `above ${plain.format(above)} and at most ${plain.format(atMost)}${suffix}`;
  }
  if (above !== undefined) return `${noun} above ${plain.format(above)}${suffix}`;
  if (atLeast !== undefined) return `${noun} of at least ${plain.format(atLeast)}${suffix}`;
  return `${noun}${suffix && ` in${suffix}`}`;
}

const complaint =
  (label: string, accepted: string) =>
  (issue: { readonly input?: unknown }): string =>
    issue.input === undefined
      ? `${label} is missing; it must be ${accepted}.`
      : `${label} must be ${accepted}; got ${shown(issue.input)}.`;

/** A finite number with a name, a unit and bounds; every fault of it is one sentence that quotes what came. */
export function quantity(label: string, unit: string, bounds: Bounds): z.ZodNumber {
  const error = complaint(label, boundsInWords(unit, bounds));
  let schema = z.number({ error });
  if (bounds.above !== undefined) schema = schema.gt(bounds.above, { error });
  if (bounds.atLeast !== undefined) schema = schema.gte(bounds.atLeast, { error });
  if (bounds.atMost !== undefined) schema = schema.lte(bounds.atMost, { error });
  if (bounds.whole) schema = schema.int({ error });
  return schema;
}

/** A non-empty name: an id, or a node's name. */
export function name(label: string): z.ZodString {
  const error = complaint(label, 'a text of at least one character');
  return z.string({ error }).min(1, { error });
}

/** One of a fixed set of numbers or words. */
export function choice<const T extends readonly (string | number)[]>(label: string, options: T) {
  const error = complaint(label, `one of ${options.join(', ')}`);
  return z.literal([...options] as T[number][], { error });
}

/** An object that refuses unknown keys. */
export function strict<T extends z.core.$ZodLooseShape>(label: string, shape: T) {
  return z.strictObject(shape, {
    error: (issue) => (issue.code === 'invalid_type' ? complaint(label, 'an object')(issue) : undefined),
  });
}

export function list<T extends z.ZodType>(label: string, item: T) {
  return z.array(item, { error: complaint(label, 'a list') });
}
