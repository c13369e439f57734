import type { CatalogueCategory, FixtureKind, PartItem } from '@lampwright/geometry/catalogue';

export const categories = [
  'fixture',
  'lamp',
  'cable',
  'transformer',
  'hub',
  'connector',
  'control',
  'part',
] as const;

export const categoryOf = (text: string | null | undefined): CatalogueCategory | null =>
  categories.find((category) => category === text) ?? null;

export function categoryLabel(category: CatalogueCategory): string {
  switch (category) {
    case 'fixture':
      return 'Fixtures';
    case 'lamp':
      return 'Lamps';
    case 'cable':
      return 'Cable';
    case 'transformer':
      return 'Transformers';
    case 'hub':
      return 'Hubs';
    case 'connector':
      return 'Connectors';
    case 'control':
      return 'Controls';
    case 'part':
      return 'Parts';
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

export function controlLabel(kind: 'timer' | 'photocell' | 'smart-plug'): string {
  switch (kind) {
    case 'timer':
      return 'Timer';
    case 'photocell':
      return 'Photocell';
    case 'smart-plug':
      return 'Smart plug';
  }
}

type PartItemUse = PartItem['use'];
export const partItemUses = [
  'ground-stake',
  'tree-mount',
  'surface-mount',
  'transformer-mount',
  'conduit',
  'other',
] as const satisfies readonly PartItemUse[];

export function partUseLabel(use: PartItemUse): string {
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
    case 'other':
      return 'Something else';
  }
}

export function technologyLabel(technology: 'led' | 'halogen' | 'incandescent'): string {
  switch (technology) {
    case 'led':
      return 'LED';
    case 'halogen':
      return 'Halogen';
    case 'incandescent':
      return 'Incandescent';
  }
}
