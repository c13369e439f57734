import type { CatalogueItem } from '@lampwright/geometry/catalogue';

export const accessories: readonly CatalogueItem[] = [
  { category: 'hub', name: 'Buried junction hub, 4-way', ways: 4 },
  { category: 'hub', name: 'Buried junction hub, 8-way', ways: 8 },
  {
    category: 'connector',
    name: 'Gel-filled connector, small',
    minConductors: 2,
    maxConductors: 3,
    largestAwg: 12,
    smallestAwg: 18,
    directBurial: true,
  },
  {
    category: 'connector',
    name: 'Gel-filled connector, large',
    minConductors: 2,
    maxConductors: 6,
    largestAwg: 8,
    smallestAwg: 16,
    directBurial: true,
  },
  {
    category: 'control',
    name: 'Plug-in timer',
    kind: 'timer',
    ratedVA: 1000,
    inrushAmps: 30,
  },
  {
    category: 'control',
    name: 'Sunset timer',
    kind: 'timer',
    note: 'Follows sunset by date and place.',
    ratedVA: 1200,
    inrushAmps: 40,
  },
  {
    category: 'control',
    name: 'Photocell, socket-mounted',
    kind: 'photocell',
    note: 'Its socket holds either the photocell or the blank jumper.',
    ratedVA: 500,
    inrushAmps: 20,
  },
  {
    category: 'control',
    name: 'Outdoor smart plug',
    kind: 'smart-plug',
    ratedVA: 1200,
    inrushAmps: 25,
  },
];
