import type { LightMap } from '@lampwright/geometry/night';
import { type FiguresAnswer, type FiguresAsk, figuresOf } from './figures';
import { type LightAsk, LightWork } from './light-work';

/** Whoever works out light: for the picture, and in figures. Each is asked one thing at a time. */
export interface LightEngine {
  light(ask: LightAsk): Promise<LightMap>;
  figures(ask: FiguresAsk): Promise<FiguresAnswer>;
  close(): void;
}

/** Works at once, where it is asked: for tests. */
export function engineHere(): LightEngine {
  const work = new LightWork();
  return {
    light: async (ask) => work.light(ask),
    figures: async (ask) => figuresOf(ask),
    close: () => {},
  };
}
