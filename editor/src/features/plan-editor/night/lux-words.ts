import type { UnitSystem } from '@lampwright/geometry/units';

/** One lumen a square foot, by the foot of exactly 0.3048 m. */
export const LUX_PER_FOOT_CANDLE = 1 / 0.3048 ** 2;

export const luxUnit = (system: UnitSystem): string => (system === 'imperial' ? 'fc' : 'lx');

const inUnit = (lux: number, system: UnitSystem): number =>
  system === 'imperial' ? lux / LUX_PER_FOOT_CANDLE : lux;

/** Two digits that mean something; below a hundredth it is dark. */
export function luxNumber(lux: number, system: UnitSystem): string {
  const value = inUnit(lux, system);
  if (value < 0.005) return '0';
  if (value < 0.995) return value.toFixed(2);
  if (value < 9.95) return value.toFixed(1);
  return value.toFixed(0);
}

export const luxText = (lux: number, system: UnitSystem): string =>
  `${luxNumber(lux, system)} ${luxUnit(system)}`;
