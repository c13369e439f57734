import {
  apply,
  type Change,
  compose,
  type IdSource,
  isEmpty,
  type PlanDocument,
  stepOf,
  type UndoStep,
  undo,
} from '@lampwright/geometry/plan';
import { createStore } from 'zustand/vanilla';

/** Steps kept to be undone; the oldest is forgotten beyond that. */
export const MAX_UNDO_STEPS = 500;

interface Step {
  readonly label: string;
  readonly step: UndoStep;
}

export interface HistoryState {
  readonly undoable: readonly Step[];
  readonly redoable: readonly Step[];
}

export interface Gesture {
  /** The plan as the gesture has made it so far. */
  present(): PlanDocument;
  make(change: Change): void;
}

export interface Reverted {
  readonly label: string;
  /** Records that were left alone, since somebody changed them since. */
  readonly kept: readonly string[];
}

export type History = ReturnType<typeof createHistory>;

/**
 * Undo and redo. `target` is where changes go: one gesture makes one change and one step. Steps are undone
 * by new changes on the present plan, never by going back to an old one.
 */
export function createHistory(
  target: { readonly present: () => PlanDocument; readonly make: (change: Change) => void },
  ids: IdSource,
) {
  const store = createStore<HistoryState>(() => ({ undoable: [], redoable: [] }));
  const { getState, setState } = store;

  function commit(change: Change, label: string): void {
    if (isEmpty(change)) return;
    const step = { label, step: stepOf(target.present(), change) };
    target.make(change);
    setState({ undoable: [...getState().undoable, step].slice(-MAX_UNDO_STEPS), redoable: [] });
  }

  /** Takes the newest step off one stack, makes the change that reverts it, and puts that on the other. */
  function revert(from: 'undoable' | 'redoable', to: 'undoable' | 'redoable'): Reverted | null {
    const state = getState();
    const newest = state[from].at(-1);
    if (!newest) return null;
    const present = target.present();
    const { change, kept } = undo(present, newest.step, ids());
    const next = { ...state, [from]: state[from].slice(0, -1) };
    if (!isEmpty(change)) {
      next[to] = [...state[to], { label: newest.label, step: stepOf(present, change) }];
      target.make(change);
    }
    setState(next);
    return { label: newest.label, kept };
  }

  return {
    store,
    /** Makes a change that is a gesture of its own. */
    make: commit,

    /**
     * Makes several changes one gesture: one change, one step. Nothing is made when `work` throws. The scope
     * ends with the function, so that collecting can't be left switched on.
     */
    gesture(label: string, work: (gesture: Gesture) => void): void {
      let present = target.present();
      const made: Change[] = [];
      let open = true;
      try {
        work({
          present: () => present,
          make(change) {
            if (!open) throw new Error(`The gesture "${label}" has ended; it can't take another change.`);
            present = apply(present, change);
            made.push(change);
          },
        });
      } finally {
        open = false;
      }
      const [first, ...more] = made;
      if (first)
        commit(
          more.reduce((whole, change) => compose(whole, change, whole.id), first),
          label,
        );
    },

    undo: () => revert('undoable', 'redoable'),
    redo: () => revert('redoable', 'undoable'),
    clear: () => setState({ undoable: [], redoable: [] }),
  };
}
