import { type NightScene, nightSceneOf } from '@lampwright/geometry/light';
import { frozenPlan } from './frozen-plan.js';
import { picturedSheets } from './pictures.js';
import type { RevisionRow } from './proposals.repository.js';
import type { RevisionDocument } from './revision-document.js';

/**
 * What the night pictures of a revision are made from: a scene for each sheet that has a picture and a scale, the
 * one to be seen first leading. From the frozen document alone: lamps at the volts that were estimated for it,
 * switched with the groups that it offers.
 */
export function nightScenesOf(
  row: Pick<RevisionRow, 'pictures'>,
  document: Pick<RevisionDocument, 'plan' | 'sheets' | 'lights'>,
): NightScene[] {
  const pictured = picturedSheets(row, document);
  if (pictured.length === 0) return [];
  const plan = frozenPlan(document);
  const volts = new Map(
    document.lights.flatMap(({ recordId, technical }) =>
      technical.volts === null ? [] : [[recordId, technical.volts] as const],
    ),
  );
  const groups = new Map(document.lights.map(({ recordId, groupId }) => [recordId, groupId]));
  return pictured.flatMap(({ id }) => nightSceneOf(plan, id, volts, groups) ?? []);
}
