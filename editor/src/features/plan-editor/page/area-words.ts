import { type AreaUse, areaUses } from '@lampwright/geometry/plan';

export function areaWord(use: string): string {
  const known = areaUses.find((u) => u === use);
  return known === undefined ? use : wordOf(known);
}

function wordOf(use: AreaUse): string {
  switch (use) {
    case 'lawn':
      return 'Lawn';
    case 'bed':
      return 'Bed';
    case 'paved':
      return 'Paved';
    case 'building':
      return 'Building';
    case 'canopy':
      return 'Canopy';
    case 'water':
      return 'Water';
    case 'lot-line':
      return 'Lot line';
  }
}

/** What an area of this use means for the plan, in a few words; empty where it means nothing more. */
export function areaMeaning(use: AreaUse): string {
  switch (use) {
    case 'paved':
      return 'Cable under it is counted as conduit.';
    case 'building':
      return 'Cable through it is a fault.';
    case 'water':
      return 'Cable through it is a fault, and fixtures near it get a caution.';
    case 'lawn':
    case 'bed':
    case 'canopy':
    case 'lot-line':
      return '';
  }
}

export const hasHeight = (use: AreaUse): boolean => use === 'building' || use === 'canopy';
