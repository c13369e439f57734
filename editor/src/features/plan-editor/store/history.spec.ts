import { type Change, moveRecords } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { must, randomEdit, seeded } from '../../../../../geometry/src/plan/plan.testkit.js';
import { rest, setting, toObject } from './store.testkit';

describe('undo and redo', () => {
  it('takes one gesture back as one step, and makes it again', async () => {
    const { open, note } = setting();
    const { store } = open();
    await store.start();
    const start = toObject(store.present());
    store.gesture('Two notes', (gesture) => {
      gesture.make(note(store, 'a'));
      gesture.make(note(store, 'b'));
    });
    const made = toObject(store.present());
    expect(store.history.getState().undoable.map((step) => step.label)).toEqual(['Two notes']);
    expect(store.undo()).toEqual({ label: 'Two notes', kept: [] });
    expect(toObject(store.present())).toEqual(start);
    expect(store.redo()).toEqual({ label: 'Two notes', kept: [] });
    expect(toObject(store.present())).toEqual(made);
    expect(store.redo()).toBeNull();
  });

  it('makes nothing of a gesture that throws, and collects nothing afterwards', async () => {
    const { open, note } = setting();
    const { store } = open();
    await store.start();
    let leaked: ((change: Change) => void) | undefined;
    expect(() =>
      store.gesture('Broken', (gesture) => {
        gesture.make(note(store, 'a'));
        leaked = gesture.make;
        throw new Error('dropped');
      }),
    ).toThrow('dropped');
    expect(store.present().size).toBe(2);
    expect(() => leaked?.(note(store, 'b'))).toThrow(/has ended/);
    store.make(note(store, 'c'), 'Note');
    expect(store.present().size).toBe(3);
    expect(store.undo()).toMatchObject({ label: 'Note' });
    expect(store.present().size).toBe(2);
  });

  it('never reverts what somebody else did since', async () => {
    const { server, open, fixture, ids } = setting();
    const { store } = open();
    await store.start();
    const [f, g] = [fixture(store, 100), fixture(store, 200)];
    store.make(must(moveRecords(store.present(), [f, g], 5, 0, ids)), 'Move both');
    await rest();
    server.commit(must(moveRecords(server.plan, [g], 0, 7, ids)));
    await rest();
    expect(store.undo()).toEqual({ label: 'Move both', kept: [g] });
    await rest();
    expect(server.plan.get(f)).toMatchObject({ at: { x: 100, y: 0 } });
    expect(server.plan.get(g)).toMatchObject({ at: { x: 205, y: 7 } });
  });

  it.each([31, 32])('seed %i: undone to the start equals the start', async (seed) => {
    const { open, ids, server } = setting();
    const { store } = open();
    await store.start();
    const random = seeded(seed);
    const start = toObject(store.present());
    for (let i = 0; i < 120; i += 1) {
      const change = randomEdit(store.present(), random, ids);
      if (change) store.make(change, `step ${i}`);
    }
    await rest();
    while (store.undo());
    expect(toObject(store.present())).toEqual(start);
    await rest();
    expect(toObject(server.plan)).toEqual(start);
    while (store.redo());
    await rest();
    expect(toObject(server.plan)).toEqual(toObject(store.present()));
    expect(store.present().size).toBeGreaterThan(20);
  });
});
