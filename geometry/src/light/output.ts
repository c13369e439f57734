import type { Load, VoltWindow } from '../catalogue/index.js';

/** What a lamp gives at the volts that reach it. */
export interface LampOutput {
  /** Share of its rated light; 0 is dark, over 1 is overdriven. */
  readonly output: number;
  readonly cctKelvin: number;
  /** Its life over the rated one, on paper; null where volts within the window don't tell, as with drivers. */
  readonly lifeFactor: number | null;
  /** A sentence for the designer where the light is not as rated. */
  readonly note: string | null;
}

/** Light of a filament goes with this power of its volts; 3.4 to 3.5 in lamp rerating practice. */
export const FILAMENT_LIGHT_EXPONENT = 3.4;
/** Its life; −12 to −16 in lamp rerating practice, −13 in the IES handbook (from memory). */
export const FILAMENT_LIFE_EXPONENT = -13;
/** The colour temperature of its light (IES handbook, from memory). */
export const FILAMENT_COLOUR_EXPONENT = 0.42;

// As the estimate calls a lamp dark: a driver below this part of its minimum, a filament below this part of its
// rating, and a load of constant current without volts to speak of.
const DRIVER_DARK = 0.8;
const FILAMENT_DARK = 0.5;
const CURRENT_DARK = 0.1;
/** Volts this much off a bound are rounding. */
const ROUNDING_VOLTS = 1e-9;
/** Less than this share off its rating no eye sees; nothing is said about it. */
const UNSEEN_SHARE = 0.05;

/**
 * The light of a lamp rated for `cctKelvin` at the volts of its fixture; null volts: at its rated light.
 *
 * A driver gives its rated light from its minimum up and fades to nothing at 0.8 of it. A filament, and a plain
 * resistance, follows its volts. A load of constant current takes watts, and so gives light, in proportion to its
 * volts below its window. Dark is what the estimate calls dark.
 */
export function lampOutput(
  load: Load,
  window: VoltWindow,
  volts: number | null,
  cctKelvin: number,
): LampOutput {
  if (load.kind === 'off') return unlit(cctKelvin, 'It is off: it draws nothing.');
  if (volts === null) return { output: 1, cctKelvin, lifeFactor: null, note: null };
  switch (load.kind) {
    case 'driver':
      return driverOutput(load.minVolts, window, volts, cctKelvin);
    case 'filament':
    case 'resistive':
      return filamentOutput(load.ratedVolts, volts, cctKelvin);
    case 'current':
      return currentOutput(window, volts, cctKelvin);
  }
}

function unlit(cctKelvin: number, note: string): LampOutput {
  return { output: 0, cctKelvin, lifeFactor: null, note };
}

function driverOutput(minVolts: number, window: VoltWindow, volts: number, cctKelvin: number): LampOutput {
  const dark = DRIVER_DARK * minVolts;
  if (volts < dark - ROUNDING_VOLTS)
    return unlit(cctKelvin, `Dark: ${inVolts(volts)} are too few for its driver.`);
  if (volts >= minVolts - ROUNDING_VOLTS) return steady(window, volts, cctKelvin);
  const s = Math.max((volts - dark) / (minVolts - dark), 0);
  const output = s * s * (3 - 2 * s);
  const note = `Fading: below the ${inVolts(minVolts)} that its driver needs it gives about ${percent(output)} of its light.`;
  return { output, cctKelvin, lifeFactor: null, note };
}

function currentOutput(window: VoltWindow, volts: number, cctKelvin: number): LampOutput {
  if (volts < CURRENT_DARK * window.maxVolts - ROUNDING_VOLTS)
    return unlit(cctKelvin, `Dark: ${inVolts(volts)} are too few for it.`);
  if (volts >= window.minVolts - ROUNDING_VOLTS) return steady(window, volts, cctKelvin);
  const output = volts / window.minVolts;
  const note = `Dim: below the ${inVolts(window.minVolts)} that it is made for it gives about ${percent(output)} of its light.`;
  return { output, cctKelvin, lifeFactor: null, note };
}

/** The rated light, whatever the volts; above the window that costs life, though no one can say how much. */
function steady(window: VoltWindow, volts: number, cctKelvin: number): LampOutput {
  const over = volts > window.maxVolts + ROUNDING_VOLTS;
  const note = over
    ? `Overdriven: no brighter for it, but above the ${inVolts(window.maxVolts)} that it is rated for it may fail early.`
    : null;
  return { output: 1, cctKelvin, lifeFactor: null, note };
}

function filamentOutput(ratedVolts: number, volts: number, ratedKelvin: number): LampOutput {
  const ratio = Math.max(volts, 0) / ratedVolts;
  if (volts < FILAMENT_DARK * ratedVolts - ROUNDING_VOLTS)
    return unlit(ratedKelvin, `Dark: ${inVolts(volts)} are less than half of what it is rated for.`);
  const output = ratio ** FILAMENT_LIGHT_EXPONENT;
  const lifeFactor = ratio ** FILAMENT_LIFE_EXPONENT;
  const cctKelvin = ratedKelvin * ratio ** FILAMENT_COLOUR_EXPONENT;
  return { output, cctKelvin, lifeFactor, note: filamentNote(output, lifeFactor) };
}

function filamentNote(output: number, lifeFactor: number): string | null {
  if (output > 1 + UNSEEN_SHARE)
    return `Overdriven: ${percent(output - 1)} brighter, lamp life ${lifeInWords(lifeFactor)}.`;
  if (output < 1 - UNSEEN_SHARE)
    return `Underdriven: ${percent(1 - output)} dimmer and warmer, lamp life ${lifeInWords(lifeFactor)} on paper; the life of dimmed halogen is unreliable.`;
  return null;
}

const parts: readonly (readonly [share: number, words: string])[] = [
  [0.9, 'about nine tenths'],
  [0.75, 'about three quarters'],
  [2 / 3, 'about two thirds'],
  [0.5, 'about half'],
  [1 / 3, 'about a third'],
  [0.25, 'about a quarter'],
  [0.2, 'about a fifth'],
  [0.1, 'about a tenth'],
];

/** "about a quarter", "about 3.9 times". A rule of thumb to the 13th power deserves no more digits. */
export function lifeInWords(factor: number): string {
  if (factor > 10) return 'more than ten times';
  if (factor >= 0.95) return `about ${factor.toFixed(1)} times`;
  if (factor < 0.075) return 'less than a tenth';
  // The nearest in proportion: 0.22 is nearer to a fifth than 0.28 is to a third.
  const off = (share: number) => Math.abs(Math.log(factor / share));
  return parts.reduce((a, b) => (off(b[0]) < off(a[0]) ? b : a))[1];
}

const percent = (share: number): string => `${Math.round(share * 100)} %`;
const inVolts = (volts: number): string => `${Number(volts.toFixed(1))} V`;
