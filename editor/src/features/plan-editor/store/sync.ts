import {
  type Change,
  type ConflictChoice,
  type IdSource,
  isEmpty,
  type PlanConflict,
  PlanFormError,
} from '@lampwright/geometry/plan';
import { createStore } from 'zustand/vanilla';
import type { Clock } from './clock';
import type { DocumentStore } from './document';
import { createFollower } from './follower';
import type { PlanLocks } from './locks';
import type { Outbox, Unsent } from './outbox';
import { decide, nextBatch, saveRequest } from './sender';
import type { PlanTransport, SaveAnswer } from './transport';

/** `offline` tries again by itself; `conflict`, `refused` and `signed-out` wait for the person. */
export type SavePhase = 'saved' | 'saving' | 'offline' | 'conflict' | 'refused' | 'signed-out';

export interface SaveState {
  readonly phase: SavePhase;
  /** Changes that the server is not known to have. */
  readonly unsent: number;
  /** Why, where the phase needs a sentence. */
  readonly message: string | null;
  readonly conflicts: readonly PlanConflict[];
  readonly choices: ReadonlyMap<string, ConflictChoice>;
  /** False when the browser keeps nothing: unsent changes then live only as long as this window. */
  readonly kept: boolean;
}

const FIRST_RETRY_MILLISECONDS = 1000;
const LONGEST_RETRY_MILLISECONDS = 30_000;

export interface SyncParts {
  readonly document: DocumentStore;
  readonly outbox: Outbox;
  readonly transport: PlanTransport;
  readonly locks: PlanLocks;
  readonly clock: Clock;
  readonly ids: IdSource;
}

export type Sync = ReturnType<typeof createSync>;

/** Loads the plan, sends what is made, follows what others make. */
export function createSync({ document, outbox, transport, locks, clock, ids }: SyncParts) {
  const session = ids();
  const store = createStore<SaveState>(() => ({
    phase: 'saved',
    unsent: 0,
    message: null,
    conflicts: [],
    choices: new Map(),
    kept: true,
  }));
  const { getState, setState } = store;

  /** Sessions of closed windows whose unsent changes this one sends, oldest taken first. */
  const adopted: string[] = [];
  const releases: (() => void)[] = [];
  let order = 0;
  let stopped = false;
  let cancelRetry: (() => void) | null = null;
  let failures = 0;
  let flushing: Promise<void> | null = null;
  let flushAgain = false;
  let disputed: readonly Unsent[] = [];
  const writes = new Set<Promise<unknown>>();
  /** Ids of pending changes that are this session's own. */
  const madeHere = new Set<string>();

  const follower = createFollower(document, transport, clock, (changes) => {
    for (const { change } of changes) madeHere.delete(change.id);
    settle({});
  });
  const responsible = () => [...adopted, session];
  const paused = () => ['conflict', 'refused', 'signed-out'].includes(getState().phase);

  function settle(patch: Partial<SaveState>): void {
    setState({ unsent: document.store.getState().pending.length, ...patch });
  }

  /** Every change made here comes through this: seen at once, kept, then sent. */
  function make(change: Change): void {
    if (isEmpty(change)) return;
    const { serverVersion, pending } = document.store.getState();
    const own = pending.filter((other) => !madeHere.has(other.id)).map((other) => other.id);
    madeHere.add(change.id);
    document.make(change);
    settle(paused() || getState().phase === 'offline' ? {} : { phase: 'saving' });
    const write = outbox
      .add({ session, order: order++, baseVersion: serverVersion, own, change })
      .then((kept) => {
        if (kept !== getState().kept) setState({ kept });
      });
    track(write);
    void write.then(flush);
  }
  function track(write: Promise<unknown>): void {
    writes.add(write);
    void write.finally(() => writes.delete(write));
  }

  /** Sends until nothing is left or something stands in the way. One at a time in this browser. */
  function flush(): Promise<void> {
    if (flushing) {
      flushAgain = true;
      return flushing;
    }
    flushing = locks
      .exclusive(outbox.name, async () => {
        do {
          flushAgain = false;
          while (!stopped && !paused() && (await sendOne()));
        } while (flushAgain && !stopped && !paused() && cancelRetry === null);
      })
      .finally(() => {
        flushing = null;
      });
    return flushing;
  }

  /** Sends one batch; true when there may be another to send. */
  async function sendOne(): Promise<boolean> {
    if (cancelRetry) return false;
    let batch: Unsent[];
    try {
      batch = nextBatch(await outbox.read(new Set(responsible())), responsible());
    } catch (error) {
      // Kept by a newer version of the product; or the browser can't read its storage just now.
      if (error instanceof PlanFormError) settle({ phase: 'refused', message: error.message });
      else await received([], { kind: 'offline' });
      return false;
    }
    if (batch.length === 0) {
      if (document.store.getState().pending.length === 0) settle({ phase: 'saved', message: null });
      return false;
    }
    settle({ phase: 'saving' });
    const answer = await transport.save(saveRequest(batch));
    if (stopped) return false;
    return received(batch, answer);
  }

  async function received(batch: readonly Unsent[], answer: SaveAnswer): Promise<boolean> {
    switch (answer.kind) {
      case 'saved': {
        failures = 0;
        const version = new Map(answer.applied.map((done) => [done.id, done.version]));
        const mine = batch.flatMap(({ change }) => {
          const at = version.get(change.id);
          return at === undefined ? [] : [{ version: at, change }];
        });
        // The server has them: only now may the browser forget them.
        await outbox.clear(batch.filter(({ change }) => version.has(change.id)));
        if (!document.committed([...mine, ...answer.others])) await follower.catchUp();
        for (const { change } of mine) madeHere.delete(change.id);
        settle({ message: null });
        return true;
      }
      case 'conflict':
        failures = 0;
        if (!document.committed(answer.others)) await follower.catchUp();
        disputed = batch;
        settle({ phase: 'conflict', conflicts: answer.conflicts, choices: new Map(), message: null });
        return false;
      case 'signed-out':
        settle({ phase: 'signed-out', message: 'You are signed out. Sign in to save what is unsent.' });
        return false;
      case 'refused':
        settle({ phase: 'refused', message: answer.message });
        return false;
      case 'offline':
        settle({ phase: 'offline', message: null });
        retryLater(flush);
        return false;
    }
  }

  /** Waits longer each time, up to half a minute. */
  function retryLater(work: () => void): void {
    cancelRetry?.();
    const wait = Math.min(LONGEST_RETRY_MILLISECONDS, FIRST_RETRY_MILLISECONDS * 2 ** failures);
    failures += 1;
    cancelRetry = clock.after(wait, () => {
      cancelRetry = null;
      if (!stopped) work();
    });
  }

  /** Takes over what closed windows left unsent. */
  async function adoptOrphans(): Promise<void> {
    const taken: string[] = [];
    for (const other of await outbox.sessions()) {
      if (other === session || adopted.includes(other)) continue;
      const release = await locks.tryHold(`${outbox.name}${other}`);
      if (!release) continue;
      releases.push(release);
      taken.push(other);
    }
    if (taken.length === 0) return;
    adopted.push(...taken);
    const left = await outbox.read(new Set(taken));
    left.sort((a, b) => taken.indexOf(a.session) - taken.indexOf(b.session) || a.order - b.order);
    document.adopt(left.map((entry) => entry.change));
    settle({});
  }

  /** What can't be read stays where it is, for a version or a moment that can. */
  function cannotAdopt(error: unknown): void {
    if (error instanceof PlanFormError) settle({ phase: 'refused', message: error.message });
  }

  async function open(): Promise<void> {
    try {
      await follower.load();
      failures = 0;
    } catch (error) {
      if (stopped) return;
      document.failed(error instanceof Error ? error.message : 'The plan could not be loaded.');
      retryLater(() => void open());
      return;
    }
    if (stopped) return;
    follower.follow();
    await flush();
  }

  /** Looks again for work: the network is back, somebody signed in, the window is seen again. */
  async function resume(): Promise<void> {
    if (stopped) return;
    cancelRetry?.();
    cancelRetry = null;
    failures = 0;
    const { phase } = getState();
    if (phase === 'signed-out' || phase === 'refused' || phase === 'offline')
      settle({ phase: 'saving', message: null });
    await adoptOrphans().catch(cannotAdopt);
    if (document.store.getState().status !== 'ready') await open();
    else {
      await follower.catchUp();
      await flush();
    }
  }

  return {
    store,
    session,
    make,
    resume,

    /** Holds this session's name, takes over what was left unsent, loads the plan, and follows it. */
    async start(): Promise<void> {
      const release = await locks.tryHold(`${outbox.name}${session}`);
      if (release) releases.push(release);
      await adoptOrphans().catch(cannotAdopt);
      await open();
    },

    /**
     * Decides one record of a conflict. When the last is decided, all disputed changes are made anew on the
     * present plan and sent; they are kept in place of the old ones first, so that nothing is lost.
     */
    async resolveConflict(recordId: string, choice: ConflictChoice): Promise<void> {
      const { phase, conflicts, choices } = getState();
      if (phase !== 'conflict' || !conflicts.some((conflict) => conflict.recordId === recordId)) return;
      const decided = new Map(choices).set(recordId, choice);
      setState({ choices: decided });
      if (conflicts.some((conflict) => !decided.has(conflict.recordId))) return;
      const batch = disputed;
      disputed = [];
      const { server, serverVersion } = document.store.getState();
      const queue = await outbox.read(new Set(responsible()));
      const remade = decide(
        queue,
        new Set(batch.map((entry) => entry.change.id)),
        conflicts,
        decided,
        { version: serverVersion, plan: server },
        ids,
      );
      const { left, dropped, renamed } = remade;
      await outbox.replace(left);
      await outbox.clear(dropped);
      for (const [old, change] of renamed) if (madeHere.delete(old) && change) madeHere.add(change.id);
      document.replacePending(renamed);
      settle({ phase: 'saving', conflicts: [], choices: new Map(), message: null });
      await flush();
    },

    /** Resolves when everything made so far is kept by the browser. */
    async written(): Promise<void> {
      await Promise.all(writes);
    },

    stop(): void {
      stopped = true;
      cancelRetry?.();
      follower.stop();
      for (const release of releases) release();
    },
  };
}
