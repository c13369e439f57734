import type { LightTarget } from '../../plan/index.js';
import type { PlanePoint } from '../../sheet/matrix3.js';
import { formatLength, meters, type UnitSystem } from '../../units/index.js';
import { type LuxFigures, lengthOf, luxAlong, placeAlong } from '../grid.js';
import type { LightSpace } from '../space.js';
import { type LuxUnit, shortOf } from '../target.js';
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
} from './proposal.js';

export interface PathToLight {
  /** The middle of the path, in ground metres. */
  readonly line: readonly PlanePoint[];
  readonly widthMeters: number;
  readonly target: LightTarget;
  readonly arrangement: 'alternating' | 'left' | 'right';
  /** So many, whatever light they give; without: as many as the target takes. */
  readonly count?: number | null;
}

/** Lights stand so far from the path's edge: clear of feet and mowers, common practice. */
const EDGE_METERS = 0.2;
/** Nearer together than this is no path lighting any more; farther apart it falls into separate islands. Common practice. */
const CLOSEST_METERS = 0.6;
const FARTHEST_METERS = 4;
/** Spacing is found to this, in metres. */
const FINE_METERS = 0.05;

/**
 * Path lights along a path: as far apart as beam, height and target allow. Of all that is on offer the one that
 * takes fewest lights, and of these the one that takes fewest watts.
 */
export function proposePath(
  path: PathToLight,
  offers: readonly Offer[],
  space: LightSpace,
  units: { readonly system: UnitSystem; readonly light: LuxUnit },
): Proposal | NoProposal {
  const length = lengthOf(path.line);
  if (!(length > 0)) return refused('The path has no length yet: draw it from its start to its end.');
  const candidates = candidatesOf(offers, proposedKinds.path);
  if (candidates.length === 0)
    return refused('The catalogue has no path light or bollard with a lamp that fits; add one first.');
  const fixed = path.count ?? null;
  const able = candidates.flatMap((candidate) => {
    if (fixed !== null) return [{ candidate, count: fixed }];
    const apart = spacingFor(candidate, path);
    return apart === null ? [] : [{ candidate, count: Math.ceil(length / apart - 1e-9) }];
  });
  able.sort((a, b) => a.count - b.count || a.candidate.watts - b.candidate.watts);
  const light = ({ candidate, count }: (typeof able)[number]) => ({
    candidate,
    ...(fixed === null
      ? settled(candidate, count, path, length, space, units.light)
      : tryOut(candidate, count, path, length, space, units.light)),
  });
  const [first] = able;
  if (!first) {
    const even = `even ${distance(CLOSEST_METERS, units.system)} apart. Ask for less light, or`;
    return refused(
      candidates.length === 1
        ? `${candidates[0]!.name} doesn’t give the light that is wanted, ${even} take a brighter or higher one.`
        : `None of the ${candidates.length} path lights and bollards in the catalogue gives the light that is wanted, ${even} add a brighter or higher one.`,
    );
  }
  // Of so many as are asked for, the first that meets the target, else the one that falls short in least.
  const best =
    fixed === null ? light(first) : able.map(light).sort((a, b) => a.short.length - b.short.length)[0]!;
  const { lights, figures, short } = best;
  const apart = distance(length / lights.length, units.system);
  const side = path.arrangement === 'alternating' ? 'on both sides in turn' : `on the ${path.arrangement}`;
  const places = lights.length === 1 ? 'one light' : `${lights.length} lights, ${apart} apart, ${side}`;
  const why = [
    `${best.candidate.name}: ${places}.`,
    ...(fixed === null && candidates.length > 1
      ? [
          able.length > 1
            ? `Of ${able.length} that could do it, it takes the fewest lights and watts.`
            : 'It is the only one in the catalogue that can do it.',
        ]
      : []),
    ...(figures?.notes ?? []),
  ];
  const given = figures && {
    on: 'path' as const,
    meanLux: figures.meanLux,
    leastLux: figures.least.lux,
    evenness: figures.uniformity,
  };
  return proposed(best.candidate, lights, given, why, short);
}

const distance = (m: number, system: UnitSystem): string => formatLength(meters(m), { system });

/** The farthest apart that these lights meet the target on a long straight path; null where they never do. */
function spacingFor(candidate: Candidate, path: PathToLight): number | null {
  const meets = (apart: number): boolean => {
    // Far enough on both sides that no end shows; two spacings in the middle are one whole rhythm of both sides.
    const line = [
      { x: 0, y: 0 },
      { x: 10 * apart, y: 0 },
    ];
    const lights = lightsAlong({ ...path, line }, 10, 10 * apart);
    const open: LightSpace = { sources: [], walls: [], roofs: [], crowns: [] };
    const middle = [
      { x: 4.5 * apart, y: 0 },
      { x: 6.5 * apart, y: 0 },
    ];
    const figures = luxAlong(spaceOfLights(candidate, lights, open), middle, path.widthMeters);
    return figures !== null && shortOf(figures, path.target).length === 0;
  };
  if (meets(FARTHEST_METERS)) return FARTHEST_METERS;
  if (!meets(CLOSEST_METERS)) return null;
  let [good, bad] = [CLOSEST_METERS, FARTHEST_METERS];
  while (bad - good > FINE_METERS) {
    const apart = (good + bad) / 2;
    if (meets(apart)) good = apart;
    else bad = apart;
  }
  return good;
}

/** The lights on the real path, closer together where its bends, its ends or what stands by it ask for more. */
function settled(
  candidate: Candidate,
  first: number,
  path: PathToLight,
  length: number,
  space: LightSpace,
  unit: LuxUnit,
): { lights: ProposedLight[]; figures: LuxFigures | null; short: string[] } {
  const most = Math.max(first, Math.floor(length / CLOSEST_METERS));
  const tried = (count: number) => tryOut(candidate, count, path, length, space, unit);
  const start = tried(first);
  let now = start;
  for (let count = first; now.short.length > 0 && count < most; ) {
    count = Math.min(Math.max(count + 1, Math.round(count * 1.15)), most);
    now = tried(count);
  }
  // Where no number of lights does it, something shades the path: more of them would be wasted.
  return now.short.length > 0 ? start : now;
}

function tryOut(
  candidate: Candidate,
  count: number,
  path: PathToLight,
  length: number,
  space: LightSpace,
  unit: LuxUnit,
): { lights: ProposedLight[]; figures: LuxFigures | null; short: string[] } {
  const lights = lightsAlong(path, count, length);
  const figures = luxAlong(spaceOfLights(candidate, lights, space), path.line, path.widthMeters);
  return { lights, figures, short: figures ? shortOf(figures, path.target, unit) : [] };
}

function lightsAlong(path: PathToLight, count: number, length: number): ProposedLight[] {
  return Array.from({ length: count }, (_, i) => {
    const { x, y, nx, ny } = placeAlong(path.line, ((i + 0.5) * length) / count);
    const left = path.arrangement === 'left' || (path.arrangement === 'alternating' && i % 2 === 0);
    const off = (path.widthMeters / 2 + EDGE_METERS) * (left ? 1 : -1);
    return { at: { x: x + nx * off, y: y + ny * off }, aim: null };
  });
}
