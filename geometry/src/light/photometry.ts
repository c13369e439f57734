import type { FixtureItem, LampItem } from '../catalogue/index.js';
import { type Beam, halfAngleOf, lumensOf } from './beam.js';
import { GATHERED_SHARE, usualBeamDegrees, usualKelvin, usualLumens, usualShield } from './usual.js';

/** What gives light and takes current. */
export type LightItem = LampItem | Extract<FixtureItem, { light: 'integrated' }>;

/** The light of a fixture at its rated volts. */
export interface Photometry {
  readonly light: LightItem;
  readonly beam: Beam;
  readonly cctKelvin: number;
  /** What the catalogue doesn't say and was taken as usual, to be told: "its beam as 36°". */
  readonly assumed: readonly string[];
}

/** What gives light in a fixture: itself, or the lamp in it; null for a fixture without its lamp. */
export function lightItemOf(item: FixtureItem, lamp: LampItem | null | undefined): LightItem | null {
  return item.light === 'integrated' ? item : (lamp ?? null);
}

/**
 * The beam of a fixture by its item and lamp, from its peak where that is known, else from its lumens; null
 * without a lamp. A lamp that shines all around and stands in a fixture of a kind that gathers light gets that
 * kind's usual beam. A path light whose shield nobody knows has the usual hat, which goes without saying.
 */
export function photometryOf(item: FixtureItem, lamp: LampItem | null | undefined): Photometry | null {
  const light = lightItemOf(item, lamp);
  if (!light) return null;
  const assumed: string[] = [];
  const gathered = light.category === 'lamp' && light.beamDegrees !== null && light.beamDegrees >= 360;
  let beamDegrees = light.beamDegrees;
  if (beamDegrees === null || gathered) {
    beamDegrees = usualBeamDegrees(item.kind);
    assumed.push(`its beam as ${beamDegrees}°`);
  }
  const shield = item.shieldFactor ?? usualShield(item.kind);
  // The lumens of a fixture whose shield is only assumed are those that leave it.
  const counted = item.shieldFactor === undefined ? shield : 0;
  const cctKelvin = light.cctKelvin ?? usualKelvin(light.load);
  if (light.cctKelvin === null) assumed.push(`its colour as ${cctKelvin} K`);
  const { peakCandela } = light;
  if (peakCandela != null && !gathered)
    return {
      light,
      beam: { peakCandela, halfAngle: halfAngleOf(beamDegrees), shield },
      cctKelvin,
      assumed,
    };
  let lumens = light.lumens;
  if (lumens === null) {
    const technology = light.category === 'lamp' ? light.technology : null;
    lumens = usualLumens(light.load, technology);
    assumed.push(`its light as ${Math.round(lumens)} lm, by its watts`);
  }
  if (gathered) {
    lumens *= GATHERED_SHARE;
    assumed.push(`${GATHERED_SHARE * 100} % of its bare lamp’s light as what leaves it`);
  }
  const held = lumensOf({ peakCandela: 1, halfAngle: halfAngleOf(beamDegrees), shield: counted });
  return {
    light,
    beam: { peakCandela: lumens / held, halfAngle: halfAngleOf(beamDegrees), shield },
    cctKelvin,
    assumed,
  };
}
