import { encodedOf } from './colour.js';

/** Steps over the square root of linear light, which spreads the dark. */
const STEPS = 4096;
const CODES = Float32Array.from({ length: STEPS + 2 }, (_, i) => 255 * encodedOf((i / STEPS) ** 2));

/** The sRGB code, 0 to 255 and not rounded, of linear light from 0 to 1; off by less than 0.01. */
export function codeOf(linear: number): number {
  const at = Math.sqrt(Math.min(Math.max(linear, 0), 1)) * STEPS;
  const low = Math.floor(at);
  return CODES[low]! + (CODES[low + 1]! - CODES[low]!) * (at - low);
}
