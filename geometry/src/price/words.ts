import { METERS_PER_FOOT, type UnitSystem } from '../units/index.js';
import type { SaleUnit } from './price-book.js';

/** "P1 to P4, P6, U2": labels of one letter and a number in runs, others as they are. */
export function labelsInWords(labels: readonly string[]): string {
  const byLetter = new Map<string, number[]>();
  const others: string[] = [];
  for (const label of labels) {
    const [, letter, number] = /^([A-Z?])(\d+)$/.exec(label) ?? [];
    if (letter === undefined || number === undefined) others.push(label);
    else byLetter.set(letter, [...(byLetter.get(letter) ?? []), Number(number)]);
  }
  const parts: string[] = [];
  for (const [letter, numbers] of [...byLetter].sort(([a], [b]) => a.localeCompare(b))) {
    numbers.sort((a, b) => a - b);
    for (let i = 0; i < numbers.length; ) {
      const from = numbers[i] ?? 0;
      let to = from;
      while (i < numbers.length && (numbers[i] ?? 0) <= to + 1) to = numbers[i++] ?? to;
      if (to - from >= 2) parts.push(`${letter}${from} to ${letter}${to}`);
      else for (let n = from; n <= to; n++) parts.push(`${letter}${n}`);
    }
  }
  return [...parts, ...others].join(', ');
}

/** Metres in the unit that a length is sold by. */
export const inUnit = (lengthMeters: number, unit: 'foot' | 'meter'): number =>
  unit === 'foot' ? lengthMeters / METERS_PER_FOOT : lengthMeters;

export const lengthUnitOf = (system: UnitSystem): 'foot' | 'meter' =>
  system === 'imperial' ? 'foot' : 'meter';

/** "112 ft", "34.2 m": to the nearest tenth of a metre, or whole foot. */
export function lengthText(lengthMeters: number, unit: 'foot' | 'meter'): string {
  const value = inUnit(lengthMeters, unit);
  return unit === 'foot' ? `${Math.round(value)} ft` : `${(Math.round(value * 10) / 10).toFixed(1)} m`;
}

/** The unit beside a quantity; nothing beside pieces. */
export function unitText(unit: SaleUnit, quantity: number): string {
  switch (unit) {
    case 'each':
      return '';
    case 'foot':
      return 'ft';
    case 'meter':
      return 'm';
    case 'visit':
      return quantity === 1 ? 'visit' : 'visits';
  }
}

export const counted = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;
