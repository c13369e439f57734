import type { LightTarget } from '../plan/index.js';
import type { LuxFigures } from './grid.js';

export type LuxUnit = 'lux' | 'foot-candle';

/** One lumen on each square foot: a foot is 0.3048 m exactly. */
export const LUX_PER_FOOT_CANDLE = 1 / 0.3048 ** 2;

/** A number of lux in the unit that is shown. */
export const inLuxUnit = (lux: number, unit: LuxUnit): number =>
  unit === 'lux' ? lux : lux / LUX_PER_FOOT_CANDLE;

/** What was typed in the unit that is shown, in lux. */
export const fromLuxUnit = (value: number, unit: LuxUnit): number =>
  unit === 'lux' ? value : value * LUX_PER_FOOT_CANDLE;

export const luxUnitText = (unit: LuxUnit): 'lx' | 'fc' => (unit === 'lux' ? 'lx' : 'fc');

/**
 * Light for the eye: `0.42 lx`, `6.2 lx`, `140 lx`, `1.3 fc`. With a limit, as many digits as it takes to show which
 * side of it the light is on.
 */
export function luxText(lux: number, unit: LuxUnit, limit?: number): string {
  const value = inLuxUnit(lux, unit);
  const bound = limit === undefined ? undefined : inLuxUnit(limit, unit);
  // Judged as it will be shown, so that 9.97 becomes 10 and not 10.0.
  let digits = value < 0.995 ? 2 : value < 9.95 ? 1 : 0;
  while (
    bound !== undefined &&
    digits < 6 &&
    Math.sign(Number(value.toFixed(digits)) - bound) !== Math.sign(value - bound)
  )
    digits += 1;
  return `${value.toFixed(digits)} ${luxUnitText(unit)}`;
}

/** A limit as people typed it: no digits that mean nothing. */
const limitText = (lux: number, unit: LuxUnit): string =>
  `${Number(inLuxUnit(lux, unit).toPrecision(3))} ${luxUnitText(unit)}`;

/** A figure this much short of its target is rounding. */
const ROUNDING = 1e-9;

/** What of a target fails, in sentences; empty where it is met. */
export function shortOf(figures: LuxFigures, target: LightTarget, unit: LuxUnit = 'lux'): string[] {
  const sentences: string[] = [];
  const { least, meanLux, uniformity } = figures;
  if (target.leastLux !== null && least.lux < target.leastLux * (1 - ROUNDING)) {
    const where = least.alongMeters === null ? '' : `, ${least.alongMeters.toFixed(1)} m along the path,`;
    sentences.push(
      `The darkest place${where} has ${luxText(least.lux, unit, target.leastLux)}; at least ${limitText(target.leastLux, unit)} is wanted.`,
    );
  }
  if (target.meanLux !== null && meanLux < target.meanLux * (1 - ROUNDING))
    sentences.push(
      `The mean is ${luxText(meanLux, unit, target.meanLux)}; ${limitText(target.meanLux, unit)} is wanted.`,
    );
  if (target.uniformity !== null && uniformity < target.uniformity * (1 - ROUNDING))
    sentences.push(
      `It is uneven: the darkest place has ${shareText(uniformity, target.uniformity)} of the mean; ${shareText(target.uniformity)} is wanted.`,
    );
  return sentences;
}

function shareText(share: number, limit?: number): string {
  let digits = 2;
  while (limit !== undefined && digits < 6 && Number(share.toFixed(digits)) >= limit) digits += 1;
  return `${Number(share.toFixed(digits))}`;
}

/** A target that is offered, with who says so. */
export interface UsualTarget {
  readonly name: string;
  readonly target: LightTarget;
  readonly source: string;
}

const least = (leastLux: number): LightTarget => ({ leastLux, meanLux: null, uniformity: null });

/** Targets to choose from; a garden is no public way, so all of them are guidance. */
export const usualTargets: readonly UsualTarget[] = [
  { name: 'Park path', target: least(1), source: 'German public-lighting guidance: at least 1 lx' },
  {
    name: 'Park path with steps',
    target: least(5),
    source: 'German public-lighting guidance: at least 5 lx',
  },
  { name: 'Outdoor stairs, quiet', target: least(5), source: 'After EN 12464-2: 5 to 50 lx' },
  { name: 'Outdoor stairs, busy', target: least(50), source: 'After EN 12464-2: 5 to 50 lx' },
];

/** A full moon high in the sky, in lux, for comparison. */
export const FULL_MOON_LUX = { least: 0.05, most: 0.3 } as const;

/** Light beside what everybody has seen: "less than a full moon", "about 20 full moons". */
export function besideMoonlight(lux: number): string {
  const { least: faint, most: bright } = FULL_MOON_LUX;
  if (lux < faint) return 'less than a full moon gives';
  if (lux <= bright) return 'about what a full moon gives';
  const times = lux / bright;
  const round = times < 10 ? Math.round(times * 2) / 2 : Number(times.toPrecision(2));
  return round <= 1
    ? 'a little more than a full moon gives'
    : `about ${round} times what a bright full moon gives`;
}
