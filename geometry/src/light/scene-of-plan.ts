import { scaleOfSheet } from '../estimate/index.js';
import {
  type FixtureRecord,
  itemOf,
  labelOf,
  type PlanDocument,
  type PlanPoint,
  recordOf,
  recordsOf,
  type SheetRecord,
} from '../plan/index.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { axisOf } from './aiming.js';
import type { LightSource, NightScene } from './night-scene.js';
import { lampOutput } from './output.js';
import { photometryOf } from './photometry.js';
import { type Crown, groundUnder, type LightSpace, middleOf, spaceOf } from './space.js';
import { standingPlace } from './standing.js';
import {
  USUAL_BUILDING_METERS,
  USUAL_CROWN_BASE,
  USUAL_TREE_METERS,
  USUAL_WHITE_LUX,
  usualMountingHeight,
} from './usual.js';
import { controlZonesOf } from './zones.js';

/** Something to know about a night picture: what was assumed, what gives no light or other than its rated light. */
export interface NightNote {
  /** The record that it is about. */
  readonly recordId: string;
  /** `unlit`: not in the picture. `volts`: not as rated, for its volts. `assumed`: the plan doesn't say. */
  readonly kind: 'unlit' | 'volts' | 'assumed';
  readonly text: string;
}

/**
 * The light of one sheet, to work out and to draw from. `volts` are those of the estimate by fixture; a fixture
 * that it doesn't know is shown as at its rated volts. `groups` are those that fixtures are offered in; null is
 * always in. Null where there is no such sheet or it has no scale.
 */
export function nightSceneOf(
  doc: PlanDocument,
  sheetId: string,
  volts: ReadonlyMap<string, number>,
  groups?: ReadonlyMap<string, string | null>,
): NightScene | null {
  return sceneWithNotes(doc, sheetId, volts, groups)?.scene ?? null;
}

/** What to know about the night picture of a sheet, in the order of the plan; nothing where it has no picture. */
export function nightNotesOf(
  doc: PlanDocument,
  sheetId: string,
  volts: ReadonlyMap<string, number>,
): NightNote[] {
  return sceneWithNotes(doc, sheetId, volts)?.notes ?? [];
}

/** {@link nightSceneOf} and {@link nightNotesOf} at once. */
export function sceneWithNotes(
  doc: PlanDocument,
  sheetId: string,
  volts: ReadonlyMap<string, number>,
  groups?: ReadonlyMap<string, string | null>,
): { scene: NightScene; notes: NightNote[] } | null {
  const sheet = recordOf(doc, sheetId, 'sheet');
  const scale = sheet && scaleOfSheet(sheet);
  if (!sheet || !scale?.ok) return null;
  const notes: NightNote[] = [];
  const bare: NightScene = {
    sheetId,
    view: sheet.view,
    widthPx: sheet.widthPx,
    heightPx: sheet.heightPx,
    groundMatrix: [...scale.scale.groundMatrix],
    whiteLux: sheet.whiteLux ?? USUAL_WHITE_LUX,
    sources: [],
    ...marksOf(doc, sheet, notes),
    zones: [],
  };
  const space = spaceOf(bare);
  const { zones, zoneOf } = controlZonesOf(doc);
  const sources: LightSource[] = [];
  for (const fixture of recordsOf(doc, 'fixture')) {
    if (fixture.sheetId !== sheetId) continue;
    const source = sourceOf(doc, fixture, bare, space, volts.get(fixture.id) ?? null, notes);
    if (!source) continue;
    const zoneId = zoneOf.get(fixture.id)!;
    sources.push({ ...source, zoneId, groupId: groups?.get(fixture.id) ?? null });
  }
  const used = new Set(sources.map(({ zoneId }) => zoneId));
  return { scene: { ...bare, sources, zones: zones.filter(({ id }) => used.has(id)) }, notes };
}

/** What stops and catches light on the sheet. */
function marksOf(
  doc: PlanDocument,
  sheet: SheetRecord,
  notes: NightNote[],
): Pick<NightScene, 'faces' | 'trees' | 'buildings'> {
  const faces: NightScene['faces'] = [];
  const trees: NightScene['trees'] = [];
  const buildings: NightScene['buildings'] = [];
  const assumed = (recordId: string, text: string) => notes.push({ recordId, kind: 'assumed', text });
  for (const record of doc.values()) {
    if (!('sheetId' in record) || record.sheetId !== sheet.id) continue;
    switch (record.kind) {
      case 'face': {
        const { id, foot, top, heightMeters } = record;
        faces.push({ id, foot, top, heightMeters });
        break;
      }
      case 'tree': {
        const { id, foot, outline, heightMeters, crownBaseMeters } = record;
        trees.push({ id, foot, outline, heightMeters, crownBaseMeters });
        break;
      }
      case 'area': {
        const { id, use, points } = record;
        // Heights of 0 are those of people who had none to give.
        const given = record.heightMeters || null;
        if (use === 'building') {
          if (given === null)
            assumed(id, `No height is set for ${labelOf(record, doc)}: taken as ${USUAL_BUILDING_METERS} m.`);
          buildings.push({ id, points, heightMeters: given ?? USUAL_BUILDING_METERS });
        } else if (use === 'canopy' && sheet.view === 'plan') {
          if (given === null)
            assumed(id, `No height is set for ${labelOf(record, doc)}: taken as ${USUAL_TREE_METERS} m.`);
          const heightMeters = given ?? USUAL_TREE_METERS;
          const { x, y } = middleOf(points);
          trees.push({
            id,
            foot: { x, y },
            outline: points,
            heightMeters,
            crownBaseMeters: heightMeters * USUAL_CROWN_BASE,
          });
        }
        break;
      }
      case 'transformer':
      case 'feed':
      case 'fixture':
      case 'junction':
      case 'cable':
      case 'measurement':
      case 'note':
        break;
    }
  }
  return { faces, trees, buildings };
}

/** The light of one fixture; undefined, with a note, where it gives none that could be shown. */
function sourceOf(
  doc: PlanDocument,
  fixture: FixtureRecord,
  scene: NightScene,
  space: LightSpace,
  volts: number | null,
  notes: NightNote[],
): Omit<LightSource, 'zoneId' | 'groupId'> | undefined {
  const label = labelOf(fixture, doc);
  const say = (kind: NightNote['kind'], text: string) => notes.push({ recordId: fixture.id, kind, text });
  const item = itemOf(doc, fixture.itemId, 'fixture');
  const photometry = item && photometryOf(item, itemOf(doc, fixture.lampId, 'lamp'));
  if (!item || !photometry) {
    say('unlit', `${label} has no lamp yet, so it gives no light.`);
    return undefined;
  }
  const under = (p: PlanPoint): PlanePoint | null => groundUnder(scene, p);
  const place = standingPlace(fixture.at, under, space);
  if (!place) {
    say('unlit', `${label} is marked above the horizon, where there is no ground to stand on.`);
    return undefined;
  }
  if (photometry.assumed.length > 0)
    say('assumed', `The catalogue doesn’t say all of ${label}: taken ${photometry.assumed.join(', ')}.`);
  const tree = item.kind === 'down' ? treeOver(place, space.crowns) : undefined;
  const height = fixture.mountingHeightMeters ?? item.mountingHeightMeters ?? usualMountingHeight(item.kind);
  const lamp = { ...place, z: height };
  const { load, window } = photometry.light;
  const { output, cctKelvin, note } = lampOutput(load, window, volts, photometry.cctKelvin);
  if (note) say('volts', `${label}: ${note}`);
  const { peakCandela, halfAngle, shield } = photometry.beam;
  return {
    id: fixture.id,
    kind: item.kind,
    ...lamp,
    axis: axisOf({ kind: item.kind, aim: fixture.aim, lamp, at: fixture.at, groundUnder: under, space }),
    peakCandela,
    halfAngle: Number.isFinite(halfAngle) ? halfAngle : null,
    shield,
    quantity: fixture.quantity,
    output,
    cctKelvin,
    treeId: tree?.id ?? null,
  };
}

/** The tree whose crown is over a place; of several, the one whose middle is nearest. */
function treeOver(place: PlanePoint, crowns: readonly Crown[]): Crown | undefined {
  const away = (crown: Crown) => Math.hypot(place.x - crown.x, place.y - crown.y);
  return crowns.filter((crown) => away(crown) <= crown.radiusMeters).sort((a, b) => away(a) - away(b))[0];
}
