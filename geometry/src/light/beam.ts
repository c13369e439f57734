/**
 * Light of one lamp in all directions, as a bell about its axis: I(θ) = I₀ · exp(−ln 2 · (θ/h)²), which is half
 * of its peak at h, half of the beam angle. A beam of 360° is the same in all directions.
 */
export interface Beam {
  readonly peakCandela: number;
  /** Radians from the axis at which the light has fallen to half of its peak; Infinity: the same all around. */
  readonly halfAngle: number;
  /** Share of the light outside of the beam angle that a hood, shield or louvre holds back, 0 to 1. */
  readonly shield: number;
}

/** Beyond the beam angle the shield bites over this share of the half angle, as a hood's edge is soft. */
const SHIELD_EDGE = 0.35;
/** Even, for Simpson's rule; more changes no digit that is shown. */
const FLUX_STEPS = 512;

/** Candela at so many radians from the axis. */
export function intensityAt({ peakCandela, halfAngle, shield }: Beam, angle: number): number {
  if (halfAngle === Number.POSITIVE_INFINITY) return peakCandela;
  const t = angle / halfAngle;
  return peakCandela * Math.exp(-Math.LN2 * t * t) * passing(shield, t);
}

/** Share that the shield lets through, so many half angles from the axis. */
function passing(shield: number, t: number): number {
  if (shield === 0 || t <= 1) return 1;
  const s = Math.min((t - 1) / SHIELD_EDGE, 1);
  return 1 - shield * s * s * (3 - 2 * s);
}

/** Lumens of a beam: its candela over the whole sphere, Φ = 2π ∫ I(θ) sin θ dθ, by Simpson's rule. */
export function lumensOf(beam: Beam): number {
  if (beam.halfAngle === Number.POSITIVE_INFINITY) return 4 * Math.PI * beam.peakCandela;
  const { halfAngle, shield } = beam;
  const key = `${halfAngle} ${shield}`;
  let flux = fluxes.get(key);
  if (flux === undefined) {
    flux = fluxOfOneCandela({ peakCandela: 1, halfAngle, shield });
    if (fluxes.size >= MOST_FLUXES) fluxes.clear();
    fluxes.set(key, flux);
  }
  return beam.peakCandela * flux;
}

/** Lumens to a candela of shapes of beams: lamps of a yard have few, and are asked for all of them time and again. */
const fluxes = new Map<string, number>();
const MOST_FLUXES = 500;

function fluxOfOneCandela(beam: Beam): number {
  // The bell is narrow beside the sphere for spots: no steps are spent where there is no light.
  const end = Math.min(Math.PI, beam.halfAngle * 7);
  const step = end / FLUX_STEPS;
  let sum = 0;
  for (let i = 0; i <= FLUX_STEPS; i++) {
    const weight = i === 0 || i === FLUX_STEPS ? 1 : i % 2 === 1 ? 4 : 2;
    sum += weight * intensityAt(beam, i * step) * Math.sin(i * step);
  }
  return (2 * Math.PI * sum * step) / 3;
}

/** The half angle, in radians, of a beam angle in degrees. */
export const halfAngleOf = (beamDegrees: number): number =>
  beamDegrees >= 360 ? Number.POSITIVE_INFINITY : (beamDegrees / 2) * (Math.PI / 180);

/**
 * The beam of a lamp that gives so many lumens before any shield: the peak follows from the bell's own flux. A
 * shield takes away light; it does not make the rest brighter.
 */
export function beamFromLumens(lumens: number, beamDegrees: number, shield = 0): Beam {
  const halfAngle = halfAngleOf(beamDegrees);
  const perCandela = lumensOf({ peakCandela: 1, halfAngle, shield: 0 });
  return { peakCandela: lumens / perCandela, halfAngle, shield };
}
