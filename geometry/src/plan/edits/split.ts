import { type IdSource, newId, nextNumber } from '../build.js';
import type { CableRecord, JunctionRecord, PlanDocument, PlanPoint } from '../records.js';
import { Draft } from './draft.js';
import { cablePoints, cutAt } from './polyline.js';
import { type EditResult, made, missing } from './result.js';

/**
 * Cuts a cable at the place on it nearest to `near` and joins the halves in a buried splice, or in the node
 * given. The first half keeps the cable's id. Bends go to their half; a measured length is divided in
 * proportion to the drawn halves; slack stays with its end and the new ends take the plan's setting; the
 * rise goes with the `to` end (cable climbs at its far end) and splice ohms stay with the `from` end.
 */
export function splitInDraft(
  draft: Draft,
  cable: CableRecord,
  near: PlanPoint,
  node?: { readonly id: string },
): { nodeId: string; halves: [CableRecord, CableRecord]; at: PlanPoint } | undefined {
  const points = cablePoints(draft.plan, cable);
  if (!points) return undefined;
  const cut = cutAt(points, near);
  const nodeId = node?.id ?? putSplice(draft, cable.sheetId, cut.at).id;
  const first = draft.put({
    ...cable,
    toId: nodeId,
    via: cut.before,
    measuredMeters: cable.measuredMeters === null ? null : cable.measuredMeters * cut.share,
    slackToMeters: null,
    riseMeters: 0,
  });
  const second = draft.put({
    ...cable,
    id: draft.ids(),
    fromId: nodeId,
    via: cut.after,
    measuredMeters: cable.measuredMeters === null ? null : cable.measuredMeters * (1 - cut.share),
    slackFromMeters: null,
    extraOhms: 0,
  });
  return { nodeId, halves: [first, second], at: cut.at };
}

export function putSplice(draft: Draft, sheetId: string, at: PlanPoint): JunctionRecord {
  return draft.put({
    kind: 'junction',
    id: draft.ids(),
    sheetId,
    at,
    style: 'splice',
    number: nextNumber(draft.plan, 'junction'),
    name: '',
    itemId: null,
  });
}

/** Cuts a cable in two with a splice between; see `splitInDraft` for what goes where. Selects the splice. */
export function splitCable(
  doc: PlanDocument,
  cableId: string,
  near: PlanPoint,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const cable = draft.of(cableId, 'cable');
  const split = cable && splitInDraft(draft, cable, near);
  if (!split) return missing('cable');
  const notes = cable.measuredMeters === null ? [] : ['The measured length was divided as drawn.'];
  return made(draft, [split.nodeId], notes);
}
