import {
  apply,
  type Change,
  type ConflictChoice,
  type IdSource,
  isEmpty,
  type PlanConflict,
  type PlanDocument,
  resolveConflicts,
  soundPart,
  touched,
} from '@lampwright/geometry/plan';
import type { Unsent } from './outbox';
import type { SaveRequest } from './transport';

/** The most that goes out in one request: a big backlog is saved piece by piece, each piece sure. */
export const MAX_CHANGES_PER_SAVE = 100;
const MAX_CHARACTERS_PER_SAVE = 2_000_000;

/**
 * The first unsent changes that can go in one request: those of one session made on one version. Sessions
 * come in the given order, so that what was left by an earlier window goes before what was built on it.
 */
export function nextBatch(unsent: readonly Unsent[], sessions: readonly string[]): Unsent[] {
  const session = sessions.find((name) => unsent.some((entry) => entry.session === name));
  if (session === undefined) return [];
  const queue = unsent.filter((entry) => entry.session === session).sort((a, b) => a.order - b.order);
  const first = queue[0];
  if (!first) return [];
  const batch: Unsent[] = [];
  let characters = 0;
  for (const entry of queue) {
    const size = JSON.stringify(entry.change).length;
    const fits =
      batch.length === 0 ||
      (batch.length < MAX_CHANGES_PER_SAVE && characters + size <= MAX_CHARACTERS_PER_SAVE);
    if (!fits || entry.baseVersion !== first.baseVersion || !sameIds(entry.own, first.own)) break;
    batch.push(entry);
    characters += size;
  }
  return batch;
}

function sameIds(a: readonly string[], b: readonly string[]): boolean {
  return a.length === b.length && a.every((id, i) => id === b[i]);
}

export function saveRequest(batch: readonly Unsent[]): SaveRequest {
  const first = batch[0];
  if (!first) throw new Error('nothing to save');
  return {
    session: first.session,
    baseVersion: first.baseVersion,
    own: first.own,
    changes: batch.map((entry) => entry.change),
  };
}

export interface Decided {
  /** Entries to keep in place of those of the same session and order. */
  readonly left: Unsent[];
  /** Entries of which nothing is left. */
  readonly dropped: Unsent[];
  /** New changes by the id of those that they replace; null where nothing is left. */
  readonly renamed: Map<string, Change | null>;
}

/**
 * What is unsent, with every conflict decided. The disputed changes are made anew on the server's present
 * plan, one for one. A record given up (`theirs`) goes out of every unsent change, with all that can't stand
 * without it; what mine needs comes back with the first disputed one. A change that stays as it was keeps
 * its id and its base, so that the server judges it as before.
 */
export function decide(
  queue: readonly Unsent[],
  disputed: ReadonlySet<string>,
  conflicts: readonly PlanConflict[],
  choices: ReadonlyMap<string, ConflictChoice>,
  server: { readonly version: number; readonly plan: PlanDocument },
  ids: IdSource,
): Decided {
  const given = new Set(conflicts.filter((c) => choices.get(c.recordId) !== 'mine').map((c) => c.recordId));
  let back = conflicts.filter((c) => c.reason === 'missing' && choices.get(c.recordId) === 'mine');
  let plan = server.plan;
  const decided: Decided = { left: [], dropped: [], renamed: new Map() };
  const ownIds = (entry: Unsent) => entry.own.map((id) => decided.renamed.get(id)?.id ?? id);
  for (const entry of queue) {
    const isDisputed = disputed.has(entry.change.id);
    const stripped = without(entry.change, given);
    const part = isDisputed ? resolveConflicts(plan, stripped, back, choices, entry.change.id) : stripped;
    const { change, left } = soundPart(plan, part);
    if (isDisputed) back = [];
    plan = apply(plan, change);
    if (!isDisputed && stripped === entry.change && left.length === 0) {
      decided.left.push({ ...entry, own: ownIds(entry) });
      continue;
    }
    const remade = { ...change, id: ids() };
    const baseVersion = isDisputed ? server.version : entry.baseVersion;
    if (isEmpty(remade)) decided.dropped.push(entry);
    else decided.left.push({ ...entry, baseVersion, own: ownIds(entry), change: remade });
    decided.renamed.set(entry.change.id, isEmpty(remade) ? null : remade);
  }
  return decided;
}

function without(change: Change, ids: ReadonlySet<string>): Change {
  if (!touched(change).some((id) => ids.has(id))) return change;
  return {
    ...change,
    put: Object.fromEntries(Object.entries(change.put).filter(([id]) => !ids.has(id))),
    remove: change.remove.filter((id) => !ids.has(id)),
  };
}
