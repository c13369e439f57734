import type { LightMap } from '@lampwright/geometry/night';
import { describe, expect, it } from 'vitest';
import { type LightAsk, LightWork } from './light-work';
import { nightOfYard } from './night.testkit';

/** The yard's lamps, all of them on. */
async function askOfYard(): Promise<LightAsk> {
  const { night, frames } = nightOfYard();
  night.open();
  await frames.settle();
  const scene = night.state.getState().scene!;
  return { scene, shares: sharesOf(scene), longEdge: 240, moving: false };
}

const sharesOf = ({ sources }: LightAsk['scene']) => Object.fromEntries(sources.map(({ id }) => [id, 1]));

/** The same with one lamp so many metres along. */
function movedBy(ask: LightAsk, meters: number): LightAsk {
  const [first, ...others] = ask.scene.sources;
  const sources = [{ ...first!, x: first!.x + meters }, ...others];
  return { ...ask, scene: { ...ask.scene, sources }, moving: true };
}

const luxAt = ({ width, rgba }: LightMap, x: number, y: number): number => rgba[(y * width + x) * 4]!;

const isSame = (a: Float32Array, b: Float32Array): boolean =>
  a.length === b.length && a.every((value, i) => value === b[i]);

/** How far the light of a map is from that of one twice as fine, as a share of its brightest. */
function apart(coarse: LightMap, fine: LightMap): number {
  let most = 0;
  let brightest = 0;
  for (let y = 0; y < coarse.height; y++)
    for (let x = 0; x < coarse.width; x++) {
      const [u, v] = [2 * x, 2 * y];
      const mean =
        (luxAt(fine, u, v) + luxAt(fine, u + 1, v) + luxAt(fine, u, v + 1) + luxAt(fine, u + 1, v + 1)) / 4;
      most = Math.max(most, Math.abs(luxAt(coarse, x, y) - mean));
      brightest = Math.max(brightest, mean);
    }
  return most / brightest;
}

describe('light while a lamp is moved', () => {
  it('is that of the lamp where it is now, on a map half as fine', async () => {
    const ask = await askOfYard();
    const work = new LightWork();
    work.light(ask);
    for (const meters of [0.4, 0.9]) {
      const moving = movedBy(ask, meters);
      const quick = work.light(moving);
      const fine = new LightWork().light({ ...moving, moving: false });
      expect([quick.width, quick.height]).toEqual([fine.width / 2, fine.height / 2]);
      expect(apart(quick, fine)).toBeLessThan(0.05);
    }
  });

  it('leaves nothing behind when the lamp goes back or is let go', async () => {
    const ask = await askOfYard();
    const work = new LightWork();
    const before = work.light(ask).rgba.slice();
    work.prepare();
    work.light(movedBy(ask, 0.7));
    expect(apart(work.light(movedBy(ask, 0)), new LightWork().light(ask))).toBeLessThan(0.05);
    expect(isSame(work.light(ask).rgba, before)).toBe(true);
    const letGo = { ...movedBy(ask, 0.7), moving: false };
    work.light(movedBy(ask, 0.7));
    expect(isSame(work.light(letGo).rgba, new LightWork().light(letGo).rgba)).toBe(true);
  });

  it('follows what is switched meanwhile', async () => {
    const ask = await askOfYard();
    const work = new LightWork();
    work.light(ask);
    const lit = work.light(movedBy(ask, 0.5));
    const ids = ask.scene.sources.map(({ id }) => id);
    const onlyMoved = { [ids[0]!]: 1 };
    const one = work.light({ ...movedBy(ask, 0.5), shares: onlyMoved });
    const none = work.light({ ...movedBy(ask, 0.5), shares: {} });
    const sum = ({ rgba }: LightMap) => rgba.reduce((all, value) => all + value, 0);
    expect(sum(one)).toBeGreaterThan(0);
    expect(sum(one)).toBeLessThan(sum(lit) * 0.6);
    expect(sum(none)).toBe(0);
    expect(sum(work.light(movedBy(ask, 0.5)))).toBeCloseTo(sum(lit), 3);
  });
});
