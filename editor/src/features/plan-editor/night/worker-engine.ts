import type { LightMap } from '@lampwright/geometry/night';
import type { LightEngine } from './engine';

export type WorkerAnswer =
  | { readonly is: 'light'; readonly light: LightMap }
  | { readonly is: 'failed'; readonly message: string };

/** Works in a thread of its own, so that pointer and keys are never held up. Starts with the first question. */
export function engineInWorker(): LightEngine {
  let worker: Worker | null = null;
  const start = () => new Worker(new URL('./light.worker.ts', import.meta.url), { type: 'module' });
  const close = () => {
    worker?.terminate();
    worker = null;
  };
  return {
    light: (ask) =>
      new Promise((resolve, reject) => {
        worker ??= start();
        worker.onmessage = ({ data }: MessageEvent<WorkerAnswer>) => {
          if (data.is === 'light') resolve(data.light);
          else reject(new Error(data.message));
        };
        worker.onerror = (event) => {
          // It may not have loaded at all: the next question starts another.
          close();
          reject(new Error(event.message || 'The night picture’s worker did not start.'));
        };
        worker.postMessage(ask);
      }),
    close,
  };
}
