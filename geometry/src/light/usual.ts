import type { FixtureKind, LampItem, Load } from '../catalogue/index.js';

// What is taken where an item says nothing. Common practice, without a source; wherever one of these is used the
// night picture says so, and every one can be set on the item or the fixture.

/** Metres of the light above the ground. */
export function usualMountingHeight(kind: FixtureKind): number {
  switch (kind) {
    case 'path':
    case 'linear':
      return 0.5;
    case 'bollard':
      return 0.9;
    case 'down':
      return 4;
    case 'step':
      return 0.3;
    case 'up':
    case 'flood':
    case 'wall-wash':
      return 0.15;
    case 'in-grade':
    case 'underwater':
      return 0;
  }
}

/** Full angle at half of the peak, in degrees. */
export function usualBeamDegrees(kind: FixtureKind): number {
  switch (kind) {
    case 'path':
    case 'bollard':
    case 'linear':
      return 120;
    case 'wall-wash':
    case 'step':
      return 100;
    case 'down':
    case 'flood':
      return 60;
    case 'up':
    case 'in-grade':
    case 'underwater':
      return 36;
  }
}

/**
 * Share of the light outside of its beam that a fixture of the kind holds back: the hat of a path light keeps its
 * light off the sky and out of eyes.
 */
export function usualShield(kind: FixtureKind): number {
  return kind === 'path' ? 0.9 : 0;
}

/** Share of a bare lamp's light that leaves a fixture which gathers it into a beam. */
export const GATHERED_SHARE = 0.6;

/** Lumens that a light source is taken to give by its watts and technology. */
export function usualLumens(load: Load, technology: LampItem['technology'] | null): number {
  switch (load.kind) {
    case 'driver':
      return load.watts * 75;
    case 'filament':
    case 'resistive':
      return load.watts * (technology === 'incandescent' ? 9 : 15);
    case 'current':
      return load.amps * 12 * 75;
    case 'off':
      return 0;
  }
}

/** Kelvin of a light source that doesn't say. */
export function usualKelvin(load: Load): number {
  return load.kind === 'filament' || load.kind === 'resistive' ? 2800 : 2700;
}

/** Metres of a building that is marked without a height. */
export const USUAL_BUILDING_METERS = 3;
/** Metres of a tree that is marked without a height. */
export const USUAL_TREE_METERS = 5;
/** Where the crown of such a tree begins, as a share of its height. */
export const USUAL_CROWN_BASE = 0.3;

/** Lux on white that a night picture shows as white, where the sheet doesn't say. */
export const USUAL_WHITE_LUX = 40;
