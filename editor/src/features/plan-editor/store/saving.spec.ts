import { type Change, PLAN_SCHEMA_VERSION, placeNote } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { must, startPlan } from '../../../../../geometry/src/plan/plan.testkit.js';
import { memoryStorage, rest, setting, toObject } from './store.testkit';

describe('saving', () => {
  it('shows a change at once, saves it, and says so', async () => {
    const { server, open, note } = setting();
    const { store } = open();
    await store.start();
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    store.make(note(store, 'hello'), 'Note');
    expect(store.saving.getState()).toMatchObject({ phase: 'saving', unsent: 1 });
    expect(store.present().size).toBe(3);
    const present = store.present();
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    // The picture did not change by being saved.
    expect(store.present()).toBe(present);
    expect(toObject(server.plan)).toEqual(toObject(store.present()));
  });

  it('has one request under way at a time, and what is made meanwhile goes in the next', async () => {
    const { server, open, note, texts } = setting();
    const { store } = open();
    await store.start();
    for (const text of ['a', 'b', 'c', 'd']) {
      store.make(note(store, text), 'Note');
      await Promise.resolve();
    }
    await rest();
    expect(texts()).toEqual(['a', 'b', 'c', 'd']);
    expect(server.saves).toBeLessThan(4);
  });

  it('keeps what it can’t send, tries again ever more slowly, and sends each once', async () => {
    const { server, open, note, clock, storage, texts } = setting();
    const { store } = open();
    await store.start();
    server.weather = () => 'down';
    for (const text of ['a', 'b', 'c']) store.make(note(store, text), 'Note');
    const waits: number[] = [];
    for (let i = 0; i < 8; i += 1) {
      await rest();
      waits.push(...clock.waiting);
      clock.pass();
    }
    expect(waits).toEqual([1000, 2000, 4000, 8000, 16_000, 30_000, 30_000, 30_000]);
    expect(store.saving.getState()).toMatchObject({ phase: 'offline', unsent: 3 });
    expect(storage.kept.size).toBe(3);
    server.weather = () => 'fine';
    await rest();
    clock.pass();
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    expect(storage.kept.size).toBe(0);
    expect(texts()).toEqual(['a', 'b', 'c']);
    expect(server.isSound()).toBe(true);
  });

  it('keeps what is unsent when signed out, and sends it after the next sign-in', async () => {
    const { server, open, note, storage, texts } = setting();
    const { store } = open();
    await store.start();
    server.weather = () => 'signed-out';
    store.make(note(store, 'a'), 'Note');
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'signed-out', unsent: 1 });
    store.make(note(store, 'b'), 'Note');
    await rest();
    expect(storage.kept.size).toBe(2);
    server.weather = () => 'fine';
    await store.resume();
    await rest();
    expect(texts()).toEqual(['a', 'b']);
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
  });

  it('still sends when the browser keeps nothing, and says that it does not', async () => {
    const { open, note, texts } = setting({
      ...memoryStorage(),
      set: () => Promise.reject(new Error('no room')),
      keys: () => Promise.reject(new Error('no storage')),
    });
    const { store } = open();
    await store.start();
    store.make(note(store, 'a'), 'Note');
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', kept: false });
    expect(texts()).toEqual(['a']);
  });

  it('tries again when the browser can’t read what it keeps', async () => {
    const storage = memoryStorage();
    let broken = false;
    const { open, note, clock, texts } = setting({
      ...storage,
      get: (key) => (broken ? Promise.reject(new Error('not now')) : storage.get(key)),
    });
    const { store } = open();
    await store.start();
    broken = true;
    store.make(note(store, 'a'), 'Note');
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'offline', unsent: 1 });
    broken = false;
    clock.pass();
    await rest();
    expect(texts()).toEqual(['a']);
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
  });

  it('follows what others do', async () => {
    const { server, open, note, ids } = setting();
    const { store } = open();
    await store.start();
    store.make(note(store, 'mine'), 'Note');
    const theirs = must(
      placeNote(startPlan(), { sheetId: 'sheet1', at: { x: 2, y: 2 }, text: 'theirs' }, ids),
    );
    server.commit(theirs);
    await rest();
    expect(toObject(store.present())).toEqual(toObject(server.plan));
    expect(store.present().size).toBe(4);
  });
});

describe('an outbox from a newer version of the product', () => {
  it('is kept, and said in words', async () => {
    const { open, note, storage, server } = setting();
    const first = open();
    await first.store.start();
    server.weather = () => 'down';
    first.store.make(note(first.store, 'a'), 'Note');
    await rest();
    first.kill();
    for (const [key, value] of storage.kept) {
      const entry = value as { change: Change };
      storage.kept.set(key, { ...entry, change: { ...entry.change, schema: PLAN_SCHEMA_VERSION + 1 } });
    }
    server.weather = () => 'fine';
    const { store } = open();
    await store.start();
    await rest();
    expect(store.saving.getState()).toMatchObject({
      phase: 'refused',
      message: expect.stringMatching(/Reload the page/),
    });
    expect(storage.kept.size).toBe(1);
  });
});
