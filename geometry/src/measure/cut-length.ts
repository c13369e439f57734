import { type Meters, meters } from '../units/brand.js';

export interface CableLengthParts {
  /** Along the drawing; null while its sheet has no scale. */
  readonly planMeters: Meters | null;
  /** Taped or wheeled in the yard; stands in place of the drawn length. */
  readonly measuredMeters: Meters | null;
  /** Left over at either end, to work with. */
  readonly slackFromMeters: Meters;
  readonly slackToMeters: Meters;
  /** Up walls and trees, which a plan can't show. */
  readonly riseMeters: Meters;
}

/**
 * The length of cable between two ends: the measured length, or else the drawn one, plus slack at both ends
 * plus rise. No waste is added. Null while there is neither a measured nor a drawn length.
 * Throws a RangeError for a part that is negative or not a number.
 */
export function cutLength(parts: CableLengthParts): Meters | null {
  for (const [name, value] of Object.entries(parts)) {
    if (value !== null && !(value >= 0 && Number.isFinite(value))) {
      throw new RangeError(`${name} is ${value}; expected a length of 0 m or more`);
    }
  }
  const run = parts.measuredMeters ?? parts.planMeters;
  if (run === null) return null;
  return meters(run + parts.slackFromMeters + parts.slackToMeters + parts.riseMeters);
}
