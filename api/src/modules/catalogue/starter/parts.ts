import type { PartItem } from '@lampwright/geometry/catalogue';

/** What holds fixtures and transformers in place, and what protects cable. */
export const parts: readonly PartItem[] = [
  { category: 'part', name: 'Ground stake, 10 in', use: 'ground-stake' },
  {
    category: 'part',
    name: 'Ground stake, 18 in, for soft ground',
    note: 'For beds that are dug over, and sandy ground.',
    use: 'ground-stake',
  },
  {
    category: 'part',
    name: 'Tree mount with standoff screws',
    note: 'Stainless screws with room for the tree to grow; loosen them at each visit.',
    use: 'tree-mount',
  },
  { category: 'part', name: 'Surface mount, brass', use: 'surface-mount' },
  {
    category: 'part',
    name: 'Transformer wall mount',
    note: 'Screws and anchors for masonry or timber; upright, at working height.',
    use: 'transformer-mount',
  },
  {
    category: 'part',
    name: 'Conduit, 20 mm (¾ in)',
    note: 'Rigid PVC in sticks, for cable under drives and walks and below the transformer.',
    use: 'conduit',
  },
  {
    category: 'part',
    name: 'Conduit, 25 mm (1 in)',
    note: 'For several cables side by side.',
    use: 'conduit',
  },
  { category: 'part', name: 'Cable marker tape', use: 'other' },
];
