import type { NightScene } from '@lampwright/geometry/light';
import type { LightMap } from '@lampwright/geometry/night';

/** How much of each lamp is seen, by its id: 0 or left out for one that is off. */
export type Shares = ReadonlyMap<string, number>;

export interface Ask {
  readonly scene: NightScene;
  readonly longEdge: number;
  readonly shares: Shares;
}

export type Answer =
  | { readonly is: 'light'; readonly light: LightMap }
  | { readonly is: 'failed'; readonly message: string };

/** Adds up the light of one sheet. One sum at a time: the next is asked for when the last has come. */
export interface Lights {
  readonly sum: (shares: Shares) => Promise<LightMap>;
  readonly close: () => void;
}

/** The light is worked out on so many pixels at most; what is drawn is as fine as the photo. */
const LONG_EDGE_PX = 800;

/** Works in a thread of its own: the page scrolls and answers meanwhile, however slow the phone. */
export function lightsOf(scene: NightScene): Lights {
  const worker = new Worker(new URL('./light.worker.ts', import.meta.url), { type: 'module' });
  return {
    sum: (shares) =>
      new Promise((resolve, reject) => {
        worker.onmessage = ({ data }: MessageEvent<Answer>) => {
          if (data.is === 'light') resolve(data.light);
          else reject(new Error(data.message));
        };
        worker.onerror = ({ message }) => reject(new Error(message || 'The night picture did not start.'));
        const ask: Ask = { scene, longEdge: LONG_EDGE_PX, shares };
        worker.postMessage(ask);
      }),
    close: () => worker.terminate(),
  };
}
