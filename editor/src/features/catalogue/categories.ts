import type { CatalogueCategory, FixtureKind } from '@lampwright/geometry/catalogue';

export const categories = ['fixture', 'lamp', 'cable', 'transformer', 'hub', 'connector', 'control'] as const;

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
