import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { accessories } from './accessories.js';
import { cables } from './cable.js';
import { fixtures } from './fixtures.js';
import { lamps } from './lamps.js';
import { parts } from './parts.js';
import { transformers } from './transformers.js';

/** What every company begins with: generic items with plain names, to be edited to what it really installs. */
export const starterCatalogue: readonly CatalogueItem[] = [
  ...fixtures,
  ...lamps,
  ...cables,
  ...transformers,
  ...accessories,
  ...parts,
];
