import { type LightAsk, LightWork } from './light-work';
import type { WorkerAnswer } from './worker-engine';

/** What a dedicated worker has of its own; the rest of the editor is typed for windows. */
interface WorkerPort {
  onmessage: ((event: MessageEvent<LightAsk>) => void) | null;
  postMessage(answer: WorkerAnswer, transfer: Transferable[]): void;
}

const port = globalThis as unknown as WorkerPort;
const work = new LightWork();

port.onmessage = ({ data }) => {
  try {
    const light = work.light(data);
    // What was summed stays here for the next sum; the page gets a copy that is its own.
    const rgba = light.rgba.slice();
    port.postMessage({ is: 'light', light: { ...light, rgba } }, [rgba.buffer]);
  } catch (error) {
    port.postMessage({ is: 'failed', message: error instanceof Error ? error.message : String(error) }, []);
  }
};
