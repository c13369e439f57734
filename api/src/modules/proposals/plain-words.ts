import type { FixtureKind } from '@lampwright/geometry/catalogue';

/** What a light of this kind lights, for somebody who has never seen a plan. */
export function whatItLights(kind: FixtureKind): string {
  switch (kind) {
    case 'path':
      return 'Lights the path at its foot';
    case 'up':
      return 'Lights what stands above it, such as a shrub, a tree or a wall';
    case 'down':
      return 'Lights the ground from above, like moonlight through a tree';
    case 'flood':
      return 'Lights a wide piece of the garden';
    case 'wall-wash':
      return 'Lights the face of a wall evenly';
    case 'step':
      return 'Lights the steps';
    case 'in-grade':
      return 'Lights upwards from the level of the ground';
    case 'bollard':
      return 'Lights the way all around it';
    case 'linear':
      return 'Lights along an edge';
    case 'underwater':
      return 'Lights the water from within';
  }
}
