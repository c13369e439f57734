import { after, apply, type Change, type ChangeBody, changeTo, touched } from './change.js';
import { sameData } from './equal.js';
import { changeProblems } from './integrity.js';
import type { PlanDocument, PlanRecord } from './records.js';

/**
 * A record on which a change can't simply be made. `base` is what its author saw, `theirs` what it is now,
 * `mine` what the author makes of it; null stands for no record.
 */
export interface PlanConflict {
  readonly recordId: string;
  /** `changed`: others changed the same record. `missing`: it needs a record that others removed. */
  readonly reason: 'changed' | 'missing';
  readonly message: string;
  readonly base: PlanRecord | null;
  readonly theirs: PlanRecord | null;
  readonly mine: PlanRecord | null;
}

export type Rebased =
  | { readonly kind: 'merged'; readonly change: Change; readonly next: PlanDocument }
  | { readonly kind: 'conflict'; readonly conflicts: PlanConflict[] };

/**
 * Makes on the present plan a change that was made on an older one.
 * `base` is the plan its author saw, `present` the plan with the changes of others since. Records that only
 * one side touched merge; a record that both sides changed to different things conflicts, and so does a
 * change that would break a rule of the plan (a cable to a fixture that somebody removed).
 */
export function rebase(base: PlanDocument, present: PlanDocument, change: Change): Rebased {
  const conflicts: PlanConflict[] = [];
  for (const recordId of touched(change)) {
    const was = base.get(recordId);
    const theirs = present.get(recordId);
    const mine = after(change, recordId);
    if (sameData(was, theirs) || sameData(theirs, mine)) continue;
    conflicts.push({
      recordId,
      reason: 'changed',
      message: changedMessage(theirs, mine),
      base: was ?? null,
      theirs: theirs ?? null,
      mine: mine ?? null,
    });
  }
  if (conflicts.length === 0) conflicts.push(...brokenRules(base, present, change));
  if (conflicts.length > 0) return { kind: 'conflict', conflicts };
  return { kind: 'merged', change, next: apply(present, change) };
}

/**
 * A rule broken by the merge is told about the record that the other side removed or changed, when there is
 * one, since choosing about that one settles it; else about the record that breaks the rule.
 */
function brokenRules(base: PlanDocument, present: PlanDocument, change: Change): PlanConflict[] {
  const conflicts = new Map<string, PlanConflict>();
  for (const problem of changeProblems(present, change)) {
    const { refersTo } = problem;
    const missing = refersTo !== null && !present.has(refersTo) && base.has(refersTo);
    const recordId = missing ? refersTo : problem.recordId;
    if (conflicts.has(recordId)) continue;
    conflicts.set(recordId, {
      recordId,
      reason: 'missing',
      message: problem.message,
      base: base.get(recordId) ?? null,
      theirs: present.get(recordId) ?? null,
      mine: missing ? (base.get(recordId) ?? null) : (after(change, recordId) ?? null),
    });
  }
  return [...conflicts.values()];
}

function changedMessage(theirs: PlanRecord | undefined, mine: PlanRecord | undefined): string {
  const kind = (theirs ?? mine)?.kind ?? 'record';
  if (theirs === undefined) return `Somebody removed the ${kind} that you changed.`;
  if (mine === undefined) return `Somebody changed the ${kind} that you removed.`;
  return `Somebody changed the same ${kind} as you.`;
}

export type ConflictChoice = 'mine' | 'theirs';

/**
 * The change with each conflict decided, to be made on the present plan. `theirs` leaves the record as it is
 * now, together with everything of the change that can't stand without mine; `mine` puts the author's
 * record, and brings back a removed one that it needs.
 */
export function resolveConflicts(
  present: PlanDocument,
  change: Change,
  conflicts: readonly PlanConflict[],
  choices: ReadonlyMap<string, ConflictChoice>,
  id: string,
): Change {
  const wanted = new Map<string, PlanRecord | undefined>();
  for (const recordId of touched(change)) wanted.set(recordId, after(change, recordId));
  for (const conflict of conflicts) {
    if (choices.get(conflict.recordId) === 'mine') wanted.set(conflict.recordId, conflict.mine ?? undefined);
    else wanted.delete(conflict.recordId);
  }
  return soundPart(present, changeTo(present, wanted, id)).change;
}

/**
 * The part of a change that breaks no rule of the plan: leaves out records until what remains is sound.
 * `left` are the ids left out. Ends, since every round leaves out at least one.
 */
export function soundPart(doc: PlanDocument, change: Change): { change: Change; left: string[] } {
  let current = change;
  const left: string[] = [];
  for (;;) {
    const problems = changeProblems(doc, current);
    if (problems.length === 0) return { change: current, left };
    const drop = new Set<string>();
    const ids = new Set(touched(current));
    for (const { recordId, refersTo } of problems) {
      if (ids.has(recordId)) drop.add(recordId);
      else if (refersTo !== null && ids.has(refersTo)) drop.add(refersTo);
    }
    // A rule broken two steps away (a run by its transformer's item) names neither: then nothing is sound.
    if (drop.size === 0) for (const id of ids) drop.add(id);
    left.push(...drop);
    current = without(current, drop);
  }
}

function without(change: Change, ids: ReadonlySet<string>): Change {
  return {
    ...change,
    put: Object.fromEntries(Object.entries(change.put).filter(([id]) => !ids.has(id))),
    remove: change.remove.filter((id) => !ids.has(id)),
  };
}

/** What an undo step needs to remember: what the records were before and after the change that it undoes. */
export interface UndoStep {
  readonly before: ReadonlyMap<string, PlanRecord | undefined>;
  readonly after: ReadonlyMap<string, PlanRecord | undefined>;
}

/** The step of a change, given the plan BEFORE it. */
export function stepOf(doc: PlanDocument, change: ChangeBody): UndoStep {
  const ids = touched(change);
  return {
    before: new Map(ids.map((id) => [id, doc.get(id)])),
    after: new Map(ids.map((id) => [id, after(change, id)])),
  };
}

/** The step that does again what the given one did: undoing it is redoing. */
export function reversed(step: UndoStep): UndoStep {
  return { before: step.after, after: step.before };
}

export interface Undone {
  /** The new change that undoes; empty when nothing could be. */
  readonly change: Change;
  /** Records left as they are, since somebody has changed them since or something new needs them. */
  readonly kept: string[];
}

/**
 * Undo as a new change on the present plan. Only records that are still as the undone change left them go
 * back; what anybody did since is never reverted, only reported.
 */
export function undo(present: PlanDocument, step: UndoStep, id: string): Undone {
  const kept: string[] = [];
  const wanted = new Map<string, PlanRecord | undefined>();
  for (const [recordId, left] of step.after) {
    if (sameData(present.get(recordId), left)) wanted.set(recordId, step.before.get(recordId));
    else kept.push(recordId);
  }
  const sound = soundPart(present, changeTo(present, wanted, id));
  return { change: sound.change, kept: [...kept, ...sound.left] };
}

/** The change that takes the plan back to what it was at an older version, as a new change. */
export function restoreTo(present: PlanDocument, older: PlanDocument, id: string): Change {
  const ids = new Set([...present.keys(), ...older.keys()]);
  return changeTo(
    present,
    [...ids].map((recordId) => [recordId, older.get(recordId)] as const),
    id,
  );
}
