import type { CatalogueItem, FixtureItem, FixtureKind, LampItem, Load } from '../../catalogue/index.js';
import type { Aim, PlanPoint } from '../../plan/index.js';
import type { PlanePoint } from '../../sheet/matrix3.js';
import { axisTo, usualAxis } from '../aiming.js';
import type { LightSource } from '../night-scene.js';
import { type Photometry, photometryOf } from '../photometry.js';
import type { LightSpace, Point3 } from '../space.js';
import { usualMountingHeight } from '../usual.js';

/** An entry of the company's catalogue, ready to be copied onto the plan. */
export interface Offer<I extends CatalogueItem = CatalogueItem> {
  readonly sourceId: string | null;
  readonly item: I;
}

/** A fixture of the catalogue with its lamp, where it takes one. */
export interface Candidate {
  readonly fixture: Offer<FixtureItem>;
  readonly lamp: Offer<LampItem> | null;
  readonly photometry: Photometry;
  readonly heightMeters: number;
  /** "Bullet up-light with LED lamp, 4 W, 36°". */
  readonly name: string;
  readonly watts: number;
}

/** Where a proposed light stands, in ground metres, and what it points at; null: as its kind usually does. */
export interface ProposedLight {
  readonly at: PlanePoint;
  readonly aim: { readonly at: PlanePoint; readonly heightMeters: number } | null;
}

/** Kinds of fixtures that are proposed for each. */
export const proposedKinds = {
  path: ['path', 'bollard'],
  tree: ['up', 'flood'],
  wall: ['wall-wash', 'flood', 'up'],
} as const satisfies Record<string, readonly FixtureKind[]>;

/** What light was worked out where it is wanted. */
export interface ProposedFigures {
  readonly on: 'path' | 'crown' | 'wall';
  readonly meanLux: number;
  /** Of the darkest place; null where that says nothing, as on a crown. */
  readonly leastLux: number | null;
  /** Darkest place divided by the mean, 0 to 1, of a wall along its middle; null on a crown. */
  readonly evenness: number | null;
}

/** Lights to place, all alike. Nothing of it is on the plan until somebody takes it, and all of it can be changed. */
export interface Proposal {
  readonly kind: 'proposal';
  readonly fixture: Offer<FixtureItem>;
  readonly lamp: Offer<LampItem> | null;
  readonly lights: readonly ProposedLight[];
  /** Null where nothing could be worked out, as for a path that is all under a roof. */
  readonly figures: ProposedFigures | null;
  /** Why this item, so many and there. Other lights of the plan are not counted. */
  readonly why: readonly string[];
  /** What falls short of what was asked, in sentences; empty where nothing does. */
  readonly short: readonly string[];
}

/** Nothing that is on offer fits; the sentence says what was looked for. */
export interface NoProposal {
  readonly kind: 'refused';
  readonly message: string;
}

/** Fixtures of these kinds, each with every lamp that goes into it. What gives no light is left out. */
export function candidatesOf(offers: readonly Offer[], kinds: readonly FixtureKind[]): Candidate[] {
  const lamps = offers.filter(isLamp);
  return offers.filter(isFixture).flatMap((fixture) => {
    const { item } = fixture;
    if (!kinds.includes(item.kind)) return [];
    const fitting =
      item.light === 'integrated'
        ? [null]
        : lamps.filter(
            ({ item: lamp }) =>
              lamp.base === item.base && (item.maxWatts === null || wattsOf(lamp.load) <= item.maxWatts),
          );
    return fitting.flatMap((lamp): Candidate[] => {
      const photometry = photometryOf(item, lamp?.item);
      if (!photometry || !(photometry.beam.peakCandela > 0)) return [];
      return [
        {
          fixture,
          lamp,
          photometry,
          heightMeters: item.mountingHeightMeters ?? usualMountingHeight(item.kind),
          name: lamp ? `${item.name} with ${lamp.item.name}` : item.name,
          watts: wattsOf(photometry.light.load),
        },
      ];
    });
  });
}

function isLamp(offer: Offer): offer is Offer<LampItem> {
  return offer.item.category === 'lamp';
}

function isFixture(offer: Offer): offer is Offer<FixtureItem> {
  return offer.item.category === 'fixture';
}

function wattsOf(load: Load): number {
  switch (load.kind) {
    case 'driver':
    case 'filament':
    case 'resistive':
      return load.watts;
    case 'current':
      return load.amps * 12;
    case 'off':
      return 0;
  }
}

/** So many watts more are as bad as twice too bright: of two that suit alike, the thriftier is taken. */
const WATTS_LIKE_TWICE = 20;

/** What the watts of so many lights count against them. */
export const thirst = ({ watts }: Candidate, count: number): number => (watts * count) / WATTS_LIKE_TWICE;

/** The full beam angle of a candidate in degrees. */
export function beamDegreesOf({ photometry }: Candidate): number {
  const { halfAngle } = photometry.beam;
  return Number.isFinite(halfAngle) ? (2 * halfAngle * 180) / Math.PI : 360;
}

/** The proposed lights of a candidate among the walls, roofs and crowns of a space, without any other lights. */
export function spaceOfLights(
  candidate: Candidate,
  lights: readonly ProposedLight[],
  space: LightSpace,
): LightSpace {
  const { item } = candidate.fixture;
  const { peakCandela, halfAngle, shield } = candidate.photometry.beam;
  const sources = lights.map(({ at, aim }, i): LightSource => {
    const lamp: Point3 = { ...at, z: candidate.heightMeters };
    const aimed = aim && axisTo(lamp, { ...aim.at, z: aim.heightMeters });
    return {
      id: `proposed${i}`,
      kind: item.kind,
      ...lamp,
      axis: aimed ?? usualAxis(item.kind, lamp, space.walls),
      peakCandela,
      halfAngle: Number.isFinite(halfAngle) ? halfAngle : null,
      shield,
      quantity: 1,
      output: 1,
      cctKelvin: candidate.photometry.cctKelvin,
      zoneId: '',
      groupId: null,
      treeId: null,
    };
  });
  return { ...space, sources };
}

/** A proposed light as it is placed on a sheet; null where the sheet doesn't show one of its places. */
export function onSheet(
  light: ProposedLight,
  sheetFromGround: (p: PlanePoint) => PlanPoint | null,
): { at: PlanPoint; aim: Aim | null } | null {
  const at = sheetFromGround(light.at);
  if (!at) return null;
  if (!light.aim) return { at, aim: null };
  const target = sheetFromGround(light.aim.at);
  return target && { at, aim: { kind: 'point', at: target, heightMeters: light.aim.heightMeters } };
}

export function proposed(
  { fixture, lamp }: Candidate,
  lights: readonly ProposedLight[],
  figures: ProposedFigures | null,
  why: readonly string[],
  short: readonly string[] = [],
): Proposal {
  return { kind: 'proposal', fixture, lamp, lights, figures, why, short };
}

export const refused = (message: string): NoProposal => ({ kind: 'refused', message });
