import type { LightMap } from '@lampwright/geometry/night';
import type { LightEngine } from './engine';
import type { FiguresAnswer, FiguresAsk } from './figures';
import type { LightAsk } from './light-work';

export type WorkerAsk =
  | { readonly is: 'light'; readonly ask: LightAsk }
  | { readonly is: 'figures'; readonly ask: FiguresAsk };

export type WorkerAnswer =
  | { readonly is: 'light'; readonly light: LightMap }
  | { readonly is: 'figures'; readonly answer: FiguresAnswer }
  | { readonly is: 'failed'; readonly of: WorkerAsk['is']; readonly message: string };

interface Waiting<T> {
  readonly resolve: (value: T) => void;
  readonly reject: (error: Error) => void;
}

/** Works in a thread of its own, so that pointer and keys are never held up. Starts with the first question. */
export function engineInWorker(): LightEngine {
  let worker: Worker | null = null;
  let light: Waiting<LightMap> | null = null;
  let figures: Waiting<FiguresAnswer> | null = null;

  const hear = ({ data }: MessageEvent<WorkerAnswer>) => {
    switch (data.is) {
      case 'light':
        light?.resolve(data.light);
        return;
      case 'figures':
        figures?.resolve(data.answer);
        return;
      case 'failed':
        (data.of === 'light' ? light : figures)?.reject(new Error(data.message));
        return;
    }
  };
  const close = () => {
    worker?.terminate();
    worker = null;
  };
  const start = (): Worker => {
    const started = new Worker(new URL('./light.worker.ts', import.meta.url), { type: 'module' });
    started.onmessage = hear;
    started.onerror = (event) => {
      // It may not have loaded at all: the next question starts another.
      close();
      const error = new Error(event.message || 'Its worker did not start.');
      light?.reject(error);
      figures?.reject(error);
    };
    return started;
  };
  const ask = (question: WorkerAsk) => {
    worker ??= start();
    worker.postMessage(question);
  };
  return {
    light: (asked) =>
      new Promise((resolve, reject) => {
        light = { resolve, reject };
        ask({ is: 'light', ask: asked });
      }),
    figures: (asked) =>
      new Promise((resolve, reject) => {
        figures = { resolve, reject };
        ask({ is: 'figures', ask: asked });
      }),
    close,
  };
}
