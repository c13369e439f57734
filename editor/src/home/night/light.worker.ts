import { NightLight, surfaceMapOf } from '@lampwright/geometry/night';
import type { Answer, Ask } from './lights';

/** What a dedicated worker has of its own; the page is typed for windows. */
interface WorkerPort {
  onmessage: ((event: MessageEvent<Ask>) => void) | null;
  postMessage(answer: Answer, transfer: Transferable[]): void;
}

const port = globalThis as unknown as WorkerPort;
let light: NightLight | null = null;

port.onmessage = ({ data: { scene, longEdge, shares } }) => {
  try {
    light ??= new NightLight(scene, surfaceMapOf(scene, longEdge));
    const sum = light.sum(({ id }) => shares.get(id) ?? 0);
    // What was summed stays here for the next sum; the page gets a copy that is its own.
    const rgba = sum.rgba.slice();
    port.postMessage({ is: 'light', light: { ...sum, rgba } }, [rgba.buffer]);
  } catch (error) {
    port.postMessage({ is: 'failed', message: error instanceof Error ? error.message : String(error) }, []);
  }
};
