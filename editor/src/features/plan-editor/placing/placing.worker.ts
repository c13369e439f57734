import type { ProposerAnswer, ProposerAsk } from './proposer';
import { proposalOf } from './work';

/** What a dedicated worker has of its own; the rest of the editor is typed for windows. */
interface WorkerPort {
  onmessage: ((event: MessageEvent<ProposerAsk>) => void) | null;
  postMessage(answer: ProposerAnswer): void;
}

const port = globalThis as unknown as WorkerPort;

port.onmessage = ({ data: { number, ask } }) => {
  try {
    port.postMessage({ number, result: proposalOf(ask) });
  } catch (error) {
    port.postMessage({ number, problem: error instanceof Error ? error.message : String(error) });
  }
};
