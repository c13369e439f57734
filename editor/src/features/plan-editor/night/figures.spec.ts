import { groundLux, spaceOf } from '@lampwright/geometry/light';
import { apply, setFields } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { nightOfYard } from './night.testkit';

/** The yard at night with a path measured under its three lamps. */
async function measured() {
  const made = nightOfYard();
  const { night, yard, frames } = made;
  yard.use('measure').click(100, 130).click(900, 130).key('Enter');
  const path = yard.all('measurement')[0]!;
  const follow = () => night.follow({ doc: yard.doc, selection: new Set([path.id]) });
  follow();
  night.open();
  await frames.settle();
  return { ...made, path };
}

describe('figures of light', () => {
  it('are told of the chosen path, as the lamps light it', async () => {
    const { night, path } = await measured();
    const { answer, stale } = night.figures.state.getState();
    const figures = answer!.figures.get(path.id)!;
    expect(stale).toBe(false);
    expect(figures.least.lux).toBeLessThanOrEqual(figures.meanLux);
    expect(figures.meanLux).toBeLessThanOrEqual(figures.most.lux);
    const { x, y, lux } = figures.most;
    expect(lux).toBeCloseTo(groundLux(spaceOf(night.lit()!), x, y), 9);
  });

  it('go when nothing is chosen and nothing has a target; a target keeps them', async () => {
    const { night, frames, path, yard } = await measured();
    night.follow({ selection: new Set() });
    await frames.settle();
    expect(night.figures.state.getState().answer!.figures.size).toBe(0);
    const lightTarget = { leastLux: 1, meanLux: null, uniformity: null };
    const result = setFields(yard.doc, [path.id], 'measurement', { lightTarget });
    if (result.kind !== 'change') throw new Error('The target was not taken.');
    night.follow({ doc: apply(yard.doc, result.change) });
    await frames.settle();
    expect(night.figures.state.getState().answer!.figures.has(path.id)).toBe(true);
  });

  it('leave out what is switched off for looking', async () => {
    const { night, frames, path, transformer } = await measured();
    night.lookAtZone(transformer.id, 'off');
    await frames.settle();
    expect(night.figures.state.getState().answer!.figures.get(path.id)!.most.lux).toBe(0);
  });

  it('wait while the hand is at work', async () => {
    const { night, frames, fixtures, path } = await measured();
    const before = night.figures.state.getState().answer;
    night.follow({ preview: { kind: 'move', ids: new Set([fixtures[0]!.id]), dx: 300, dy: 0 } });
    await frames.settle();
    expect(night.figures.state.getState().answer).toBe(before);
    night.follow({ preview: null, selection: new Set([path.id]) });
    await frames.settle();
    expect(night.figures.state.getState().stale).toBe(false);
  });
});

describe('figures on the ground', () => {
  it('stand at even steps around the lamps, coarse ones first, each with its light', async () => {
    const { night, frames } = await measured();
    expect(night.state.getState().lattice).toEqual([]);
    night.showLux(true);
    await frames.settle();
    const { lattice } = night.state.getState();
    const { lux } = night.figures.state.getState().answer!;
    expect(lattice.length).toBeGreaterThan(100);
    expect(lux).toHaveLength(lattice.length);
    expect(lattice[0]!.ground.x % 4).toBeCloseTo(0, 9);
    const space = spaceOf(night.lit()!);
    const brightest = lux.indexOf(Math.max(...lux));
    const { ground, at } = lattice[brightest]!;
    expect(lux[brightest]).toBeCloseTo(groundLux(space, ground.x, ground.y), 9);
    // 100 pixels a metre; the brightest place is beside one of the lamps at y = 100.
    expect(Math.abs(at.y - 100)).toBeLessThan(60);
    night.showLux(false);
    await frames.settle();
    expect(night.state.getState().lattice).toEqual([]);
  });
});
