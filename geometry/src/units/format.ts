import type { Meters, SquareMeters } from './brand.js';
import { METERS_PER_FOOT, METERS_PER_INCH, type UnitSystem } from './length.js';

export interface LengthFormat {
  readonly system: UnitSystem;
  /** For feet and inches only; metres always show centimetres. Default `inch`. */
  readonly precision?: 'inch' | 'half-inch';
}

/** What stands where there is no number to show. */
const NOTHING = '—';

/** A length for the eye: `42′ 4″`, `6½″`, `12.90 m`. Rounds to the nearest step, and carries into feet. */
export function formatLength(length: Meters, format: LengthFormat): string {
  if (!Number.isFinite(length)) return NOTHING;
  if (format.system === 'metric') return `${metricNumber(length)} m`;
  return imperial(length, format.precision ?? 'inch');
}

/**
 * A length with one standard deviation: `42′ 4″ ± 7″`, `12.90 ± 0.18 m`. The error never shows less than
 * the last digit of the length, since rounding alone hides about that much.
 */
export function formatLengthWithError(length: Meters, sigma: Meters, format: LengthFormat): string {
  if (!Number.isFinite(length)) return NOTHING;
  const step = stepOf(format);
  const shown = (Number.isFinite(sigma) ? Math.max(sigma, step) : sigma) as Meters;
  if (format.system === 'metric') {
    return `${metricNumber(length)} ± ${Number.isFinite(shown) ? metricNumber(shown) : NOTHING} m`;
  }
  return `${formatLength(length, format)} ± ${formatLength(shown, format)}`;
}

/** An area for the eye: `1,234 ft²`, `7.4 ft²`, `114.6 m²`. */
export function formatArea(area: SquareMeters, format: { readonly system: UnitSystem }): string {
  if (!Number.isFinite(area)) return NOTHING;
  const imperialUnits = format.system === 'imperial';
  const value = imperialUnits ? area / METERS_PER_FOOT ** 2 : area;
  const wholeFrom = imperialUnits ? 10 : 1000;
  // Judged as it will be shown, so that 9.96 ft² becomes 10 ft² and not 10.0 ft².
  const digits = Math.round(Math.abs(value) * 10) / 10 < wholeFrom ? 1 : 0;
  const number = value.toLocaleString('en-US', {
    minimumFractionDigits: digits,
    maximumFractionDigits: digits,
  });
  return `${number} ${imperialUnits ? 'ft²' : 'm²'}`;
}

function stepOf(format: LengthFormat): number {
  if (format.system === 'metric') return 0.01;
  return format.precision === 'half-inch' ? METERS_PER_INCH / 2 : METERS_PER_INCH;
}

function metricNumber(length: number): string {
  const text = Math.abs(length).toFixed(2);
  return length < 0 && Number(text) !== 0 ? `−${text}` : text;
}

function imperial(length: number, precision: 'inch' | 'half-inch'): string {
  const halves =
    precision === 'inch'
      ? 2 * Math.round(Math.abs(length) / METERS_PER_INCH)
      : Math.round((2 * Math.abs(length)) / METERS_PER_INCH);
  const sign = length < 0 && halves !== 0 ? '−' : '';
  const feet = Math.floor(halves / 24);
  const rest = halves - 24 * feet;
  const whole = Math.floor(rest / 2);
  const inches = `${whole === 0 && rest % 2 === 1 ? '' : whole}${rest % 2 === 1 ? '½' : ''}″`;
  return feet === 0 ? `${sign}${inches}` : `${sign}${feet}′ ${inches}`;
}
