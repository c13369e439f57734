import type { Clock } from './clock';
import type { DocumentStore } from './document';
import type { CommittedChange, PlanTransport } from './transport';

const RETRY_MILLISECONDS = 5000;

/** Keeps the server's side of the document up to date: what this window and others have saved. */
export function createFollower(
  document: DocumentStore,
  transport: PlanTransport,
  clock: Clock,
  taken: (changes: readonly CommittedChange[]) => void,
) {
  let newestHeard = 0;
  let catching: Promise<void> | null = null;
  let cancelRetry: (() => void) | null = null;
  let unfollow: (() => void) | null = null;
  let stopped = false;

  /** @throws when the plan can't be had */
  async function load(): Promise<void> {
    const { version, records } = await transport.load();
    if (!stopped) document.loaded(version, records);
  }

  /** Takes all versions since the newest known one, one request at a time; tries again where that fails. */
  function catchUp(): Promise<void> {
    catching ??= takeVersions().finally(() => {
      catching = null;
    });
    return catching;
  }

  async function takeVersions(): Promise<void> {
    cancelRetry?.();
    cancelRetry = null;
    try {
      do {
        const changes = await transport.changesSince(document.store.getState().serverVersion);
        if (stopped) return;
        if (!document.committed(changes)) await load();
        taken(changes);
        if (changes.length === 0) return;
      } while (newestHeard > document.store.getState().serverVersion);
    } catch {
      if (!stopped) cancelRetry = clock.after(RETRY_MILLISECONDS, () => void catchUp());
    }
  }

  return {
    load,
    catchUp,
    /** Hears of new versions from now on. */
    follow(): void {
      unfollow ??= transport.follow((version) => {
        newestHeard = Math.max(newestHeard, version);
        if (version > document.store.getState().serverVersion) void catchUp();
      });
    },
    stop(): void {
      stopped = true;
      cancelRetry?.();
      unfollow?.();
    },
  };
}
