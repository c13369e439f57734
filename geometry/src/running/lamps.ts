/** IES handbook, from memory: the life of a filament goes with its volts to the power of −13. */
export const FILAMENT_LIFE_EXPONENT = 13;

/**
 * Hours that a filament lives at its volts. Halogen that is dimmed does not keep to it: its halogen cycle needs the
 * heat, so what is gained by fewer volts is not to be relied on, and none is counted.
 */
export function filamentLifeHours(ratedHours: number, volts: number, ratedVolts: number): number {
  return ratedHours * Math.min(1, (volts / ratedVolts) ** -FILAMENT_LIFE_EXPONENT);
}

/** Lamps to be changed in a year by lights that are on for so long: an average, not a whole number. */
export const changesPerYear = (lamps: number, lifeHours: number, hoursPerYear: number): number =>
  (lamps * hoursPerYear) / lifeHours;
