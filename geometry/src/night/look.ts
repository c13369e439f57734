import type { NightScene } from '../light/night-scene.js';
import type { Rgb } from './colour.js';

/** How the daylight picture of one kind of sheet is drawn, in linear light. */
export interface Grade {
  /** What is left of the picture's own light, by channel: all 1 by day. */
  readonly ambient: Rgb;
  /** Colourfulness of that light: 1 by day; at night the eye sees little colour. */
  readonly saturation: number;
  /** The same of what lamps light: pictures taken in the sun are more colourful than anything is by lamplight. */
  readonly litSaturation: number;
  /**
   * Light that black is drawn with: none on photos. On dark paper the lines of a drawing turn pale, or nobody could
   * read them; ink alone, since it goes with the twelfth power of how dark a
   * place of the sheet is: greys stay dark.
   */
  readonly ink: Rgb;
  /** Factor on the lamps' light; 1 at night, next to nothing in the sun. */
  readonly lamps: number;
  /** Up to here light is shown as it is; above, ever less of it, towards white. 1: no shoulder. */
  readonly knee: number;
}

/** How dark and how blue the evening is. */
export interface Look {
  readonly sunAltitudeDegrees: number;
  /** Lux on open ground from sun and sky. */
  readonly skyLux: number;
  readonly photo: Grade;
  readonly plan: Grade;
}

/**
 * Lux on open level ground by the sun's altitude in degrees, on a clear evening without a moon (of the order that
 * the U.S. Naval Observatory and Seidelmann's "Explanatory Supplement", 1992, give: 3.4 lx at the end of civil
 * twilight, 0.008 lx at the end of the nautical, 0.0006 lx at night).
 */
const SKY_LUX: readonly (readonly [number, number])[] = [
  [-18, 0.0006],
  [-15, 0.001],
  [-12, 0.008],
  [-9, 0.13],
  [-6, 3.4],
  [-3, 60],
  [0, 700],
  [5, 5000],
  [10, 12_000],
  [20, 31_000],
  [45, 80_000],
  [90, 120_000],
];

/** What counts as full day: brighter is not shown brighter. */
const DAY_LUX = 12_000;
/** Darker is not shown darker: the eye adapts, and the garden must stay readable. */
const NIGHT_LUX = 0.05;

/** Tints by altitude, each of luminance about 1: warm in the last sun, blue after it, slate at night. */
const PHOTO_TINT: readonly (readonly [number, Rgb])[] = [
  [-12, [0.62, 0.98, 1.75]],
  [-7, [0.6, 0.98, 1.85]],
  [-4, [0.78, 0.98, 1.55]],
  [-1, [1.12, 0.97, 1.0]],
  [2, [1.16, 0.97, 0.82]],
  [6, [1.06, 0.99, 0.93]],
  [10, [1, 1, 1]],
];
const PLAN_TINT: readonly (readonly [number, Rgb])[] = [
  [-12, [0.58, 0.95, 1.95]],
  [-6, [0.62, 0.97, 1.75]],
  [0, [0.95, 0.99, 1.12]],
  [8, [1, 1, 1]],
];

/** Share of the daylight picture that is left in the dark. */
const PHOTO_NIGHT = 0.03;
const PLAN_NIGHT = 0.045;
const NIGHT_SATURATION = 0.4;
const LIT_SATURATION = 0.55;
const NIGHT_KNEE = 0.5;
/** Pale blue, a few times as bright as the paper beside it. */
const PLAN_INK: Rgb = [0.23, 0.29, 0.4];
const NO_INK: Rgb = [0, 0, 0];
/** White paper throws back several times as much light as a garden does. */
const PLAN_LAMPS = 0.25;

/**
 * The look at an altitude of the sun. The ten thousandfold fall of daylight through dusk is drawn over the thirtyfold
 * that a picture can show: the picture's share of light goes with the logarithm of the lux, as the eye does.
 */
export function lookAt(sunAltitudeDegrees: number): Look {
  const skyLux = skyLuxAt(sunAltitudeDegrees);
  const clamped = Math.min(Math.max(skyLux, NIGHT_LUX), DAY_LUX);
  // 1 by day, 0 at night.
  const light = Math.log(clamped / NIGHT_LUX) / Math.log(DAY_LUX / NIGHT_LUX);
  return {
    sunAltitudeDegrees,
    skyLux,
    photo: gradeAt(light, PHOTO_NIGHT, between(PHOTO_TINT, sunAltitudeDegrees), 1, NO_INK),
    plan: gradeAt(light, PLAN_NIGHT, between(PLAN_TINT, sunAltitudeDegrees), PLAN_LAMPS, PLAN_INK),
  };
}

function gradeAt(light: number, night: number, tint: Rgb, lampsAtNight: number, ink: Rgb): Grade {
  const share = night ** (1 - light);
  // Comes up as the paper goes down, late in dusk.
  const pale = smooth(Math.max(0, 1 - 2 * light));
  return {
    ambient: [tint[0] * share, tint[1] * share, tint[2] * share],
    saturation: 1 - (1 - NIGHT_SATURATION) * smooth(1 - light),
    litSaturation: LIT_SATURATION,
    ink: [ink[0] * pale, ink[1] * pale, ink[2] * pale],
    // A camera set for so much daylight shows so much less of the lamps.
    lamps: lampsAtNight * (1 - light) ** 1.5,
    knee: NIGHT_KNEE + (1 - NIGHT_KNEE) * smooth(light),
  };
}

const smooth = (t: number): number => t * t * (3 - 2 * t);

/** Lux on open ground from sun and sky; straight lines through the logarithm of the table. */
export function skyLuxAt(sunAltitudeDegrees: number): number {
  const { low, high, t } = around(SKY_LUX, sunAltitudeDegrees);
  return Math.exp(Math.log(low) * (1 - t) + Math.log(high) * t);
}

function between(table: readonly (readonly [number, Rgb])[], at: number): Rgb {
  const { low, high, t } = around(table, at);
  const mix = (i: 0 | 1 | 2) => low[i] * (1 - t) + high[i] * t;
  return [mix(0), mix(1), mix(2)];
}

function around<T>(table: readonly (readonly [number, T])[], at: number): { low: T; high: T; t: number } {
  const above = table.findIndex(([altitude]) => altitude >= at);
  const last = table[table.length - 1]!;
  const high = above < 0 ? last : table[above]!;
  const low = above < 0 ? last : table[Math.max(above - 1, 0)]!;
  const span = high[0] - low[0];
  return { low: low[1], high: high[1], t: span > 0 ? (at - low[0]) / span : 0 };
}

/** The grade for sheets of this kind. */
export const gradeFor = (look: Look, view: NightScene['view']): Grade => look[view];
