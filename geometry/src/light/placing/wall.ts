import type { PlanePoint } from '../../sheet/matrix3.js';
import { formatLength, meters, type UnitSystem } from '../../units/index.js';
import { lengthOf, placeAlong } from '../grid.js';
import { luxAt } from '../illuminance.js';
import type { Crown, LightSpace } from '../space.js';
import { type LuxUnit, luxText } from '../target.js';
import {
  type Candidate,
  candidatesOf,
  type NoProposal,
  type Offer,
  type Proposal,
  type ProposedLight,
  proposed,
  proposedKinds,
  refused,
  spaceOfLights,
  thirst,
} from './proposal.js';

export interface WallToLight {
  /** Along its foot, in ground metres. */
  readonly foot: readonly PlanePoint[];
  readonly heightMeters: number;
  /** A place on the side that is to be lit. */
  readonly front: PlanePoint;
  /** Mean lux that is wanted on the wall; without: as is usual, and much darker does too. */
  readonly wantedLux?: number | null;
  /** So many, whatever light they give; without: as few as light it well. */
  readonly count?: number | null;
}

/** Mean light on a wall, in lux: common practice, no source. */
export const USUAL_WALL_LUX = 30;
// How much darker or brighter than wanted still does, and the least share of the mean along its middle: common practice.
const DARKEST = 1 / 3;
/** The same where somebody asked for so much light: a quarter less is not seen. */
const DARKEST_OF_ASKED = 3 / 4;
const BRIGHTEST = 5;
const LEAST_EVEN = 0.35;
/** Lights closer together than this light a wall no better. */
const CLOSEST_METERS = 0.8;
/** A wash stands a third of the wall's height before it, an up-light close to it, so that it grazes. */
const WASH_SHARE = 1 / 3;
const WASH_METERS = { least: 0.3, most: 2 } as const;
const GRAZE_METERS = 0.3;
/** From place to place along a wall. */
const ALONG_METERS = 0.4;
const MOST_COLUMNS = 60;

/** Lights for a wall: as few as light it evenly and neither too little nor too much. */
export function proposeWall(
  wall: WallToLight,
  offers: readonly Offer[],
  space: LightSpace,
  units: { readonly system: UnitSystem; readonly light: LuxUnit },
): Proposal | NoProposal {
  const length = lengthOf(wall.foot);
  if (!(length > 0)) return refused('The wall has no length yet: mark its foot from one end to the other.');
  const candidates = candidatesOf(offers, proposedKinds.wall);
  if (candidates.length === 0)
    return refused('The catalogue has no wall wash, flood or up-light with a lamp that fits; add one first.');
  const fixed = wall.count ?? null;
  const wanted = wall.wantedLux ?? USUAL_WALL_LUX;
  const bounds = {
    least: wanted * (wall.wantedLux ? DARKEST_OF_ASKED : DARKEST),
    wanted,
    most: wanted * BRIGHTEST,
  };
  const most = Math.max(Math.floor(length / CLOSEST_METERS), 1);
  const planted = space.crowns.filter((crown) => isPlantedAt(wall, length, crown));
  const free = { ...space, crowns: space.crowns.filter((crown) => !planted.includes(crown)) };
  const fitting = candidates.flatMap((candidate) =>
    fixed === null
      ? (fewest(candidate, wall, length, most, free, bounds) ?? [])
      : [tryOut(candidate, wall, length, fixed, free, bounds)],
  );
  const [best] = fitting.sort((a, b) => a.misfit - b.misfit || a.candidate.watts - b.candidate.watts);
  if (!best)
    return refused(
      `${candidates.length === 1 ? `${candidates[0]!.name} doesn’t light` : `None of the ${candidates.length} wall washes, floods and up-lights in the catalogue lights`} this wall evenly with ${luxText(bounds.least, units.light)} to ${luxText(bounds.most, units.light)}, even ${distance(CLOSEST_METERS, units.system)} apart. A wider beam, or a lamp of another strength, might.`,
    );
  const { candidate, lights, lux, even } = best;
  const before = distance(offOf(candidate, wall), units.system);
  const places =
    lights.length === 1
      ? `one light, ${before} before the wall`
      : `${lights.length} lights, ${distance(length / lights.length, units.system)} apart and ${before} before the wall`;
  const why = [
    `${candidate.name}: ${places}.`,
    ...(fixed === null && candidates.length > 1
      ? [
          fitting.length > 1
            ? `Of ${fitting.length} that could do it, it comes nearest to ${luxText(wanted, units.light)} with few lights.`
            : 'It is the only one in the catalogue that can do it.',
        ]
      : []),
  ];
  if (planted.length > 0)
    why.push('Plants by the wall shade a part of it and are lit themselves: the figures are without them.');
  const short = [
    ...(lux < bounds.least || lux > bounds.most
      ? [
          `${luxText(lux, units.light)} is ${lux < bounds.least ? 'little' : 'much'} for this wall: ${luxText(bounds.least, units.light)} to ${luxText(bounds.most, units.light)} is wanted.`,
        ]
      : []),
    ...(even < LEAST_EVEN
      ? [
          `It is uneven: the darkest place along its middle has ${Math.floor(100 * even)} % of the mean; ${Math.round(100 * LEAST_EVEN)} % is wanted.`,
        ]
      : []),
  ];
  return proposed(
    candidate,
    lights,
    { on: 'wall', meanLux: lux, leastLux: best.darkest, evenness: even },
    why,
    short,
  );
}

/** Whether a plant stands where the lights do: its shade falls on the wall wherever they are. */
function isPlantedAt(wall: WallToLight, length: number, { x, y, radiusMeters }: Crown): boolean {
  const pieces = Math.ceil(length / ALONG_METERS);
  for (let i = 0; i <= pieces; i++) {
    const at = placeAlong(wall.foot, (length * i) / pieces);
    if (Math.hypot(at.x - x, at.y - y) < radiusMeters + WASH_METERS.most) return true;
  }
  return false;
}

const distance = (m: number, system: UnitSystem): string => formatLength(meters(m), { system });

function offOf({ fixture }: Candidate, { heightMeters }: WallToLight): number {
  if (fixture.item.kind === 'up') return GRAZE_METERS;
  return Math.min(Math.max(heightMeters * WASH_SHARE, WASH_METERS.least), WASH_METERS.most);
}

/** The fewest of these lights that light the wall well; null where no number does. */
function fewest(
  candidate: Candidate,
  wall: WallToLight,
  length: number,
  most: number,
  space: LightSpace,
  bounds: Bounds,
) {
  for (let count = 1; count <= most; count++) {
    const tried = tryOut(candidate, wall, length, count, space, bounds);
    // More lights only make it brighter.
    if (tried.lux > bounds.most) return null;
    if (tried.lux >= bounds.least && tried.even >= LEAST_EVEN) return tried;
  }
  return null;
}

interface Bounds {
  readonly least: number;
  readonly wanted: number;
  readonly most: number;
}

function tryOut(
  candidate: Candidate,
  wall: WallToLight,
  length: number,
  count: number,
  space: LightSpace,
  { wanted }: Bounds,
) {
  const lights = lightsBefore(candidate, wall, length, count);
  const light = onWall(wall, length, spaceOfLights(candidate, lights, space));
  const misfit =
    Math.abs(Math.log2(Math.max(light.lux, 1e-3) / wanted)) + count / 2 + thirst(candidate, count);
  return { candidate, lights, ...light, misfit };
}

function lightsBefore(
  candidate: Candidate,
  wall: WallToLight,
  length: number,
  count: number,
): ProposedLight[] {
  const off = offOf(candidate, wall);
  const grazing = candidate.fixture.item.kind === 'up';
  return Array.from({ length: count }, (_, i) => {
    const { x, y, nx, ny } = facing(wall, ((i + 0.5) * length) / count);
    return {
      at: { x: x + nx * off, y: y + ny * off },
      aim: { at: { x, y }, heightMeters: wall.heightMeters * (grazing ? 0.8 : 0.5) },
    };
  });
}

/** A place along the foot, with the way out on the side that is to be lit. */
function facing({ foot, front }: WallToLight, along: number): ReturnType<typeof placeAlong> {
  const { x, y, nx, ny } = placeAlong(foot, along);
  const side = (front.x - x) * nx + (front.y - y) * ny < 0 ? -1 : 1;
  return { x, y, nx: nx * side, ny: ny * side };
}

function onWall(
  wall: WallToLight,
  length: number,
  lit: LightSpace,
): { lux: number; even: number; darkest: number } {
  const columns = Math.min(Math.max(Math.ceil(length / ALONG_METERS), 4), MOST_COLUMNS);
  const rows = [0.2, 0.5, 0.8];
  const at = (column: number, row: number): number => {
    const { x, y, nx, ny } = facing(wall, ((column + 0.5) * length) / columns);
    return luxAt(lit, { x, y, z: wall.heightMeters * row }, { x: nx, y: ny, z: 0 });
  };
  let sum = 0;
  for (let i = 0; i < columns; i++) for (const row of rows) sum += at(i, row);
  const middle = Array.from({ length: columns }, (_, i) => at(i, 0.5));
  const mean = middle.reduce((a, b) => a + b, 0) / columns;
  const darkest = Math.min(...middle);
  return {
    lux: sum / (columns * rows.length),
    even: mean > 0 ? darkest / mean : 0,
    darkest,
  };
}
