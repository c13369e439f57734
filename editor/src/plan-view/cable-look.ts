import type { Conductor } from '@lampwright/geometry/catalogue';
import { dusk, ink, mix, overRed } from './palette';

/** Copper area in mm² of the stranded gauges (ASTM B258 diameters), for line weights only. */
function areaMm2(conductor: Conductor): number {
  if ('mm2' in conductor) return conductor.mm2;
  if ('awg' in conductor) return (Math.PI / 4) * (0.127 * 92 ** ((36 - conductor.awg) / 39)) ** 2;
  // 1/58 Ω·mm²/m of copper gives the area that would have this resistance.
  return 1000 / 58 / conductor.ohmsPerKm;
}

/** Width of a cable's line in window pixels: heavier cable is drawn heavier, from 1.5 (18 AWG) to 5 (8 AWG). */
export function cableWeight(conductor: Conductor): number {
  const weight = 1.5 + 1.35 * Math.log2(areaMm2(conductor) / 0.82);
  return Math.round(Math.min(5.5, Math.max(1.5, weight * 0.75 + 0.4)) * 4) / 4;
}

export type LoadBand = 'calm' | 'near' | 'over';

/** Share of a limit, in percent: up to 80 is calm, up to 100 near it, beyond over. Null: nothing known. */
export function loadBand(percent: number | null): LoadBand {
  if (percent === null || percent <= 80) return 'calm';
  return percent <= 100 ? 'near' : 'over';
}

export function cableColour(band: LoadBand): string {
  switch (band) {
    case 'calm':
      return ink;
    case 'near':
      return mix(ink, overRed, 0.5);
    case 'over':
      return overRed;
  }
}

export function barColour(band: LoadBand): string {
  switch (band) {
    case 'calm':
      return dusk;
    case 'near':
      return mix(dusk, overRed, 0.5);
    case 'over':
      return overRed;
  }
}
