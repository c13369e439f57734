import type { SheetEvening } from './sheet-evening';
import type { EveningZone } from './zones';

/** Colours of the sky along the line: paper's chalk by day, dusk by night. */
const DAY = [237, 230, 216] as const;
const NIGHT = [43, 58, 85] as const;
/** The line is all night where the sun is this much down. */
const NIGHT_DEGREES = -11;
const EVERY_MINUTES = 10;

/** Half of the thumb, which stays within the line. */
export const THUMB_RADIUS_PX = 15;

/** Where on the line a minute is, as a CSS length: the thumb’s middle does not reach the ends. */
export function placeOf({ minutes }: Pick<SheetEvening, 'minutes'>, minute: number): string {
  const share = Math.min(1, Math.max(0, minute / minutes));
  const px = THUMB_RADIUS_PX * (1 - 2 * share);
  return `calc(${(share * 100).toFixed(2)}% + ${px.toFixed(2)}px)`;
}

/** How the sky darkens along the line, as a CSS gradient. */
export function skyGradient(evening: Pick<SheetEvening, 'minutes' | 'at'>): string {
  const stops: string[] = [];
  for (let minute = 0; minute <= evening.minutes; minute += EVERY_MINUTES) {
    const night = Math.min(1, Math.max(0, evening.at(minute).sunDegrees / NIGHT_DEGREES));
    const [r, g, b] = DAY.map((day, i) => Math.round(day + (NIGHT[i]! - day) * night));
    stops.push(`rgb(${r} ${g} ${b}) ${placeOf(evening, minute)}`);
  }
  return `linear-gradient(to right, ${stops.join(', ')})`;
}

/** Where lights are on, as a CSS gradient with a sharp edge at each switching. */
export function lightsGradient(
  evening: Pick<SheetEvening, 'minutes'>,
  zones: readonly Pick<EveningZone, 'stretch'>[],
): string {
  const stops = joined(zones.flatMap(({ stretch }) => stretch ?? [])).flatMap(({ on, off }) => {
    const [from, to] = [placeOf(evening, on), placeOf(evening, off)];
    return [`transparent ${from}`, `var(--lamp) ${from}`, `var(--lamp) ${to}`, `transparent ${to}`];
  });
  return stops.length === 0 ? 'none' : `linear-gradient(to right, ${stops.join(', ')})`;
}

/** Stretches that meet or overlap made one. */
function joined(stretches: readonly { on: number; off: number }[]): { on: number; off: number }[] {
  const whole: { on: number; off: number }[] = [];
  for (const { on, off } of [...stretches].sort((a, b) => a.on - b.on)) {
    const last = whole[whole.length - 1];
    if (last && on <= last.off) last.off = Math.max(last.off, off);
    else whole.push({ on, off });
  }
  return whole;
}
