import type { FixtureKind } from '@lampwright/geometry/catalogue';
import { type LineSection, type PartUse, type SaleUnit, unitText } from '@lampwright/geometry/price';

export function sectionLabel(section: LineSection): string {
  switch (section) {
    case 'fixtures':
      return 'Fixtures';
    case 'lamps':
      return 'Lamps';
    case 'cable':
      return 'Cable';
    case 'connectors':
      return 'Connectors';
    case 'mounting':
      return 'Mounting';
    case 'conduit':
      return 'Conduit';
    case 'hubs':
      return 'Hubs';
    case 'transformers':
      return 'Transformers';
    case 'controls':
      return 'Controls';
    case 'labour':
      return 'Labour';
    case 'other':
      return 'Other';
  }
}

export function kindLabel(kind: FixtureKind): string {
  switch (kind) {
    case 'path':
      return 'Path';
    case 'up':
      return 'Up';
    case 'down':
      return 'Down';
    case 'flood':
      return 'Flood';
    case 'wall-wash':
      return 'Wall wash';
    case 'step':
      return 'Step';
    case 'in-grade':
      return 'In-grade';
    case 'bollard':
      return 'Bollard';
    case 'linear':
      return 'Linear';
    case 'underwater':
      return 'Under water';
  }
}

export function partLabel(use: PartUse): string {
  switch (use) {
    case 'ground-stake':
      return 'Ground stake';
    case 'tree-mount':
      return 'Tree mount';
    case 'surface-mount':
      return 'Surface mount';
    case 'transformer-mount':
      return 'Transformer mount';
    case 'conduit':
      return 'Conduit';
  }
}

/** As the unit stands in a choice: "each", "foot". */
export function unitLabel(unit: SaleUnit): string {
  switch (unit) {
    case 'each':
      return 'each';
    case 'foot':
      return 'foot';
    case 'meter':
      return 'metre';
    case 'visit':
      return 'visit';
  }
}

export const units = (['each', 'foot', 'meter', 'visit'] as const).map((value) => ({
  value,
  label: unitLabel(value),
}));

/** "112 ft", "5", "1,250.5 m". */
export function quantityText(quantity: number, unit: SaleUnit, locale: string): string {
  const figure = numberText(quantity, locale);
  const word = unitText(unit, quantity);
  return word === '' ? figure : `${figure} ${word}`;
}

/** A number with at most so many decimals, in the manner of the locale; of the browser where that is unknown. */
export function numberText(n: number, locale: string, decimals = 3): string {
  const options = { maximumFractionDigits: decimals };
  try {
    return new Intl.NumberFormat(locale, options).format(n);
  } catch {
    return new Intl.NumberFormat(undefined, options).format(n);
  }
}

export const percentText = (percent: number, locale: string): string => `${numberText(percent, locale, 4)} %`;

export function dueLabel(due: 'approval' | 'start' | 'finish'): string {
  switch (due) {
    case 'approval':
      return 'on approval';
    case 'start':
      return 'when work starts';
    case 'finish':
      return 'when work ends';
  }
}

export const dues = (['approval', 'start', 'finish'] as const).map((value) => ({
  value,
  label: dueLabel(value),
}));
