import type { LightMap } from '@lampwright/geometry/night';
import { apply, setFields } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { PLAY_SECONDS } from './controller';
import type { LightEngine } from './engine';
import { figuresOf } from './figures';
import type { LightAsk } from './light-work';
import { minutesInto } from './moments';
import { nightOfYard } from './night.testkit';

/** All light that falls on a map, to tell pictures apart. */
const sumOf = (light: LightMap | undefined): number => {
  let sum = 0;
  for (let i = 0; i < (light?.rgba.length ?? 0); i += 4) sum += light!.rgba[i]!;
  return sum;
};

/** Notes what it is asked and answers when it is told to. */
function engineByHand() {
  const asks: LightAsk[] = [];
  const waiting: { resolve: (map: LightMap) => void; reject: (error: Error) => void }[] = [];
  let version = 0;
  const engine: LightEngine = {
    light: (ask) => {
      asks.push(ask);
      return new Promise((resolve, reject) => waiting.push({ resolve, reject }));
    },
    figures: async (ask) => figuresOf(ask),
    close: () => {},
  };
  const answer = async () => {
    version++;
    waiting.shift()?.resolve({
      view: 'plan',
      width: 1,
      height: 1,
      rgba: new Float32Array(4),
      leaves: new Uint8Array(1),
      version,
    });
    await Promise.resolve();
  };
  const fail = async (message: string) => {
    waiting.shift()?.reject(new Error(message));
    await Promise.resolve();
  };
  return { engine, asks, answer, fail, pending: () => waiting.length };
}

describe('the night view', () => {
  it('works nothing out by day', async () => {
    const hand = engineByHand();
    const { night, frames, yard } = nightOfYard(hand.engine);
    night.follow({ doc: apply(yard.doc, { put: {}, remove: [] }) });
    await frames.settle();
    expect(hand.asks).toEqual([]);
    expect(night.state.getState().frame).toBeNull();
  });

  it('has the light of all lamps in the dark', async () => {
    const { night, frames } = nightOfYard();
    night.open();
    await frames.settle();
    const { frame, work } = night.state.getState();
    expect(work).toEqual({ is: 'rest' });
    expect(sumOf(frame?.light)).toBeGreaterThan(0);
  });

  it('is dark of lamps before they come on, and follows the clock', async () => {
    const { night, frames } = nightOfYard();
    night.open();
    night.seek(0);
    await frames.settle();
    const day = night.state.getState().frame!;
    expect(sumOf(day.light)).toBe(0);
    night.seek(4 * 60);
    await frames.settle();
    const dark = night.state.getState().frame!;
    expect(sumOf(dark.light)).toBeGreaterThan(0);
    expect(dark.look).not.toEqual(day.look);
  });

  it('switches a zone for looking without touching the plan', async () => {
    const { night, frames, transformer, yard } = nightOfYard();
    night.open();
    await frames.settle();
    const before = yard.doc;
    night.lookAtZone(transformer.id, 'off');
    await frames.settle();
    expect(sumOf(night.state.getState().frame?.light)).toBe(0);
    night.lookAtZone(transformer.id, null);
    await frames.settle();
    expect(sumOf(night.state.getState().frame?.light)).toBeGreaterThan(0);
    expect(yard.doc).toBe(before);
  });

  it('leaves out groups that are not taken, and begins as they are offered', async () => {
    const { night, frames, fixtures } = nightOfYard();
    night.follow({
      groups: [
        { id: 'g', name: 'Path', on: true },
        { id: 'h', name: 'Later', on: false },
      ],
      groupOf: new Map([
        [fixtures[0]!.id, 'g'],
        [fixtures[1]!.id, 'h'],
      ]),
    });
    night.open();
    await frames.settle();
    const offered = sumOf(night.state.getState().frame?.light);
    night.takeGroup('h', true);
    await frames.settle();
    const all = sumOf(night.state.getState().frame?.light);
    night.takeGroup('g', false);
    await frames.settle();
    expect(all).toBeGreaterThan(offered);
    // Two equal lamps far apart, the one or the other.
    expect(sumOf(night.state.getState().frame?.light) / offered).toBeCloseTo(1, 1);
  });

  it('lights what is being dragged where it will be', async () => {
    const hand = engineByHand();
    const { night, frames, fixtures } = nightOfYard(hand.engine);
    night.open();
    frames.frame();
    await hand.answer();
    frames.frame();
    night.follow({ preview: { kind: 'move', ids: new Set([fixtures[0]!.id]), dx: 100, dy: 0 } });
    frames.frame();
    const x = (ask: LightAsk | undefined) => ask?.scene.sources.find(({ id }) => id === fixtures[0]!.id)?.x;
    expect(x(hand.asks.at(-1))! - x(hand.asks[0])!).toBeCloseTo(1, 6);
  });

  it('asks one thing at a time, and next what is newest', async () => {
    const hand = engineByHand();
    const { night, frames, fixtures } = nightOfYard(hand.engine);
    night.open();
    frames.frame();
    const ids = new Set([fixtures[0]!.id]);
    for (const dx of [10, 20, 30]) {
      night.follow({ preview: { kind: 'move', ids, dx, dy: 0 } });
      frames.frame();
    }
    expect(hand.asks).toHaveLength(1);
    await hand.answer();
    frames.frame();
    expect(hand.asks).toHaveLength(2);
    const moved = hand.asks[1]!.scene.sources.find(({ id }) => id === fixtures[0]!.id)!;
    const still = hand.asks[0]!.scene.sources.find(({ id }) => id === fixtures[0]!.id)!;
    expect(moved.x - still.x).toBeCloseTo(0.3, 6);
    await hand.answer();
    await frames.settle();
    expect(hand.pending()).toBe(0);
  });

  it('moves through the evening without asking for light again', async () => {
    const hand = engineByHand();
    const { night, frames } = nightOfYard(hand.engine);
    night.open();
    frames.frame();
    await hand.answer();
    await frames.settle();
    night.seek(5 * 60);
    await frames.settle();
    expect(hand.asks).toHaveLength(1);
  });

  it('makes no other frame while nothing of the picture changes', async () => {
    const { night, frames, fixtures } = nightOfYard();
    night.open();
    await frames.settle();
    const { frame } = night.state.getState();
    night.follow({ selection: new Set([fixtures[0]!.id]) });
    await frames.settle();
    expect(night.state.getState().frame).toBe(frame);
  });

  it('says what failed, and tries again when asked', async () => {
    const hand = engineByHand();
    const { night, frames } = nightOfYard(hand.engine);
    night.open();
    frames.frame();
    await hand.fail('no memory');
    await frames.settle();
    expect(night.state.getState().work).toEqual({ is: 'failed', message: 'no memory' });
    expect(hand.asks).toHaveLength(1);
    night.retry();
    frames.frame();
    await hand.answer();
    await frames.settle();
    expect(night.state.getState().work).toEqual({ is: 'rest' });
    expect(night.state.getState().frame).not.toBeNull();
  });

  it('has no picture of a sheet without a scale', async () => {
    const { night, frames, yard } = nightOfYard();
    night.open();
    await frames.settle();
    const result = setFields(yard.doc, ['sheet'], 'sheet', { references: [] });
    if (result.kind !== 'change') throw new Error('The references could not be taken away.');
    night.follow({ doc: apply(yard.doc, result.change) });
    await frames.settle();
    expect(night.state.getState().scene).toBeNull();
    expect(night.state.getState().frame).toBeNull();
  });

  it('tries a bright spot on the picture alone', async () => {
    const { night, frames } = nightOfYard();
    night.open();
    await frames.settle();
    const own = night.state.getState().scene!.whiteLux;
    night.tryWhite(own * 2);
    expect(night.state.getState().frame!.whiteLux).toBe(own * 2);
    expect(night.state.getState().scene!.whiteLux).toBe(own);
    night.tryWhite(null);
    expect(night.state.getState().frame!.whiteLux).toBe(own);
  });

  it('gives figures of all that is not switched off, whatever the hour', async () => {
    const { night, frames, transformer } = nightOfYard();
    night.open();
    night.seek(0);
    await frames.settle();
    expect(night.lit()!.sources).toHaveLength(3);
    night.lookAtZone(transformer.id, 'off');
    expect(night.lit()!.sources).toHaveLength(0);
  });
});

describe('playing the evening', () => {
  it('runs to its end and stops there; then it begins anew', async () => {
    const { night, frames } = nightOfYard();
    night.open();
    night.seek(0);
    night.play();
    const tick = (seconds: number) => {
      frames.now = new Date(frames.now.getTime() + seconds * 1000);
      frames.frame();
    };
    tick(PLAY_SECONDS / 2);
    const { line } = night.state.getState();
    expect(minutesInto(line, night.state.getState().at)).toBeCloseTo(line.minutes / 2, -1);
    tick(PLAY_SECONDS);
    expect(night.state.getState()).toMatchObject({ at: line.end, playing: false });
    night.play();
    expect(night.state.getState().at).toEqual(line.start);
    await frames.settle();
  });

  it('stops where somebody moves it', () => {
    const { night } = nightOfYard();
    night.open();
    night.play();
    night.seek(100);
    expect(night.state.getState().playing).toBe(false);
  });
});
