import type { PlanPoint } from '../plan/index.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { intensityAt } from './beam.js';
import { groundLux, lampsOf } from './illuminance.js';
import type { NightScene } from './night-scene.js';
import { groundUnder, isUnder, isWithin, type LightSpace, middleOf } from './space.js';

/** Lux on level ground at one place. */
export interface LuxSample {
  /** Ground metres. */
  readonly x: number;
  readonly y: number;
  /** Metres along the path from its start; null in an area. */
  readonly alongMeters: number | null;
  readonly lux: number;
}

/** Where and how light on the ground was looked at, and what was found. */
export interface LuxFigures {
  readonly samples: readonly LuxSample[];
  readonly least: LuxSample;
  readonly most: LuxSample;
  readonly meanLux: number;
  /** Least divided by mean, 0 to 1; 0 where all is dark. */
  readonly uniformity: number;
  /** From sample to sample. */
  readonly spacingMeters: number;
  /** How the figures came about where that is not as usual, in sentences. */
  readonly notes: readonly string[];
}

/** At most so many places are looked at; beyond it they lie farther apart, and the figures say so. */
export const MOST_SAMPLES = 4000;
/** Samples to the radius of the smallest pool of light: at least four lie across it. */
const SAMPLES_PER_RADIUS = 2;
const WIDEST_METERS = 1;
const CLOSEST_METERS = 0.05;
/** Ground of fewer samples than this would say little of the mean. */
const LEAST_SAMPLES = 12;
/** The width of a path that nobody gave: common practice for a garden path, no source. */
export const USUAL_PATH_WIDTH_METERS = 1;
/** Light below this, in lux, makes no pool. */
const NO_POOL_LUX = 0.05;
/** Under a lamp that shines all around, lux have fallen to half where cos³ has: at this many times its height. */
const HALF_COSINE_CUBED = Math.sqrt(2 ** (2 / 3) - 1);

/**
 * Light along a path over the ground, given in metres, across its width; null for a path without a length.
 *
 * The spacing follows the light: half of the radius of the smallest pool that reaches the path, so that none is
 * missed, though never more than 1 m. Places under a roof are left out.
 */
export function luxAlong(
  space: LightSpace,
  line: readonly PlanePoint[],
  widthMeters: number = USUAL_PATH_WIDTH_METERS,
): LuxFigures | null {
  const length = lengthOf(line);
  if (!(length > 0)) return null;
  const wanted = spacingFor(space, boxOf(line, widthMeters / 2));
  const count = (spacing: number) => (steps(length, spacing) + 1) * (steps(widthMeters, spacing) + 1);
  const spacing = cappedSpacing(wanted, count);
  const along = steps(length, spacing);
  const across = steps(widthMeters, spacing);
  const places: Omit<LuxSample, 'lux'>[] = [];
  for (let i = 0; i <= along; i++) {
    const alongMeters = (length * i) / along;
    const { x, y, nx, ny } = placeAlong(line, alongMeters);
    for (let j = 0; j <= across; j++) {
      const off = across === 0 ? 0 : widthMeters * (j / across - 0.5);
      places.push({ x: x + nx * off, y: y + ny * off, alongMeters });
    }
  }
  return figuresAt(space, places, spacing, cappedNotes(spacing, wanted));
}

/**
 * Light in an area of ground, its corners in metres; null for one without any area. Sampled on a grid, in the middle
 * of its squares, as closely as {@link luxAlong}.
 */
export function luxWithin(space: LightSpace, corners: readonly PlanePoint[]): LuxFigures | null {
  const { area } = corners.length < 3 ? { area: 0 } : middleOf(corners);
  if (!(area > 0)) return null;
  const box = boxOf(corners, 0);
  const wanted = Math.min(spacingFor(space, box), Math.sqrt(area / LEAST_SAMPLES));
  // Few of the box's squares may lie in a crooked area, so it is the area that counts, and then what was found.
  let spacing = cappedSpacing(wanted, (s) => area / s ** 2);
  let places = placesWithin(corners, box, spacing);
  for (; places.length > MOST_SAMPLES; places = placesWithin(corners, box, spacing)) spacing *= 1.02;
  if (places.length === 0) return null;
  return figuresAt(space, places, spacing, cappedNotes(spacing, wanted));
}

function placesWithin(corners: readonly PlanePoint[], box: Box, spacing: number): Omit<LuxSample, 'lux'>[] {
  const places: Omit<LuxSample, 'lux'>[] = [];
  for (let y = box.minY + spacing / 2; y < box.maxY; y += spacing)
    for (let x = box.minX + spacing / 2; x < box.maxX; x += spacing)
      if (isWithin(corners, { x, y })) places.push({ x, y, alongMeters: null });
  return places;
}

/** {@link luxAlong} or {@link luxWithin} for points of the sheet; null where one of them is not on the ground. */
export function luxOnSheet(
  scene: NightScene,
  space: LightSpace,
  shape:
    | { readonly kind: 'path'; readonly points: readonly PlanPoint[]; readonly widthMeters?: number }
    | { readonly kind: 'area'; readonly points: readonly PlanPoint[] },
): LuxFigures | null {
  const ground = shape.points.map((p) => groundUnder(scene, p));
  if (!ground.every((p) => p !== null)) return null;
  switch (shape.kind) {
    case 'path':
      return luxAlong(space, ground, shape.widthMeters);
    case 'area':
      return luxWithin(space, ground);
  }
}

function figuresAt(
  space: LightSpace,
  places: readonly Omit<LuxSample, 'lux'>[],
  spacingMeters: number,
  notes: string[],
): LuxFigures | null {
  const outdoors = places.filter((p) => !space.roofs.some((roof) => isUnder(roof, { ...p, z: 0 })));
  const first = outdoors[0];
  if (!first) return null;
  const covered = places.length - outdoors.length;
  if (covered > 0)
    notes.push(`${Math.ceil((100 * covered) / places.length)} % of it is under a roof and is left out.`);
  let least = { ...first, lux: Number.POSITIVE_INFINITY };
  let most = { ...first, lux: -1 };
  let sum = 0;
  const samples = outdoors.map((place) => {
    const sample = { ...place, lux: groundLux(space, place.x, place.y) };
    if (sample.lux < least.lux) least = sample;
    if (sample.lux > most.lux) most = sample;
    sum += sample.lux;
    return sample;
  });
  const meanLux = sum / samples.length;
  return {
    samples,
    least,
    most,
    meanLux,
    uniformity: meanLux > 0 ? Math.min(least.lux / meanLux, 1) : 0,
    spacingMeters,
    notes,
  };
}

/** Metres between samples by the smallest pool of light within a box. */
function spacingFor(space: LightSpace, box: Box): number {
  let spacing = WIDEST_METERS;
  for (const { source, beam } of lampsOf(space)) {
    if (!(source.z > 0)) continue;
    const [ax, ay, az] = source.axis;
    // The pool is under the middle of the beam; that of one that points level or up is only its stray light below.
    const pools = [
      { x: source.x, y: source.y, d: source.z, angle: Math.acos(Math.max(Math.min(-az, 1), -1)) },
    ];
    if (az < 0)
      pools.push({
        x: source.x + (ax * source.z) / -az,
        y: source.y + (ay * source.z) / -az,
        d: source.z / -az,
        angle: 0,
      });
    for (const { x, y, d, angle } of pools) {
      const lux = (intensityAt(beam, angle) * source.output * source.quantity * source.z) / d ** 3;
      if (lux < NO_POOL_LUX) continue;
      const cone = beam.halfAngle < Math.PI / 2 ? d * Math.tan(beam.halfAngle) : Number.POSITIVE_INFINITY;
      const radius = Math.min(cone, HALF_COSINE_CUBED * d);
      const reaches =
        x > box.minX - 2 * radius &&
        x < box.maxX + 2 * radius &&
        y > box.minY - 2 * radius &&
        y < box.maxY + 2 * radius;
      if (reaches) spacing = Math.min(spacing, radius / SAMPLES_PER_RADIUS);
    }
  }
  return Math.max(spacing, CLOSEST_METERS);
}

function cappedSpacing(wanted: number, count: (spacing: number) => number): number {
  let spacing = wanted;
  while (count(spacing) > MOST_SAMPLES) spacing *= 1.05;
  return spacing;
}

function cappedNotes(spacing: number, wanted: number): string[] {
  if (spacing === wanted) return [];
  return [
    `Looked at every ${spacing.toFixed(2)} m in place of every ${wanted.toFixed(2)} m, to keep to ${MOST_SAMPLES.toLocaleString('en-US')} places: the brightest or darkest spot may be missed. Measure a shorter path or a smaller area for closer figures.`,
  ];
}

const steps = (length: number, spacing: number): number => Math.ceil(length / spacing - 1e-9);

interface Box {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
}

function boxOf(points: readonly PlanePoint[], margin: number): Box {
  const box = { minX: Infinity, minY: Infinity, maxX: -Infinity, maxY: -Infinity };
  for (const { x, y } of points) {
    box.minX = Math.min(box.minX, x - margin);
    box.minY = Math.min(box.minY, y - margin);
    box.maxX = Math.max(box.maxX, x + margin);
    box.maxY = Math.max(box.maxY, y + margin);
  }
  return box;
}

export function lengthOf(line: readonly PlanePoint[]): number {
  let length = 0;
  line.forEach((p, i) => {
    const q = line[i + 1];
    if (q) length += Math.hypot(q.x - p.x, q.y - p.y);
  });
  return length;
}

/** The place so many metres along a line that has a length, and the unit normal to its left there. */
export function placeAlong(
  line: readonly PlanePoint[],
  meters: number,
): { x: number; y: number; nx: number; ny: number } {
  let left = Math.max(meters, 0);
  let last = { x: line[0]!.x, y: line[0]!.y, nx: 0, ny: 0 };
  for (const [i, p] of line.entries()) {
    const q = line[i + 1];
    const length = q ? Math.hypot(q.x - p.x, q.y - p.y) : 0;
    if (!q || length === 0) continue;
    const [ux, uy] = [(q.x - p.x) / length, (q.y - p.y) / length];
    const t = Math.min(left, length);
    last = { x: p.x + ux * t, y: p.y + uy * t, nx: -uy, ny: ux };
    if (left <= length) return last;
    left -= length;
  }
  return last;
}
