import {
  type AreaRecord,
  cablePoints,
  type FaceRecord,
  itemOf,
  type PlanDocument,
  type PlanPoint,
  type RecordOf,
  recordOf,
  recordsOf,
  type SheetRecord,
  type TreeRecord,
} from '@lampwright/geometry/plan';
import type { RevisionDocument, ShownLight } from '../../modules/proposals/revision-document.js';
import { cableWeight } from './symbols.js';

export interface DrawnLight {
  readonly id: string;
  readonly at: PlanPoint;
  readonly tag: string;
  /** It is not part of what is agreed or offered, but of an addition. */
  readonly offered: boolean;
}

export interface DrawnCable {
  readonly points: readonly PlanPoint[];
  readonly ends: readonly string[];
  readonly name: string;
  readonly weight: number;
}

export interface DrawnNode {
  readonly id: string;
  readonly at: PlanPoint;
  readonly kind: 'transformer' | 'feed' | 'hub' | 'splice';
  readonly tag: string;
  readonly name: string;
}

/** What one sheet of a plan shows. Places in sheet pixels. */
export interface SheetContent {
  readonly sheet: SheetRecord;
  readonly lights: readonly DrawnLight[];
  readonly cables: readonly DrawnCable[];
  readonly nodes: readonly DrawnNode[];
  readonly areas: readonly AreaRecord[];
  readonly walls: readonly FaceRecord[];
  readonly trees: readonly TreeRecord[];
}

/** A name that somebody gave may be too long for a plan: then the letter and number stand on it. */
const LONGEST_TAG = 6;

/** What a light wears on plan and pictures: its tag, or letter and number in place of a long one. */
export function shortTag(plan: PlanDocument, light: ShownLight): string {
  if (Array.from(light.tag).length <= LONGEST_TAG) return light.tag;
  const number = recordOf(plan, light.recordId, 'fixture')?.number;
  return number === undefined ? light.initial : `${light.initial}${number}`;
}

/** The sheets that something stands on, in the order of the plan. */
export function sheetsOf(
  plan: PlanDocument,
  lights: RevisionDocument['lights'],
  taken: ReadonlySet<string>,
): SheetContent[] {
  const sheets = [...recordsOf(plan, 'sheet')].sort((a, b) => a.order - b.order || (a.id < b.id ? -1 : 1));
  return sheets
    .map((sheet) => contentOf(plan, sheet, lights, taken))
    .filter(({ lights, cables, nodes }) => lights.length + cables.length + nodes.length > 0);
}

function contentOf(
  plan: PlanDocument,
  sheet: SheetRecord,
  lights: RevisionDocument['lights'],
  taken: ReadonlySet<string>,
): SheetContent {
  const here = <T extends { readonly sheetId: string }>(record: T) => record.sheetId === sheet.id;
  return {
    sheet,
    lights: lights.filter(here).map((light) => ({
      id: light.recordId,
      at: { x: light.x, y: light.y },
      tag: shortTag(plan, light),
      offered: light.groupId !== null && !taken.has(light.groupId),
    })),
    cables: [...recordsOf(plan, 'cable')].filter(here).flatMap((cable) => {
      const points = cablePoints(plan, cable);
      const item = itemOf(plan, cable.itemId, 'cable');
      if (!points) return [];
      return {
        points,
        ends: [cable.fromId, cable.toId],
        name: item?.name ?? 'Cable',
        weight: item ? cableWeight(item.conductor) : 1,
      };
    }),
    nodes: [
      ...[...recordsOf(plan, 'transformer')].filter(here).map(transformerNode),
      ...[...recordsOf(plan, 'feed')].filter(here).map((feed) => feedNode(plan, feed)),
      ...[...recordsOf(plan, 'junction')].filter(here).map((junction) => junctionNode(plan, junction)),
    ],
    areas: [...recordsOf(plan, 'area')].filter(here),
    walls: [...recordsOf(plan, 'face')].filter(here),
    trees: [...recordsOf(plan, 'tree')].filter(here),
  };
}

const transformerNode = ({ id, at, number, name }: RecordOf<'transformer'>): DrawnNode => ({
  id,
  at,
  kind: 'transformer',
  tag: `T${number}`,
  name,
});

function feedNode(plan: PlanDocument, { id, at, transformerId, name }: RecordOf<'feed'>): DrawnNode {
  const number = recordOf(plan, transformerId, 'transformer')?.number;
  return { id, at, kind: 'feed', tag: number === undefined ? 'T' : `T${number}`, name };
}

function junctionNode(plan: PlanDocument, junction: RecordOf<'junction'>): DrawnNode {
  const { id, at, style, number } = junction;
  const item = itemOf(plan, junction.itemId, 'hub');
  return { id, at, kind: style, tag: style === 'hub' ? `H${number}` : `J${number}`, name: item?.name ?? '' };
}
