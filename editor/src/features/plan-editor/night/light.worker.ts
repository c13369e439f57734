import { figuresOf } from './figures';
import { LightWork } from './light-work';
import type { WorkerAnswer, WorkerAsk } from './worker-engine';

/** What a dedicated worker has of its own; the rest of the editor is typed for windows. */
interface WorkerPort {
  onmessage: ((event: MessageEvent<WorkerAsk>) => void) | null;
  postMessage(answer: WorkerAnswer, transfer: Transferable[]): void;
}

const port = globalThis as unknown as WorkerPort;
const work = new LightWork();

/** After the page has been answered for so long, in milliseconds, there is time to get ready for what may come. */
const LULL_MS = 150;
let lull: ReturnType<typeof setTimeout> | undefined;

port.onmessage = ({ data }) => {
  clearTimeout(lull);
  try {
    answer(data);
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    port.postMessage({ is: 'failed', of: data.is, message }, []);
  }
};

function answer(question: WorkerAsk): void {
  switch (question.is) {
    case 'light': {
      const light = work.light(question.ask);
      // What was summed stays here for the next sum; the page gets a copy that is its own.
      const rgba = light.rgba.slice();
      port.postMessage({ is: 'light', light: { ...light, rgba } }, [rgba.buffer]);
      lull = setTimeout(() => work.prepare(), LULL_MS);
      return;
    }
    case 'figures':
      port.postMessage({ is: 'figures', answer: figuresOf(question.ask) }, []);
      return;
  }
}
