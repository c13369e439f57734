import type { PlanePoint } from '../../sheet/matrix3.js';
import { crownSurface, lampsOf, leavesLux } from '../illuminance.js';
import { lumensIntoTheSky } from '../neighbours.js';
import type { Crown, LightSpace } from '../space.js';
import { type LuxUnit, luxText } from '../target.js';
import {
  beamDegreesOf,
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

export interface TreeToLight {
  readonly crown: Crown;
  /** Where the tree is looked at from, in ground metres; null: from all around. */
  readonly seenFrom: PlanePoint | null;
  /** Mean lux that is wanted on the lit side of the crown: what comes nearest is taken; without: as is usual. */
  readonly wantedLux?: number | null;
  /** So many, whatever light they give; without: as many as the crown takes. */
  readonly count?: number | null;
}

/** Mean light on a crown, in lux: common practice, no source. */
export const USUAL_TREE_LUX = 40;
// How much darker or brighter than wanted still does, and how far a beam may be from filling a crown: common practice.
const DARKEST = 1 / 4;
const BRIGHTEST = 25 / 4;
const NARROWEST = 0.4;
const WIDEST = 2.2;
/** Wider than this, in metres, a crown asks for another light. */
const PER_LIGHT_METERS = 2.5;
const MOST_LIGHTS = 4;
/** Lights stand at least so far from a trunk. */
const FROM_TRUNK_METERS = 0.5;
/** A crown that begins lower than this leaves no room for a light beneath it. */
const ROOM_METERS = 1;
/** Seen from one side, lights stand within so many radians of the way to the viewer. */
const SIDE = Math.PI / 3;

/** Up-lights for a tree: the item whose beam fills its crown and whose light suits it, from the sides it is seen from. */
export function proposeTree(
  tree: TreeToLight,
  offers: readonly Offer[],
  space: LightSpace,
  unit: LuxUnit,
): Proposal | NoProposal {
  const candidates = candidatesOf(offers, proposedKinds.tree);
  if (candidates.length === 0)
    return refused('The catalogue has no up-light or flood with a lamp that fits; add one first.');
  const { crown } = tree;
  const wantedLux = tree.wantedLux ?? USUAL_TREE_LUX;
  const [least, most] = [wantedLux * DARKEST, wantedLux * BRIGHTEST];
  const fixed = tree.count ?? null;
  const usual =
    fixed ?? Math.min(Math.max(Math.ceil((2 * crown.radiusMeters) / PER_LIGHT_METERS), 1), MOST_LIGHTS);
  const wanted = wantedBeam(crown, usual);
  const tried = candidates.flatMap((candidate) =>
    (fixed === null ? [usual, usual + 1] : [fixed]).map((count) =>
      tryOut(candidate, count, tree, { beam: wanted, lux: wantedLux }, space, count - usual),
    ),
  );
  const fitting = tried.filter(
    ({ lux, ratio }) => lux >= least && lux <= most && ratio >= NARROWEST && ratio <= WIDEST,
  );
  const order = (a: { misfit: number }, b: { misfit: number }) => a.misfit - b.misfit;
  const nearest = tried.sort(order)[0]!;
  const best = fitting.sort(order)[0] ?? (fixed === null ? undefined : nearest);
  const asked = `it asks for a beam of about ${Math.round(wanted)}° that gives ${luxText(least, unit)} to ${luxText(most, unit)} on the crown`;
  if (!best) {
    return refused(
      `${candidates.length === 1 ? `${nearest.candidate.name} doesn’t fit` : 'Nothing in the catalogue fits'} this tree: ${asked}. The nearest, ${nearest.candidate.name}, has ${Math.round(beamDegreesOf(nearest.candidate))}° and gives ${luxText(nearest.lux, unit)}.`,
    );
  }
  const { candidate, lights, lux, sky } = best;
  const many = lights.length === 1 ? 'one light' : `${lights.length} lights`;
  const why = [
    `${candidate.name}: ${many}, aimed at the middle of the crown.`,
    `The crown asks for a beam of about ${Math.round(wanted)}°; this one has ${Math.round(beamDegreesOf(candidate))}°.`,
    `About ${Math.round(100 * sky)} % of the light goes past the crown.`,
  ];
  const short = [
    ...(lux < least || lux > most
      ? [
          `${luxText(lux, unit)} is ${lux < least ? 'little' : 'much'} for a tree: ${luxText(least, unit)} to ${luxText(most, unit)} is wanted.`,
        ]
      : []),
    ...(best.ratio < NARROWEST ? ['The beam is too narrow for this crown: it lights a spot of it.'] : []),
    ...(best.ratio > WIDEST ? ['The beam is too wide for this crown: much goes past it.'] : []),
  ];
  return proposed(
    candidate,
    lights,
    { on: 'crown', meanLux: lux, leastLux: null, evenness: null },
    why,
    short,
  );
}

/** The full angle, in degrees, that the crown fills as seen from one of so many lights. */
function wantedBeam(crown: Crown, count: number): number {
  const away = Math.hypot(distanceFrom(crown), crown.z);
  // Several lights share the width.
  const half = Math.max(crown.radiusMeters * (count > 1 ? 0.75 : 1), crown.halfHeightMeters * 0.75);
  return (2 * Math.atan(half / away) * 180) / Math.PI;
}

function distanceFrom(crown: Crown): number {
  const low = crown.z - crown.halfHeightMeters < ROOM_METERS;
  return low ? crown.radiusMeters + FROM_TRUNK_METERS : Math.max(crown.radiusMeters / 2, FROM_TRUNK_METERS);
}

function tryOut(
  candidate: Candidate,
  count: number,
  tree: TreeToLight,
  wanted: { readonly beam: number; readonly lux: number },
  space: LightSpace,
  extra: number,
) {
  const { crown, seenFrom } = tree;
  const lights = lightsAround(crown, count, seenFrom);
  const lit = spaceOfLights(candidate, lights, space);
  const lux = meanOnCrown(crown, seenFrom, lit);
  const lamps = lampsOf(lit).map(lumensIntoTheSky);
  const sky =
    lamps.reduce((sum, lamp) => sum + lamp.sky, 0) / lamps.reduce((sum, lamp) => sum + lamp.total, 0);
  const ratio = beamDegreesOf(candidate) / wanted.beam;
  // Twice too bright or too wide is as bad as half; light that misses, lights more than usual and their watts count beside it.
  const misfit =
    Math.abs(Math.log2(Math.max(lux, 1e-3) / wanted.lux)) +
    Math.abs(Math.log2(ratio)) +
    2 * sky +
    extra +
    thirst(candidate, count);
  return { candidate, lights, lux, sky, ratio, misfit };
}

function lightsAround(crown: Crown, count: number, seenFrom: PlanePoint | null): ProposedLight[] {
  const away = distanceFrom(crown);
  const towards = seenFrom ? Math.atan2(seenFrom.y - crown.y, seenFrom.x - crown.x) : -Math.PI / 2;
  return Array.from({ length: count }, (_, i) => {
    const turn = seenFrom
      ? towards + (count === 1 ? 0 : SIDE * ((2 * i) / (count - 1) - 1))
      : towards + (2 * Math.PI * i) / count;
    return {
      at: { x: crown.x + away * Math.cos(turn), y: crown.y + away * Math.sin(turn) },
      aim: { at: { x: crown.x, y: crown.y }, heightMeters: crown.z },
    };
  });
}

/** Mean lux on the leaves of the crown's surface but its top, on the side that is seen. */
function meanOnCrown(crown: Crown, seenFrom: PlanePoint | null, lit: LightSpace): number {
  const towards = seenFrom ? Math.atan2(seenFrom.y - crown.y, seenFrom.x - crown.x) : 0;
  const reach = seenFrom ? Math.PI / 2 : Math.PI;
  let sum = 0;
  let count = 0;
  for (let elevation = -75; elevation <= 30; elevation += 15)
    for (let i = 0; i < 12; i++) {
      const azimuth = towards + reach * ((2 * (i + 0.5)) / 12 - 1);
      const { point, normal } = crownSurface(crown, azimuth, (elevation * Math.PI) / 180);
      // Rings near the pole are short.
      const weight = Math.cos((elevation * Math.PI) / 180);
      sum += weight * leavesLux(lit, point, normal);
      count += weight;
    }
  return sum / count;
}
