import { type Change, type IdSource, newId } from '@lampwright/geometry/plan';
import { type Clock, realClock } from './clock';
import { createDocument } from './document';
import { createHistory } from './history';
import { type PlanLocks, webLocks, windowLocks } from './locks';
import { createOutbox, indexedDbStorage, type OutboxOwner, type OutboxStorage } from './outbox';
import { createSync } from './sync';
import type { PlanTransport } from './transport';

export type { DocumentState } from './document';
export type { Gesture, HistoryState, Reverted } from './history';
export type { OutboxOwner } from './outbox';
export type { SavePhase, SaveState } from './sync';
export type { CommittedChange, PlanTransport, SaveAnswer, SaveRequest } from './transport';

export interface PlanStoreOptions {
  readonly owner: OutboxOwner;
  readonly transport: PlanTransport;
  readonly storage?: OutboxStorage;
  readonly locks?: PlanLocks;
  readonly clock?: Clock;
  readonly ids?: IdSource;
}

export type PlanStore = ReturnType<typeof createPlanStore>;

/**
 * One person's editing of one plan: the document, undo and redo, and the saving. Call
 * `start` once, `stop` when the page goes; `resume` when the network or the window comes back.
 */
export function createPlanStore(options: PlanStoreOptions) {
  const ids = options.ids ?? newId;
  const document = createDocument();
  const sync = createSync({
    document,
    outbox: createOutbox(options.owner, options.storage ?? indexedDbStorage()),
    transport: options.transport,
    locks: options.locks ?? browserLocks(),
    clock: options.clock ?? realClock,
    ids,
  });
  const history = createHistory({ present: document.present, make: sync.make }, ids);

  return {
    document: document.store,
    history: history.store,
    saving: sync.store,

    present: document.present,
    /** Makes a change as one gesture with its own undo step; the label names it in "Undo …". */
    make: (change: Change, label: string) => history.make(change, label),
    gesture: history.gesture,
    undo: history.undo,
    redo: history.redo,

    start: sync.start,
    resume: sync.resume,
    resolveConflict: sync.resolveConflict,
    /** Resolves when everything made so far is kept by the browser. */
    written: sync.written,
    stop: sync.stop,
  };
}

/** The lock manager is there on pages served over https and from the machine itself. */
function browserLocks(): PlanLocks {
  const manager: LockManager | undefined = globalThis.navigator?.locks;
  return manager ? webLocks(manager) : windowLocks();
}
