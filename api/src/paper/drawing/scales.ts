import { formatRatio } from '@lampwright/geometry/units';

/** PDF points in a metre of paper: 72 in an inch. */
export const POINTS_PER_METER = 72 / 0.0254;

export interface DrawingScale {
  /** Metres of ground for a metre of paper. */
  readonly ratio: number;
  /** As a drawing states it. */
  readonly text: string;
}

const imperial = (text: string, ratio: number): DrawingScale => ({
  ratio,
  text: `${text} (${formatRatio(ratio)})`,
});
const metric = (ratio: number): DrawingScale => ({ ratio, text: formatRatio(ratio) });

/** The scales of general drafting, largest first. */
const SCALES: Readonly<Record<'imperial' | 'metric', readonly DrawingScale[]>> = {
  imperial: [
    imperial('1″ = 1′', 12),
    imperial('1/2″ = 1′', 24),
    imperial('3/8″ = 1′', 32),
    imperial('1/4″ = 1′', 48),
    imperial('3/16″ = 1′', 64),
    imperial('1/8″ = 1′', 96),
    imperial('1″ = 10′', 120),
    imperial('1/16″ = 1′', 192),
    imperial('1″ = 20′', 240),
    imperial('1″ = 30′', 360),
    imperial('1″ = 40′', 480),
    imperial('1″ = 50′', 600),
    imperial('1″ = 60′', 720),
    imperial('1″ = 100′', 1200),
    imperial('1″ = 200′', 2400),
    imperial('1″ = 500′', 6000),
    imperial('1″ = 1000′', 12_000),
  ],
  metric: [10, 20, 25, 50, 75, 100, 125, 150, 200, 250, 300, 400, 500, 750, 1000, 2000, 5000, 10_000].map(
    metric,
  ),
};

/** The largest standard scale at which a width and height of ground fit; null where none does. */
export function scaleThatFits(
  units: 'imperial' | 'metric',
  groundMeters: { readonly width: number; readonly height: number },
  points: { readonly width: number; readonly height: number },
): DrawingScale | null {
  const least =
    Math.max(groundMeters.width / points.width, groundMeters.height / points.height) * POINTS_PER_METER;
  // A hair of rounding must not push a plan to the next scale.
  return SCALES[units].find(({ ratio }) => ratio >= least * (1 - 1e-9)) ?? null;
}

export interface ScaleBar {
  readonly lengthMeters: number;
  readonly divisions: number;
  readonly labels: readonly string[];
}

const STEPS = [1, 2, 5];
const FOOT_METERS = 0.3048;

/** A bar of a round length that is between a third of and the whole of the longest one. */
export function scaleBarFor(
  units: 'imperial' | 'metric',
  scale: DrawingScale,
  longestPoints: number,
): ScaleBar {
  const unitMeters = units === 'imperial' ? FOOT_METERS : 1;
  const unit = units === 'imperial' ? 'ft' : 'm';
  const longest = ((longestPoints / POINTS_PER_METER) * scale.ratio) / unitMeters;
  let length = 10 ** Math.floor(Math.log10(longest));
  for (const step of STEPS)
    if (step * 10 ** Math.floor(Math.log10(longest)) <= longest)
      length = step * 10 ** Math.floor(Math.log10(longest));
  const divisions = String(length).startsWith('5') ? 5 : 4;
  const places = Number.isInteger(length / 2) ? 0 : 1;
  return {
    lengthMeters: length * unitMeters,
    divisions,
    labels: ['0', (length / 2).toFixed(places), `${length} ${unit}`],
  };
}
