import { sourceTransformerId } from '../build.js';
import type { CableRecord, PlanPoint } from '../records.js';
import type { Draft } from './draft.js';
import { cablesByNode } from './network.js';
import { putSplice } from './split.js';

/** Cables that end at a node, as the draft stands. */
export function cablesAt(draft: Draft, nodeId: string): CableRecord[] {
  return cablesByNode(draft.plan).get(nodeId) ?? [];
}

/** The cable seen from its other end towards the node: reversed when it was drawn away from the node. */
function towards(cable: CableRecord, nodeId: string): CableRecord {
  return cable.toId === nodeId ? cable : reverse(cable);
}

function reverse(cable: CableRecord): CableRecord {
  return {
    ...cable,
    fromId: cable.toId,
    toId: cable.fromId,
    via: [...cable.via].reverse(),
    slackFromMeters: cable.slackToMeters,
    slackToMeters: cable.slackFromMeters,
  };
}

/** Whether two cables at a node can go on as one: of one kind, both measured or neither, not the same pair of ends. */
export function canMerge(a: CableRecord, b: CableRecord, nodeId: string): boolean {
  const farA = a.fromId === nodeId ? a.toId : a.fromId;
  const farB = b.fromId === nodeId ? b.toId : b.fromId;
  return (
    a.id !== b.id &&
    farA !== farB &&
    a.itemId === b.itemId &&
    (a.measuredMeters === null) === (b.measuredMeters === null) &&
    a.via.length + b.via.length < 500
  );
}

/**
 * Makes one cable of the two at a node, through the place where the node is: what is beyond stays fed. The
 * one drawn towards the node keeps its id and direction. Drops the second cable; the node is the caller's.
 */
export function mergeThrough(
  draft: Draft,
  a: CableRecord,
  b: CableRecord,
  nodeId: string,
  at: PlanPoint,
): void {
  const first = a.toId === nodeId || b.toId !== nodeId ? a : b;
  const second = first === a ? b : a;
  const head = towards(first, nodeId);
  const tail = reverse(towards(second, nodeId));
  const bothMeasured = head.measuredMeters !== null && tail.measuredMeters !== null;
  draft.remove(second.id);
  draft.put({
    ...head,
    toId: tail.toId,
    via: [...head.via, at, ...tail.via],
    measuredMeters: bothMeasured ? (head.measuredMeters ?? 0) + (tail.measuredMeters ?? 0) : null,
    slackToMeters: tail.slackToMeters,
    riseMeters: Math.min(10_000, head.riseMeters + tail.riseMeters),
    extraOhms: Math.min(1000, head.extraOhms + tail.extraOhms),
    markedToMarked: head.markedToMarked || tail.markedToMarked,
  });
}

/** Ends a cable in a capped splice of its own where the node is that it ended at. */
export function capEnd(draft: Draft, cable: CableRecord, nodeId: string, at: PlanPoint): void {
  const cap = putSplice(draft, cable.sheetId, at);
  draft.put(cable.fromId === nodeId ? { ...cable, fromId: cap.id } : { ...cable, toId: cap.id });
}

/**
 * Tidies a bare splice after cable went away from it: without cable it goes; with two cables that can be one
 * they become one. Splices that carry a name or an item stay.
 */
export function healSplice(draft: Draft, nodeId: string): void {
  const splice = draft.of(nodeId, 'junction');
  if (splice?.style !== 'splice' || splice.name !== '' || splice.itemId !== null) return;
  const [a, b, ...more] = cablesAt(draft, nodeId);
  if (!a) draft.remove(nodeId);
  if (!a || !b || more.length > 0 || !canMerge(a, b, nodeId) || joinsSources(draft, a, b, nodeId)) return;
  mergeThrough(draft, a, b, nodeId, splice.at);
  draft.remove(nodeId);
}

/** Whether the two cables as one would run straight from one feed to another, which is no cable. */
export function joinsSources(draft: Draft, a: CableRecord, b: CableRecord, nodeId: string): boolean {
  return [a, b].every(
    (cable) => sourceTransformerId(draft.get(cable.fromId === nodeId ? cable.toId : cable.fromId)) !== null,
  );
}
