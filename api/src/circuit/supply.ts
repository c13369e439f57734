import type { NormalizedTransformer } from '@lampwright/geometry/estimate';
import { type VoltAmperes, type Volts, volts } from '@lampwright/geometry/units';

/** Volts of a tap without load, at the line's actual volts. */
export function openVolts(transformer: NormalizedTransformer, tapVolts: number): Volts {
  const { lineVolts, nominalLineVolts, regulationPercent, ratedAt } = transformer;
  const atLine = (tapVolts * lineVolts) / nominalLineVolts;
  return volts(ratedAt === 'load' ? atLine * (1 + regulationPercent / 100) : atLine);
}

/**
 * How much a winding sags: all its taps have V = V_open × (1 − sag × S), S the volt-amperes it supplies. Where the
 * nameplate volts hold at full load, V comes out as the nameplate's at S = rated.
 */
export function sagPerVoltAmpere(transformer: NormalizedTransformer, windingRated: VoltAmperes): number {
  const { regulationPercent: g, ratedAt } = transformer;
  return (ratedAt === 'load' ? g / (100 + g) : g / 100) / windingRated;
}

/**
 * The share f of the open volts that is left on a winding loaded by a plain resistance that would take
 * `voltAmperesAtOpen` at the open volts: the root of f = 1 − sag × f² × voltAmperesAtOpen.
 */
export function shareLeft(sag: number, voltAmperesAtOpen: number): number {
  return 2 / (1 + Math.sqrt(1 + 4 * sag * voltAmperesAtOpen));
}
