import type { LightMap } from '@lampwright/geometry/night';
import { type LightAsk, LightWork } from './light-work';

/** Whoever works out light for the night picture. Asked one thing at a time. */
export interface LightEngine {
  light(ask: LightAsk): Promise<LightMap>;
  close(): void;
}

/** Works at once, where it is asked: for tests. */
export function engineHere(): LightEngine {
  const work = new LightWork();
  return { light: async (ask) => work.light(ask), close: () => {} };
}
