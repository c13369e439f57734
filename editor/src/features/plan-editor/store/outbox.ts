import { type Change, readChange } from '@lampwright/geometry/plan';
import { createStore, delMany, get, keys, set, setMany, type UseStore } from 'idb-keyval';

/** Whose unsent changes, of which plan. */
export interface OutboxOwner {
  readonly userId: string;
  readonly companyId: string;
  readonly planId: string;
}

/**
 * A change that the server may not have. `session` names the window whose view it was made in: all earlier
 * changes of that session were in it, and those of other sessions that `own` names. Everything else since
 * `baseVersion` is news to it, and may conflict.
 */
export interface Unsent {
  readonly session: string;
  /** Counts up within the session. */
  readonly order: number;
  readonly baseVersion: number;
  readonly own: readonly string[];
  readonly change: Change;
}

/** Where unsent changes are kept so that they outlive the window. */
export interface OutboxStorage {
  keys(): Promise<readonly string[]>;
  get(key: string): Promise<unknown>;
  set(key: string, value: unknown): Promise<void>;
  setMany(entries: readonly (readonly [string, unknown])[]): Promise<void>;
  deleteMany(keys: readonly string[]): Promise<void>;
}

let shared: UseStore | null = null;

/** IndexedDB: one database for all that is unsent in this browser. */
export function indexedDbStorage(): OutboxStorage {
  shared ??= createStore('lampwright-outbox', 'unsent');
  const store = shared;
  return {
    keys: () => keys<string>(store),
    get: (key) => get(key, store),
    set: (key, value) => set(key, value, store),
    setMany: (entries) =>
      setMany(
        entries.map(([key, value]) => [key, value]),
        store,
      ),
    deleteMany: (names) => delMany([...names], store),
  };
}

export type Outbox = ReturnType<typeof createOutbox>;

/** The unsent changes of one person on one plan, of all windows of the browser. */
export function createOutbox(owner: OutboxOwner, storage: OutboxStorage) {
  const prefix = `${owner.userId}/${owner.companyId}/${owner.planId}/`;
  const keyOf = (entry: { session: string; order: number }) =>
    `${prefix}${entry.session}/${String(entry.order).padStart(9, '0')}`;
  // What the browser refused to keep (private window, disk full) waits here, and is sent all the same.
  const memory = new Map<string, Unsent>();
  // Writes go one after another, so that a change is never kept without those made before it.
  let writing: Promise<unknown> = Promise.resolve();
  const inTurn = <T>(work: () => Promise<T>): Promise<T> => {
    const turn = writing.then(work);
    writing = turn.catch(() => undefined);
    return turn;
  };

  return {
    name: `lampwright-outbox/${prefix}`,

    /** Keeps a change. Resolves to whether the browser keeps it; if not, it lives as long as the window. */
    add(entry: Unsent): Promise<boolean> {
      const key = keyOf(entry);
      memory.set(key, entry);
      return inTurn(async () => {
        try {
          await storage.set(key, entry);
          memory.delete(key);
          return true;
        } catch {
          return false;
        }
      });
    },

    /** Unsent changes of these sessions, oldest first within each; null asks for all sessions. */
    read(sessions: ReadonlySet<string> | null): Promise<Unsent[]> {
      return inTurn(async () => {
        const found = new Map<string, Unsent>(memory);
        let names: readonly string[] = [];
        try {
          names = await storage.keys();
        } catch {
          // What memory holds is all there is.
        }
        for (const key of names) {
          if (typeof key !== 'string' || !key.startsWith(prefix)) continue;
          if (sessions !== null && !sessions.has(sessionOfKey(key, prefix))) continue;
          const entry = readEntry(await storage.get(key));
          if (entry) found.set(key, entry);
        }
        return [...found.entries()]
          .filter(([, entry]) => sessions === null || sessions.has(entry.session))
          .sort(([a], [b]) => (a < b ? -1 : 1))
          .map(([, entry]) => entry);
      });
    },

    /** Sessions that have unsent changes. */
    sessions(): Promise<Set<string>> {
      return inTurn(async () => {
        const names = await storage.keys().catch((): string[] => []);
        const own = names.filter((key) => typeof key === 'string' && key.startsWith(prefix));
        return new Set([...own, ...memory.keys()].map((key) => sessionOfKey(key, prefix)));
      });
    },

    /** Forgets changes that the server is known to have. */
    clear(entries: readonly Unsent[]): Promise<void> {
      return inTurn(async () => {
        const names = entries.map(keyOf);
        for (const key of names) memory.delete(key);
        // A leftover is sent again later, which is harmless.
        await storage.deleteMany(names).catch(() => undefined);
      });
    },

    /** Puts other entries in the place of those of the same session and order. */
    replace(entries: readonly Unsent[]): Promise<void> {
      return inTurn(async () => {
        const named = entries.map((entry) => [keyOf(entry), entry] as const);
        try {
          await storage.setMany(named);
          for (const [key] of named) memory.delete(key);
        } catch {
          for (const [key, entry] of named) memory.set(key, entry);
        }
      });
    },
  };
}

function sessionOfKey(key: string, prefix: string): string {
  const rest = key.slice(prefix.length);
  return rest.slice(0, rest.lastIndexOf('/'));
}

/** An entry as kept, perhaps by an older version of the product; undefined for what can't be one. */
function readEntry(value: unknown): Unsent | undefined {
  if (typeof value !== 'object' || value === null || !('change' in value)) return undefined;
  const { session, order, baseVersion, own } = value as Partial<Unsent>;
  if (typeof session !== 'string' || typeof order !== 'number' || typeof baseVersion !== 'number')
    return undefined;
  return {
    session,
    order,
    baseVersion,
    own: Array.isArray(own) ? own : [],
    change: readChange(value.change),
  };
}
