import { AWG_GAUGES, type Conductor } from '@lampwright/geometry/estimate';
import {
  type Amperes,
  amperes,
  type Celsius,
  type Meters,
  type Ohms,
  ohms,
} from '@lampwright/geometry/units';

/** Copper at 20 °C, Ω·mm²/m (IEC 60028). */
const COPPER_OHM_SQUARE_MM_PER_METER = 1 / 58;
/** Strands lie in a helix, so they are longer than their cable. */
const STRAND_LAY = 1.02;
/** Change of copper's resistance per kelvin, from 20 °C. */
const COPPER_PER_KELVIN = 0.00393;
const REFERENCE_C = 20;
/** Class 5 plain copper, Ω/km at 20 °C (IEC 60228). */
const CLASS_5_OHMS_PER_KM = { 1.5: 13.3, 2.5: 7.98, 4: 4.95, 6: 3.3, 10: 1.91, 16: 1.21 } as const;
/** A joint of no length still resists a little; without this floor the nodal equations would have no answer. */
const LEAST_LOOP_OHMS = 1e-6;

/** 60 °C copper. */
const AWG_AMPACITY = { 18: 7, 16: 10, 14: 15, 12: 20, 10: 30, 8: 40 } as const;
const SQUARE_MM_AMPACITY = { 1.5: 15, 2.5: 20, 4: 27, 6: 34, 10: 46, 16: 61 } as const;

/** Diameter of a gauge in mm (ASTM B258). */
function awgDiameterMm(gauge: number): number {
  return 0.127 * 92 ** ((36 - gauge) / 39);
}

function awgOhmsPerMeter(gauge: number): number {
  const area = (Math.PI / 4) * awgDiameterMm(gauge) ** 2;
  return (COPPER_OHM_SQUARE_MM_PER_METER / area) * STRAND_LAY;
}

/** Worked out once: thousands of cables share half a dozen gauges. */
const AWG_OHMS_PER_METER = new Map(AWG_GAUGES.map((gauge) => [gauge, awgOhmsPerMeter(gauge)]));

/** Ohms per metre of one conductor at 20 °C. */
function ohmsPerMeterAt20(conductor: Conductor): number {
  if ('awg' in conductor) return AWG_OHMS_PER_METER.get(conductor.awg) ?? awgOhmsPerMeter(conductor.awg);
  if ('mm2' in conductor) return CLASS_5_OHMS_PER_KM[conductor.mm2] / 1000;
  return conductor.ohmsPerKm / 1000;
}

/** Ohms per metre of one conductor at a temperature. */
export function conductorOhmsPerMeter(conductor: Conductor, temperature: Celsius): number {
  return ohmsPerMeterAt20(conductor) * (1 + COPPER_PER_KELVIN * (temperature - REFERENCE_C));
}

/** Loop resistance of a two-wire cable: out and back, plus splices and terminals. */
export function loopOhms(conductor: Conductor, length: Meters, extra: Ohms, temperature: Celsius): Ohms {
  return ohms(Math.max(LEAST_LOOP_OHMS, 2 * conductorOhmsPerMeter(conductor, temperature) * length + extra));
}

/** What a conductor may carry for long, or null where only its ohms are known. */
export function conductorAmpacity(conductor: Conductor): Amperes | null {
  if ('awg' in conductor) return amperes(AWG_AMPACITY[conductor.awg]);
  if ('mm2' in conductor) return amperes(SQUARE_MM_AMPACITY[conductor.mm2]);
  return null;
}
