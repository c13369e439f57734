import type { Change, PlanConflict, PlanRecord } from '@lampwright/geometry/plan';

/** A change that the server has: what it made of the plan at that version. */
export interface CommittedChange {
  readonly version: number;
  readonly change: Change;
}

export interface SaveRequest {
  /** The editing session whose view the changes were made in; see `Unsent`. */
  readonly session: string;
  readonly baseVersion: number;
  /** Changes of other sessions that the view held although they were not saved yet. */
  readonly own: readonly string[];
  readonly changes: readonly Change[];
}

export type SaveAnswer =
  | {
      readonly kind: 'saved';
      readonly version: number;
      readonly applied: readonly { readonly id: string; readonly version: number }[];
      /** Changes of others since the base. */
      readonly others: readonly CommittedChange[];
    }
  | {
      readonly kind: 'conflict';
      readonly version: number;
      readonly conflicts: readonly PlanConflict[];
      readonly others: readonly CommittedChange[];
    }
  /** The session has ended; the changes wait for the next sign-in. */
  | { readonly kind: 'signed-out' }
  /** No answer, or one that says to come back later. */
  | { readonly kind: 'offline' }
  /** The server will never take these changes; the sentence says why. */
  | { readonly kind: 'refused'; readonly message: string };

/** How a plan reaches the server; small, so that tests stand in for it. */
export interface PlanTransport {
  /** @throws when the plan can't be had; the message is a sentence for the person */
  load(): Promise<{ readonly version: number; readonly records: readonly PlanRecord[] }>;
  /**
   * Changes after the version, in order and without a gap; the newest may be left for a further call, which
   * the version next heard of brings about.
   * @throws as `load`
   */
  changesSince(version: number): Promise<readonly CommittedChange[]>;
  /** Never throws: whatever happens is an answer. */
  save(request: SaveRequest): Promise<SaveAnswer>;
  /** Tells of each new version until the returned function is called. Reconnects by itself. */
  follow(heard: (version: number) => void): () => void;
}
