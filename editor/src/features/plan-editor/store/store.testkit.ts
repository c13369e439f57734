import {
  apply,
  type Change,
  moveRecords,
  type PlanDocument,
  type PlanRecord,
  placeFixture,
  placeNote,
  planOf,
  rebase,
  sameData,
} from '@lampwright/geometry/plan';
import {
  choice,
  countedIds,
  must,
  pathLight,
  startPlan,
} from '../../../../../geometry/src/plan/plan.testkit.js';
import type { Clock } from './clock';
import { createPlanStore, type PlanStore } from './index';
import type { PlanLocks } from './locks';
import type { OutboxStorage } from './outbox';
import type { CommittedChange, PlanTransport, SaveAnswer, SaveRequest } from './transport';

/** What can befall a save on its way. */
export type Weather = 'fine' | 'lost-on-the-way' | 'answer-lost' | 'down' | 'signed-out';

/** A server in memory with the rules of the real one. */
export class MemoryServer {
  readonly start: PlanDocument;
  plan: PlanDocument;
  readonly log: { version: number; change: Change; session: string }[] = [];
  weather: () => Weather = () => 'fine';
  saves = 0;
  private readonly followers = new Set<(version: number) => void>();

  constructor(records: Iterable<PlanRecord>) {
    this.start = planOf(records);
    this.plan = this.start;
  }

  get version(): number {
    return this.log.length;
  }

  planAt(version: number): PlanDocument {
    return this.log.slice(0, version).reduce((plan, { change }) => apply(plan, change), this.start);
  }

  /** A change by somebody else, accepted as it is. */
  commit(change: Change, session = 'somebody-else'): void {
    this.plan = apply(this.plan, change);
    this.log.push({ version: this.version + 1, change, session });
    for (const follower of this.followers) follower(this.version);
  }

  transport(): PlanTransport {
    return {
      load: async () => {
        if (this.weather() === 'down') throw new Error('The server can’t be reached.');
        return { version: this.version, records: [...this.plan.values()] };
      },
      changesSince: async (version) => {
        if (this.weather() === 'down') throw new Error('The server can’t be reached.');
        return this.log.slice(version);
      },
      save: async (request) => {
        this.saves += 1;
        const weather = this.weather();
        // Let other windows have their turn in between, as a network would.
        await Promise.resolve();
        if (weather === 'signed-out') return { kind: 'signed-out' };
        if (weather === 'down' || weather === 'lost-on-the-way') return { kind: 'offline' };
        const answer = this.take(request);
        return weather === 'answer-lost' ? { kind: 'offline' } : answer;
      },
      follow: (heard) => {
        this.followers.add(heard);
        return () => this.followers.delete(heard);
      },
    };
  }

  private take(request: SaveRequest): SaveAnswer {
    const batch = new Set(request.changes.map((change) => change.id));
    const isOwn = (entry: { session: string; change: Change }) =>
      entry.session === request.session ||
      batch.has(entry.change.id) ||
      request.own.includes(entry.change.id);
    const since = this.log.slice(request.baseVersion);
    const others: CommittedChange[] = since.filter((entry) => !isOwn(entry));
    let seen = this.planAt(request.baseVersion);
    for (const entry of since) if (isOwn(entry)) seen = apply(seen, entry.change);
    let present = this.plan;
    const accepted: Change[] = [];
    const conflicts = [];
    const applied = [];
    let version = this.version;
    for (const change of request.changes) {
      const known = this.log.find((entry) => entry.change.id === change.id);
      if (known) {
        applied.push({ id: change.id, version: known.version });
        continue;
      }
      const result = rebase(seen, present, change);
      seen = apply(seen, change);
      present = apply(present, change);
      if (result.kind === 'conflict') conflicts.push(...result.conflicts);
      accepted.push(change);
      version += 1;
      applied.push({ id: change.id, version });
    }
    if (conflicts.length > 0) return { kind: 'conflict', version: this.version, conflicts, others };
    for (const change of accepted) this.commit(change, request.session);
    return { kind: 'saved', version: this.version, applied, others };
  }

  /** Whether the log replayed gives the plan, and no change is in it twice. */
  isSound(): boolean {
    const ids = this.log.map(({ change }) => change.id);
    return (
      new Set(ids).size === ids.length && sameData(toObject(this.planAt(this.version)), toObject(this.plan))
    );
  }
}

export const toObject = (plan: PlanDocument) => Object.fromEntries(plan);

/** Storage in memory that outlives a window, as IndexedDB does. */
export function memoryStorage(): OutboxStorage & { readonly kept: Map<string, unknown> } {
  const kept = new Map<string, unknown>();
  return {
    kept,
    keys: async () => [...kept.keys()],
    get: async (key) => structuredClone(kept.get(key)),
    set: async (key, value) => void kept.set(key, structuredClone(value)),
    setMany: async (entries) => {
      for (const [key, value] of entries) kept.set(key, structuredClone(value));
    },
    deleteMany: async (keys) => {
      for (const key of keys) kept.delete(key);
    },
  };
}

/** Locks of one browser; `closing` frees what a window holds, as closing or killing it does. */
export function browser() {
  const held = new Map<string, object>();
  const waiting = new Map<string, (() => void)[]>();
  const free = (name: string, window: object) => {
    if (held.get(name) !== window) return;
    held.delete(name);
    waiting.get(name)?.shift()?.();
  };
  const openWindow = () => {
    const window = {};
    const locks: PlanLocks = {
      exclusive: async (name, work) => {
        while (held.has(name))
          await new Promise<void>((resolve) => {
            waiting.set(name, [...(waiting.get(name) ?? []), resolve]);
          });
        held.set(name, window);
        try {
          return await work();
        } finally {
          free(name, window);
        }
      },
      tryHold: async (name) => {
        if (held.has(name)) return null;
        held.set(name, window);
        return () => free(name, window);
      },
    };
    const close = () => {
      for (const [name, holder] of [...held]) if (holder === window) free(name, window);
    };
    return { locks, close };
  };
  return { openWindow };
}

/** A clock that stands still until told. */
export function manualClock(): Clock & { pass(): void; readonly waiting: number[] } {
  const timers = new Map<() => void, number>();
  return {
    after(milliseconds, callback) {
      const call = () => callback();
      timers.set(call, milliseconds);
      return () => timers.delete(call);
    },
    get waiting() {
      return [...timers.values()];
    },
    pass() {
      const due = [...timers.keys()];
      timers.clear();
      for (const call of due) call();
    },
  };
}

/** Lets everything that is under way come to rest. */
export async function rest(rounds = 200): Promise<void> {
  for (let i = 0; i < rounds; i += 1) await Promise.resolve();
  await new Promise<void>((resolve) => setImmediate(resolve));
  for (let i = 0; i < rounds; i += 1) await Promise.resolve();
}

let planCount = 0;

/** A server with an empty sheet, and a browser with storage that outlives its windows. */
export function setting(storage = memoryStorage()) {
  const server = new MemoryServer(startPlan().values());
  const ids = countedIds(`p${++planCount}-`);
  const windows = browser();
  const clock = manualClock();
  const owner = { userId: 'u', companyId: 'c', planId: `plan${planCount}` };
  function open() {
    const { locks, close } = windows.openWindow();
    const store = createPlanStore({ owner, transport: server.transport(), storage, locks, clock, ids });
    return {
      store,
      /** As closing or killing the window does: nothing more runs, its locks are free. */
      kill() {
        store.stop();
        close();
      },
    };
  }
  const note = (store: PlanStore, text: string) =>
    must(placeNote(store.present(), { sheetId: 'sheet1', at: { x: 1, y: 1 }, text }, ids));
  const fixture = (store: PlanStore, x: number): string => {
    const placing = { sheetId: 'sheet1', at: { x, y: 0 }, fixture: choice(pathLight), lamp: null };
    const edit = placeFixture(store.present(), placing, ids);
    store.make(must(edit), 'Place fixture');
    return edit.kind === 'change' ? (edit.selected[0] ?? '') : '';
  };
  const move = (store: PlanStore, id: string, dx: number) =>
    store.make(must(moveRecords(store.present(), [id], dx, 0, ids)), 'Move');
  const texts = () =>
    [...server.plan.values()].flatMap((record) => (record.kind === 'note' ? [record.text] : [])).sort();
  return { server, ids, clock, storage, open, note, fixture, move, texts };
}

/** The x of a placed record. */
export const xOf = (plan: ReadonlyMap<string, unknown>, id: string) =>
  (plan.get(id) as { at: { x: number } } | undefined)?.at.x;
