/** Locks shared by the windows of one browser; held at the latest until the window goes away. */
export interface PlanLocks {
  /** Waits for the lock, holds it during the work. */
  exclusive<T>(name: string, work: () => Promise<T>): Promise<T>;
  /** Takes the lock if it is free and returns how to give it back, or null. */
  tryHold(name: string): Promise<(() => void) | null>;
}

/** By the browser's own lock manager, which frees the locks of a window that was closed or killed. */
export function webLocks(manager: LockManager): PlanLocks {
  return {
    exclusive: (name, work) => manager.request(name, work),
    tryHold: (name) =>
      new Promise((resolve, reject) => {
        manager
          .request(name, { ifAvailable: true }, (lock) => {
            if (!lock) {
              resolve(null);
              return undefined;
            }
            // The lock is held for as long as this promise is open.
            return new Promise<void>((release) => resolve(() => release()));
          })
          .catch(reject);
      }),
  };
}

/** Within one window only, for browsers and pages that have no lock manager. Two windows may then both send
 * what one of them left unsent; the server takes each change once all the same. */
export function windowLocks(): PlanLocks {
  const queues = new Map<string, Promise<unknown>>();
  const held = new Set<string>();
  return {
    exclusive(name, work) {
      const turn = (queues.get(name) ?? Promise.resolve()).then(work);
      queues.set(
        name,
        turn.catch(() => undefined),
      );
      return turn;
    },
    tryHold(name) {
      if (held.has(name)) return Promise.resolve(null);
      held.add(name);
      return Promise.resolve(() => {
        held.delete(name);
      });
    },
  };
}
