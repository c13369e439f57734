import type { Change, ConflictChoice, PlanConflict, PlanDocument } from '@lampwright/geometry/plan';
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { PlanStore } from '../store';

export type SaveView =
  | { readonly kind: 'saved'; readonly at: Date | null }
  | { readonly kind: 'saving' }
  | { readonly kind: 'offline'; readonly unsent: number }
  | { readonly kind: 'conflict'; readonly unsent: number }
  | { readonly kind: 'problem'; readonly message: string; readonly unsent: number };

export interface PlanPortState {
  readonly doc: PlanDocument;
  readonly undoLabel: string | null;
  readonly redoLabel: string | null;
  readonly save: SaveView;
  readonly conflicts: readonly PlanConflict[];
  readonly choices: ReadonlyMap<string, ConflictChoice>;
}

/** The plan as the page works on it: one state to watch, and the ways to change it. */
export interface PlanPort {
  readonly state: StoreApi<PlanPortState>;
  commit(change: Change, label: string): void;
  /** Records that were left alone because somebody changed them since; null when there was nothing to undo. */
  undo(): readonly string[] | null;
  redo(): readonly string[] | null;
  resolve(recordId: string, choice: ConflictChoice): void;
  close(): void;
}

/** Watches the stores of an editing session. `now` tells when a save was acknowledged. */
export function portOf(store: PlanStore, now: () => Date = () => new Date()): PlanPort {
  let savedAt: Date | null = null;
  const read = (): PlanPortState => {
    const { undoable, redoable } = store.history.getState();
    const saving = store.saving.getState();
    return {
      doc: store.document.getState().present,
      undoLabel: undoable.at(-1)?.label ?? null,
      redoLabel: redoable.at(-1)?.label ?? null,
      save: saveView(saving, savedAt),
      conflicts: saving.conflicts,
      choices: saving.choices,
    };
  };
  const state = createStore<PlanPortState>(read);
  const refresh = () => state.setState(read());
  const stop = [
    store.document.subscribe(refresh),
    store.history.subscribe(refresh),
    store.saving.subscribe((next, before) => {
      if (next.phase === 'saved' && before.phase !== 'saved') savedAt = now();
      refresh();
    }),
  ];
  return {
    state,
    commit: (change, label) => store.make(change, label),
    undo: () => store.undo()?.kept ?? null,
    redo: () => store.redo()?.kept ?? null,
    resolve: (recordId, choice) => void store.resolveConflict(recordId, choice),
    close: () => {
      for (const undo of stop) undo();
    },
  };
}

type Saving = ReturnType<PlanStore['saving']['getState']>;

function saveView(saving: Saving, savedAt: Date | null): SaveView {
  const { phase, unsent, message } = saving;
  switch (phase) {
    case 'saved':
      return { kind: 'saved', at: savedAt };
    case 'saving':
      return { kind: 'saving' };
    case 'offline':
      return { kind: 'offline', unsent };
    case 'conflict':
      return { kind: 'conflict', unsent };
    case 'refused':
      return { kind: 'problem', message: message ?? 'the server refused it', unsent };
    case 'signed-out':
      return { kind: 'problem', message: message ?? 'you are signed out', unsent };
  }
}
