import { type IdSource, isNode, labelOf, type NodeRecord, newId, recordsOf } from '../build.js';
import { referencesOf } from '../integrity.js';
import type { CableRecord, PlanDocument } from '../records.js';
import { Draft } from './draft.js';
import { cablesAt, canMerge, capEnd, healSplice, joinsSources, mergeThrough } from './heal.js';
import { assignRuns } from './network.js';
import { type EditResult, made, refuse } from './result.js';
import { putSplice } from './split.js';

/**
 * Deletes the selection and what can't stand without it.
 * - A fixture or junction between two cables: they become one through its place, so that what is beyond
 *   stays fed (a splice stays there when the two are of different kinds or only one is measured). At a tee
 *   of three or more a fixture or hub leaves a splice behind; a splice that can't heal takes its cables.
 *   At the end of a cable: the cable goes too.
 * - A transformer or feed: its runs go, its cables stay, each capped where it was landed.
 * - A cable: bare splices that it leaves behind go or heal. A run: its cables stay, unfed.
 * - A zone: its lights are switched with their feed again. A sheet: everything on it. An item that is used is refused.
 */
export function deleteRecords(
  doc: PlanDocument,
  selection: Iterable<string>,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const chosen = withContents(doc, selection);
  for (const id of chosen) {
    const record = doc.get(id);
    if (record?.kind === 'settings')
      return refuse('in-use', 'The settings of the plan can be changed, not deleted.');
    if (record?.kind !== 'item') continue;
    const user = [...doc.values()].find((r) => !chosen.has(r.id) && referencesOf(r).includes(id));
    if (user) return refuse('in-use', `${labelOf(record, doc)} is in use by ${labelOf(user, doc)}.`);
  }
  const loosened = new Set<string>();
  for (const cable of recordsOf(doc, 'cable'))
    if (chosen.has(cable.id)) {
      draft.remove(cable.id);
      loosened.add(cable.fromId).add(cable.toId);
    }
  for (const id of chosen) {
    const record = draft.get(id);
    if (isNode(record)) deleteNode(draft, record, chosen, loosened);
    else if (record) draft.remove(id);
  }
  for (const id of loosened) healSplice(draft, id);
  unfeed(draft);
  unzone(draft);
  assignRuns(draft);
  return made(draft);
}

/** The selection with what lies on its sheets, and with the feeds and runs of its transformers. */
function withContents(doc: PlanDocument, selection: Iterable<string>): Set<string> {
  const chosen = new Set([...selection].filter((id) => doc.has(id)));
  for (const record of doc.values())
    if ('sheetId' in record && chosen.has(record.sheetId)) chosen.add(record.id);
  for (const record of doc.values())
    if ((record.kind === 'feed' || record.kind === 'run') && chosen.has(record.transformerId))
      chosen.add(record.id);
  return chosen;
}

function deleteNode(
  draft: Draft,
  node: NodeRecord,
  chosen: ReadonlySet<string>,
  loosened: Set<string>,
): void {
  const cables = cablesAt(draft, node.id);
  draft.remove(node.id);
  const [a, b, c] = cables;
  const isSource = node.kind === 'transformer' || node.kind === 'feed';
  if (!chosen.has(node.sheetId)) {
    if (isSource) {
      for (const cable of cables) capEnd(draft, cable, node.id, node.at);
      return;
    }
    if (a && b && !c && canMerge(a, b, node.id) && !joinsSources(draft, a, b, node.id)) {
      mergeThrough(draft, a, b, node.id, node.at);
      return;
    }
    if (a && b && !(node.kind === 'junction' && node.style === 'splice')) {
      leaveSplice(draft, node, cables);
      return;
    }
  }
  for (const cable of cables) {
    draft.remove(cable.id);
    loosened.add(cable.fromId === node.id ? cable.toId : cable.fromId);
  }
}

function leaveSplice(draft: Draft, node: NodeRecord, cables: readonly CableRecord[]): void {
  const splice = putSplice(draft, node.sheetId, node.at);
  for (const cable of cables)
    draft.put(cable.fromId === node.id ? { ...cable, fromId: splice.id } : { ...cable, toId: splice.id });
}

/** Cables lose runs that are gone. */
function unfeed(draft: Draft): void {
  for (const cable of [...recordsOf(draft.plan, 'cable')])
    if (cable.runId !== null && !draft.get(cable.runId)) draft.put({ ...cable, runId: null });
}

/** Lights lose zones that are gone. */
function unzone(draft: Draft): void {
  for (const fixture of [...recordsOf(draft.plan, 'fixture')])
    if (fixture.zoneId !== null && !draft.get(fixture.zoneId)) draft.put({ ...fixture, zoneId: null });
}
