import {
  apply,
  applyAll,
  type Change,
  emptyPlan,
  isEmpty,
  type PlanDocument,
  type PlanRecord,
  planOf,
} from '@lampwright/geometry/plan';
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { CommittedChange } from './transport';

export interface DocumentState {
  readonly status: 'loading' | 'ready' | 'failed';
  /** Why it failed, as a sentence. */
  readonly failure: string | null;
  /** The newest version of the server that is known whole, and the plan at it. */
  readonly serverVersion: number;
  readonly server: PlanDocument;
  /** Changes made here that the server is not known to have, in order. */
  readonly pending: readonly Change[];
  /** What the person sees: the server's plan with the pending changes on top. */
  readonly present: PlanDocument;
}

export type DocumentStore = ReturnType<typeof createDocument>;

/** The plan of one editing session. */
export function createDocument() {
  const store: StoreApi<DocumentState> = createStore<DocumentState>(() => ({
    status: 'loading',
    failure: null,
    serverVersion: 0,
    server: emptyPlan,
    pending: [],
    present: emptyPlan,
  }));
  const { getState, setState } = store;

  return {
    store,
    present: () => getState().present,

    /** The server's plan as loaded; pending changes stay on top. */
    loaded(version: number, records: Iterable<PlanRecord>): void {
      const server = planOf(records);
      const { pending } = getState();
      setState({
        status: 'ready',
        failure: null,
        serverVersion: version,
        server,
        present: applyAll(server, pending),
      });
    },

    failed(sentence: string): void {
      // A plan once loaded stays usable while a reload of it fails.
      if (getState().status !== 'ready') setState({ status: 'failed', failure: sentence });
    },

    /** Makes a change on top. */
    make(change: Change): void {
      if (isEmpty(change)) return;
      const { pending, present } = getState();
      setState({ pending: [...pending, change], present: apply(present, change) });
    },

    /** Changes that an earlier window left unsent, as made before anything made here. */
    adopt(changes: readonly Change[]): void {
      const { pending, server } = getState();
      const known = new Set(pending.map((change) => change.id));
      const next = [...changes.filter((change) => !known.has(change.id)), ...pending];
      setState({ pending: next, present: applyAll(server, next) });
    },

    /**
     * Versions that the server has made. Returns false when some are missing in between: the caller then
     * asks for all changes since `serverVersion`. Versions known already are passed over.
     */
    committed(changes: readonly CommittedChange[]): boolean {
      const { serverVersion, server, pending, present } = getState();
      const fresh = changes
        .filter(({ version }) => version > serverVersion)
        .sort((a, b) => a.version - b.version);
      const known = new Set(changes.map(({ change }) => change.id));
      const whole = fresh.every(({ version }, i) => version === serverVersion + i + 1);
      if (!whole) return false;
      const left = pending.filter((change) => !known.has(change.id));
      const nextServer = applyAll(
        server,
        fresh.map(({ change }) => change),
      );
      // When what came is just what was pending first, the picture does not change and must not flicker.
      const ownOnly = fresh.every(({ change }, i) => pending[i]?.id === change.id);
      const same = ownOnly && left.length + fresh.length === pending.length;
      setState({
        serverVersion: fresh.at(-1)?.version ?? serverVersion,
        server: nextServer,
        pending: left,
        present: same ? present : applyAll(nextServer, left),
      });
      return true;
    },

    /** Puts other changes in place of pending ones, by the id of the one replaced; null drops it. */
    replacePending(replacements: ReadonlyMap<string, Change | null>): void {
      const { pending, server } = getState();
      const next = pending.flatMap((change) => {
        const replacement = replacements.get(change.id);
        if (replacement === undefined) return [change];
        return replacement === null ? [] : [replacement];
      });
      setState({ pending: next, present: applyAll(server, next) });
    },
  };
}
