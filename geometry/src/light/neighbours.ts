import { listed } from '../estimate/index.js';
import { labelOf, type PlanDocument, recordsOf } from '../plan/index.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { intensityAt, lumensOf } from './beam.js';
import { lengthOf, placeAlong } from './grid.js';
import { type Lamp, lampsOf, luxOf } from './illuminance.js';
import type { NightScene } from './night-scene.js';
import { groundUnder, isStopped, isWithin, type LightSpace, type Point3 } from './space.js';
import { type LuxUnit, luxText } from './target.js';

/** Something that neighbours, or the night sky, may mind. Guidance: local rules decide. */
export interface NeighbourCaution {
  readonly kind: 'past-the-lot-line' | 'into-the-sky' | 'cold-light' | 'not-looked-at';
  /** The lamps, most to blame first; for what could not be looked at, the area. */
  readonly recordIds: readonly string[];
  readonly text: string;
  /** Where it is worst, in ground metres; null for what has no one place. */
  readonly at: PlanePoint | null;
}

/** Light past the lot line from here on is told of, in lux: a usual limit of local rules, about 0.1 foot-candle (from memory). */
export const PAST_THE_LINE_LUX = 1;
/** So far beyond the lot line, and so high over the ground there, it is looked for. */
const BEYOND_METERS = 0.5;
const EYE_METERS = 1.5;
/** From place to place along the lot line. */
const ALONG_METERS = 0.5;
const MOST_PLACES = 2000;
/** Lumens into the sky are told of when they are more than these, and than this share of the lamp's light. */
export const SKY_LUMENS = 10;
export const SKY_SHARE = 0.05;
/** Dark-sky ordinance guidance, from memory: 3000 K and below. */
export const COLDEST_KELVIN = 3000;
/** Colour is known no better. */
const KELVIN_ROUNDING = 1;
/** Beyond this, in metres, nothing on the sheet catches light. */
const SKY_METERS = 1000;
/** Directions of a beam: rings about its axis, and places on each. */
const RINGS = 40;
const PLACES_ON_A_RING = 32;

/** Cautions for one sheet with all of its lights on. */
export function neighbourCautions(
  doc: PlanDocument,
  scene: NightScene,
  space: LightSpace,
  unit: LuxUnit = 'lux',
): NeighbourCaution[] {
  return [
    ...lotLineCautions(doc, scene, space, unit),
    ...skyCautions(doc, space),
    ...colourCautions(doc, space),
  ];
}

function nameOf(doc: PlanDocument, id: string): string {
  const record = doc.get(id);
  return record ? labelOf(record, doc) : 'A light';
}

function lotLineCautions(
  doc: PlanDocument,
  scene: NightScene,
  space: LightSpace,
  unit: LuxUnit,
): NeighbourCaution[] {
  const cautions: NeighbourCaution[] = [];
  const worst = new Map<string, { lamp: Lamp; lux: number; at: PlanePoint }>();
  for (const area of recordsOf(doc, 'area')) {
    if (area.sheetId !== scene.sheetId || area.use !== 'lot-line') continue;
    const ground = area.points.map((p) => groundUnder(scene, p));
    if (!ground.every((p) => p !== null)) {
      cautions.push({
        kind: 'not-looked-at',
        recordIds: [area.id],
        text: 'The lot line goes above the horizon of the photo, so light past it can’t be worked out here; draw the whole lot on a plan of the yard.',
        at: null,
      });
      continue;
    }
    for (const { place, outwards } of placesBeyond(ground))
      for (const lamp of lampsOf(space)) {
        const lux = luxOnNeighbour(lamp, place, outwards);
        const known = worst.get(lamp.source.id);
        if (lux >= PAST_THE_LINE_LUX && lux > (known?.lux ?? 0))
          worst.set(lamp.source.id, { lamp, lux, at: place });
      }
  }
  const found = [...worst.values()].sort((a, b) => b.lux - a.lux);
  for (const { lamp, lux, at } of found) {
    const { id, x, y } = lamp.source;
    const away = Math.hypot(at.x - x, at.y - y).toFixed(1);
    cautions.push({
      kind: 'past-the-lot-line',
      recordIds: [id],
      text: `${nameOf(doc, id)} sends ${luxText(lux, unit, PAST_THE_LINE_LUX)} past the lot line, ${away} m from the light and ${BEYOND_METERS} m beyond the line (limits of about ${luxText(PAST_THE_LINE_LUX, unit)} are usual). Turn, lower or shield it; local rules decide.`,
      at,
    });
  }
  return cautions;
}

/** Places just beyond a closed line, and the level way out there. */
function placesBeyond(corners: readonly PlanePoint[]): { place: PlanePoint; outwards: Point3 }[] {
  const line = [...corners, corners[0]!];
  const length = lengthOf(line);
  if (!(length > 0)) return [];
  const count = Math.min(Math.ceil(length / ALONG_METERS), MOST_PLACES);
  return Array.from({ length: count }, (_, i) => {
    const { x, y, nx, ny } = placeAlong(line, ((i + 0.5) * length) / count);
    const left = { x: x + nx * BEYOND_METERS, y: y + ny * BEYOND_METERS };
    return isWithin(corners, left)
      ? {
          place: { x: x - nx * BEYOND_METERS, y: y - ny * BEYOND_METERS },
          outwards: { x: -nx, y: -ny, z: 0 },
        }
      : { place: left, outwards: { x: nx, y: ny, z: 0 } };
  });
}

/** The more of lux on the ground there, and on a window or a face turned to the lot. */
function luxOnNeighbour(lamp: Lamp, place: PlanePoint, outwards: Point3): number {
  const onGround = luxOf(lamp, { ...place, z: 0 }, { x: 0, y: 0, z: 1 });
  const back = { x: -outwards.x, y: -outwards.y, z: 0 };
  return Math.max(onGround, luxOf(lamp, { ...place, z: EYE_METERS }, back));
}

function skyCautions(doc: PlanDocument, space: LightSpace): NeighbourCaution[] {
  const up = lampsOf(space)
    .map((lamp) => ({ id: lamp.source.id, ...lumensIntoTheSky(lamp) }))
    .filter(({ sky, total }) => sky > SKY_LUMENS && sky > SKY_SHARE * total)
    .sort((a, b) => b.sky - a.sky);
  if (up.length === 0) return [];
  const each = up.map(({ id, sky, total }) => `${nameOf(doc, id)} (${round(sky)} of ${round(total)} lm)`);
  const text = `Light goes past everything into the sky from ${enumerated(each)}. Aim at what it is to light, choose a narrower beam or a hood; local rules decide.`;
  return [{ kind: 'into-the-sky', recordIds: up.map(({ id }) => id), text, at: null }];
}

/**
 * Lumens of a lamp, all its quantity at its volts, that go above level and meet neither wall, roof nor crown; and
 * all its lumens. By rings of its beam.
 */
export function lumensIntoTheSky({ source, beam, obstacles }: Lamp): { sky: number; total: number } {
  const gain = source.output * source.quantity;
  const end = Number.isFinite(beam.halfAngle) ? Math.min(Math.PI, beam.halfAngle * 4) : Math.PI;
  const [ax, ay, az] = source.axis;
  // Two directions across the axis.
  const [px, py, pz] = Math.abs(az) > 0.9 ? [1, 0, 0] : [0, 0, 1];
  let [ux, uy, uz] = [ay * pz - az * py, az * px - ax * pz, ax * py - ay * px];
  const u = Math.hypot(ux, uy, uz);
  [ux, uy, uz] = [ux / u, uy / u, uz / u];
  const [vx, vy, vz] = [ay * uz - az * uy, az * ux - ax * uz, ax * uy - ay * ux];
  let sky = 0;
  for (let i = 0; i < RINGS; i++) {
    const angle = ((i + 0.5) * end) / RINGS;
    const [sin, cos] = [Math.sin(angle), Math.cos(angle)];
    const lumens = (intensityAt(beam, angle) * sin * (end / RINGS) * 2 * Math.PI * gain) / PLACES_ON_A_RING;
    for (let j = 0; j < PLACES_ON_A_RING; j++) {
      const turn = (2 * Math.PI * (j + 0.5)) / PLACES_ON_A_RING;
      const [c, s] = [Math.cos(turn) * sin, Math.sin(turn) * sin];
      const dz = az * cos + uz * c + vz * s;
      if (dz <= 0) continue;
      const to = {
        x: source.x + SKY_METERS * (ax * cos + ux * c + vx * s),
        y: source.y + SKY_METERS * (ay * cos + uy * c + vy * s),
        z: source.z + SKY_METERS * dz,
      };
      if (!isStopped(source, to, obstacles)) sky += lumens;
    }
  }
  return { sky, total: lumensOf(beam) * gain };
}

function colourCautions(doc: PlanDocument, space: LightSpace): NeighbourCaution[] {
  const cold = lampsOf(space)
    .map(({ source }) => source)
    .filter(({ cctKelvin }) => cctKelvin > COLDEST_KELVIN + KELVIN_ROUNDING)
    .sort((a, b) => b.cctKelvin - a.cctKelvin);
  if (cold.length === 0) return [];
  const each = cold.map(({ id, cctKelvin }) => `${nameOf(doc, id)} (${Math.round(cctKelvin)} K)`);
  const text = `Colder than ${COLDEST_KELVIN} K: ${enumerated(each)}. Many local rules ask for ${COLDEST_KELVIN} K or warmer at night; they decide.`;
  return [{ kind: 'cold-light', recordIds: cold.map(({ id }) => id), text, at: null }];
}

/** Beyond this many, the rest are counted. */
const NAMED = 6;

const enumerated = (each: readonly string[]): string =>
  each.length <= NAMED
    ? listed(each)
    : listed([...each.slice(0, NAMED - 1), `${each.length - NAMED + 1} others`]);

const round = (lumens: number): number => Number(lumens.toPrecision(2));
