import type { NoProposal, Proposal } from '@lampwright/geometry/light';
import { type ProposalAsk, proposalOf } from './work';

export interface ProposerAsk {
  readonly number: number;
  readonly ask: ProposalAsk;
}

export type ProposerAnswer =
  | { readonly number: number; readonly result: Proposal | NoProposal }
  | { readonly number: number; readonly problem: string };

/** Whoever works out proposals. Only the newest question is answered. */
export interface Proposer {
  propose(ask: ProposalAsk): Promise<Proposal | NoProposal>;
  close(): void;
}

/** Works at once, where it is asked: for tests. */
export function proposerHere(): Proposer {
  return { propose: async (ask) => proposalOf(ask), close: () => {} };
}

/** Works in a thread of its own; what is asked while it works takes the place of what waits. */
export function proposerInWorker(): Proposer {
  let worker: Worker | null = null;
  let number = 0;
  let waiting: {
    readonly resolve: (result: Proposal | NoProposal) => void;
    readonly reject: (error: Error) => void;
    readonly ask: ProposalAsk;
  } | null = null;
  /** The number of the question that is being worked at; null: none is. */
  let running: number | null = null;

  const close = () => {
    worker?.terminate();
    worker = null;
    running = null;
  };
  const start = (): Worker => {
    const started = new Worker(new URL('./placing.worker.ts', import.meta.url), { type: 'module' });
    started.onmessage = ({ data }: MessageEvent<ProposerAnswer>) => {
      running = null;
      if (data.number !== number) {
        next();
        return;
      }
      if ('result' in data) waiting?.resolve(data.result);
      else waiting?.reject(new Error(data.problem));
    };
    started.onerror = (event) => {
      // It may not have loaded at all: the next question starts another.
      close();
      waiting?.reject(new Error(event.message || 'Its worker did not start.'));
    };
    return started;
  };
  const next = () => {
    if (waiting === null || running !== null) return;
    worker ??= start();
    running = number;
    worker.postMessage({ number, ask: waiting.ask } satisfies ProposerAsk);
  };
  return {
    propose: (ask) =>
      new Promise((resolve, reject) => {
        number += 1;
        waiting = { resolve, reject, ask };
        next();
      }),
    close,
  };
}
