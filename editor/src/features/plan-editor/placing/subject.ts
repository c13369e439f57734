import { scaleOfSheet, sheetPoint } from '@lampwright/geometry/estimate';
import {
  candidatesOf,
  isWithin,
  lengthOf,
  middleOf,
  type Offer,
  placeAlong,
  proposedKinds,
  sceneWithNotes,
  USUAL_PATH_WIDTH_METERS,
  usualTargets,
} from '@lampwright/geometry/light';
import {
  type FaceRecord,
  type LightTarget,
  type MeasurementRecord,
  type PlanDocument,
  type PlanPoint,
  recordOf,
  recordsOf,
  type SheetRecord,
  type TreeRecord,
} from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { CatalogueEntry } from '../page/items';
import { groundOf } from '../page/lengths';
import { cameraOf } from '../tools/uprights';
import type { ProposalAsk, ToLight } from './work';

/** What lights can be proposed for. */
export type Lightable = FaceRecord | MeasurementRecord | TreeRecord;

export function lightableOf(doc: PlanDocument, id: string | null): Lightable | undefined {
  return recordOf(doc, id, 'face') ?? recordOf(doc, id, 'tree') ?? recordOf(doc, id, 'measurement');
}

/** Its word, and the kind of proposal that it asks for. */
export function kindOf(record: Lightable): keyof typeof proposedKinds {
  switch (record.kind) {
    case 'face':
      return 'wall';
    case 'tree':
      return 'tree';
    case 'measurement':
      return 'path';
  }
}

/** What a person wants of the lights; what does not concern their kind is left alone. */
export interface Wish {
  /** Of a path. */
  readonly target: LightTarget | null;
  readonly widthMeters: number;
  readonly arrangement: 'alternating' | 'left' | 'right';
  /** Of a tree or a wall; null: as is usual. */
  readonly wantedLux: number | null;
  /** Of a wall. */
  readonly side: 'front' | 'back';
  /** Where a tree is looked at from. */
  readonly seenFrom: SeenFrom;
  /** The candidate that was chosen; null: the one that fits best. */
  readonly candidateKey: string | null;
  /** Null: as many as it takes. */
  readonly count: number | null;
}

export type SeenFrom = 'viewer' | 'house' | 'around';

/** What is wanted before anybody has said anything. */
export function firstWish(doc: PlanDocument, record: Lightable): Wish {
  const target = record.kind === 'measurement' ? record.lightTarget : null;
  return {
    target: target ?? usualTargets[0]!.target,
    widthMeters: USUAL_PATH_WIDTH_METERS,
    arrangement: 'alternating',
    wantedLux: null,
    side: 'front',
    seenFrom: recordOf(doc, record.sheetId, 'sheet')?.view === 'photo' ? 'viewer' : 'around',
    candidateKey: null,
    count: null,
  };
}

export const offersOf = (entries: readonly CatalogueEntry[]): Offer[] =>
  entries.map(({ id, item }) => ({ sourceId: id, item }));

export const keyOf = ({ fixture, lamp }: { fixture: Offer; lamp: Offer | null }): string =>
  `${fixture.sourceId} ${lamp?.sourceId ?? ''}`;

/** What of the catalogue could light it. */
export function choicesFor(record: Lightable, offers: readonly Offer[]): { key: string; name: string }[] {
  return candidatesOf(offers, proposedKinds[kindOf(record)])
    .map((candidate) => ({ key: keyOf(candidate), name: candidate.name }))
    .sort((a, b) => a.name.localeCompare(b.name));
}

export type Asking =
  | { readonly is: 'ask'; readonly ask: ProposalAsk; readonly scale: SolvedScale }
  /** Nothing can be asked before the sheet has a scale. */
  | { readonly is: 'no-scale' }
  | { readonly is: 'impossible'; readonly message: string };

/** What to ask for lights on this; or why that can't be. */
export function askingFor(
  doc: PlanDocument,
  record: Lightable,
  wish: Wish,
  allOffers: readonly Offer[],
  units: ProposalAsk['units'],
): Asking {
  const sheet = recordOf(doc, record.sheetId, 'sheet');
  const solved = sheet && scaleOfSheet(sheet);
  const made = sceneWithNotes(doc, record.sheetId, new Map());
  if (!sheet || !solved?.ok || made === null) return { is: 'no-scale' };
  const { scale } = solved;
  const toLight = toLightOf(doc, record, sheet, scale, wish);
  if (toLight === null)
    return {
      is: 'impossible',
      message: 'Part of it is above the horizon of this photo, where there is no ground to stand lights on.',
    };
  const offers =
    wish.candidateKey === null
      ? allOffers
      : candidatesOf(allOffers, proposedKinds[kindOf(record)])
          .filter((candidate) => keyOf(candidate) === wish.candidateKey)
          .flatMap(({ fixture, lamp }) => (lamp === null ? [fixture] : [fixture, lamp]));
  const scene = { ...made.scene, sources: [], zones: [] };
  return { is: 'ask', ask: { toLight, offers, scene, units }, scale };
}

function toLightOf(
  doc: PlanDocument,
  record: Lightable,
  sheet: SheetRecord,
  scale: SolvedScale,
  wish: Wish,
): ToLight | null {
  const { count, wantedLux } = wish;
  switch (record.kind) {
    case 'measurement': {
      const line = groundOf(scale, record.points);
      const target = wish.target ?? { leastLux: null, meanLux: null, uniformity: null };
      const { widthMeters, arrangement } = wish;
      return line && { kind: 'path', line, widthMeters, target, arrangement, count };
    }
    case 'tree': {
      const seenFrom = seenFromOf(doc, record, sheet, scale, wish.seenFrom);
      return { kind: 'tree', treeId: record.id, seenFrom, wantedLux, count };
    }
    case 'face': {
      const foot = groundOf(scale, record.foot);
      if (foot === null) return null;
      const front = frontOf(doc, record, sheet, scale, foot, wish.side);
      return { kind: 'wall', foot, heightMeters: record.heightMeters, front, wantedLux, count };
    }
  }
}

interface Place {
  readonly x: number;
  readonly y: number;
}

/** Where whoever looks at a photo stands, as far as it tells; what is lower in it is nearer. */
function viewer(sheet: SheetRecord, scale: SolvedScale, at: PlanPoint): Place | null {
  if (sheet.view !== 'photo') return null;
  const eye = cameraOf(sheet, scale)?.eye;
  if (eye) return eye;
  const here = scale.groundFromSheet(sheetPoint(at));
  const nearer = scale.groundFromSheet(sheetPoint({ x: at.x, y: at.y + 1 }));
  if (here === null || nearer === null) return null;
  // A direction is all that is known: the viewer is taken as far along it.
  const far = 1000;
  return { x: here.x + far * (nearer.x - here.x), y: here.y + far * (nearer.y - here.y) };
}

/** The buildings of a sheet in ground metres. */
function housesOf(doc: PlanDocument, sheetId: string, scale: SolvedScale): (readonly Place[])[] {
  return [...recordsOf(doc, 'area')]
    .filter(({ use, sheetId: on }) => use === 'building' && on === sheetId)
    .flatMap(({ points }) => {
      const ground = groundOf(scale, points);
      return ground === null ? [] : [ground];
    });
}

/** The middle of the building that is nearest to a place; null where none is marked. */
function houseNear(houses: readonly (readonly Place[])[], at: Place): Place | null {
  const middles = houses.map(middleOf);
  const away = (p: Place) => Math.hypot(p.x - at.x, p.y - at.y);
  return middles.sort((a, b) => away(a) - away(b))[0] ?? null;
}

/** Whether a house is marked that a tree on this sheet could be looked at from. */
export function hasHouse(doc: PlanDocument, sheetId: string): boolean {
  return [...recordsOf(doc, 'area')].some(({ use, sheetId: on }) => use === 'building' && on === sheetId);
}

function seenFromOf(
  doc: PlanDocument,
  tree: TreeRecord,
  sheet: SheetRecord,
  scale: SolvedScale,
  from: SeenFrom,
): Place | null {
  switch (from) {
    case 'around':
      return null;
    case 'viewer':
      return viewer(sheet, scale, tree.foot);
    case 'house': {
      const foot = scale.groundFromSheet(sheetPoint(tree.foot));
      return foot && houseNear(housesOf(doc, sheet.id, scale), foot);
    }
  }
}

/** Far enough off a wall to tell its sides, in metres. */
const ASIDE_METERS = 0.5;

/** A place on the side of a wall that is seen: outside of its house, or towards the viewer or a house; or on the other. */
function frontOf(
  doc: PlanDocument,
  face: FaceRecord,
  sheet: SheetRecord,
  scale: SolvedScale,
  foot: readonly Place[],
  side: Wish['side'],
): Place {
  const { x, y, nx, ny } = placeAlong(foot, lengthOf(foot) / 2);
  const aside = (sign: number): Place => ({
    x: x + sign * ASIDE_METERS * nx,
    y: y + sign * ASIDE_METERS * ny,
  });
  const houses = housesOf(doc, sheet.id, scale);
  const indoors = (sign: number) => houses.some((house) => isWithin(house, aside(sign)));
  const towards = viewer(sheet, scale, face.foot[0]!) ?? houseNear(houses, { x, y });
  const seen = towards !== null && (towards.x - x) * nx + (towards.y - y) * ny < 0 ? -1 : 1;
  const front = indoors(1) === indoors(-1) ? seen : indoors(1) ? -1 : 1;
  return aside(side === 'front' ? front : -front);
}
