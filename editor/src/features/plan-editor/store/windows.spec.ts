import 'fake-indexeddb/auto';
import { describe, expect, it } from 'vitest';
import { indexedDbStorage } from './outbox';
import { memoryStorage, rest, setting, toObject, xOf } from './store.testkit';

describe('windows that go away', () => {
  it('leave their unsent changes to the next one, which sends each once', async () => {
    const { server, open, note, texts } = setting();
    const first = open();
    await first.store.start();
    server.weather = () => 'down';
    for (const text of ['a', 'b']) first.store.make(note(first.store, text), 'Note');
    await rest();
    first.kill();
    server.weather = () => 'fine';
    const { store } = open();
    await store.start();
    await rest();
    expect(texts()).toEqual(['a', 'b']);
    expect(toObject(store.present())).toEqual(toObject(server.plan));
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
  });

  it('killed between the server’s yes and its arrival: nothing twice, nothing in conflict', async () => {
    const { server, open, fixture, move } = setting();
    const first = open();
    await first.store.start();
    const f = fixture(first.store, 100);
    await rest();
    server.weather = () => 'answer-lost';
    move(first.store, f, 1);
    await rest();
    move(first.store, f, 1);
    await rest();
    first.kill();
    server.weather = () => 'fine';
    const second = open();
    await second.store.start();
    move(second.store, f, 1);
    await rest();
    expect(second.store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    expect(xOf(server.plan, f)).toBe(103);
    expect(server.isSound()).toBe(true);
  });

  it('are built upon before what they left is saved, without conflict', async () => {
    const { server, open, fixture, move } = setting();
    const first = open();
    await first.store.start();
    const f = fixture(first.store, 100);
    await rest();
    server.weather = () => 'lost-on-the-way';
    move(first.store, f, 1);
    await rest();
    first.kill();
    const { store } = open();
    await store.start();
    move(store, f, 1);
    await rest();
    server.weather = () => 'fine';
    await store.resume();
    await rest();
    expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    expect(xOf(server.plan, f)).toBe(102);
  });

  it('keep IndexedDB in order across reloads', async () => {
    const { server, open, note, texts } = setting({ ...indexedDbStorage(), kept: new Map() });
    server.weather = () => 'down';
    for (const text of ['a', 'b', 'c']) {
      server.weather = () => 'fine';
      const window = open();
      await window.store.start();
      server.weather = () => 'lost-on-the-way';
      window.store.make(note(window.store, text), 'Note');
      await window.store.written();
      await rest();
      window.kill();
    }
    server.weather = () => 'fine';
    const { store } = open();
    await store.start();
    for (let i = 0; i < 20 && store.saving.getState().phase !== 'saved'; i += 1) await rest();
    expect(texts()).toEqual(['a', 'b', 'c']);
    expect(server.isSound()).toBe(true);
  });

  it('of another person or plan stay untouched', async () => {
    const storage = memoryStorage();
    const one = setting(storage);
    const two = setting(storage);
    one.server.weather = () => 'down';
    one.server.weather = () => 'fine';
    const window = one.open();
    await window.store.start();
    one.server.weather = () => 'down';
    window.store.make(one.note(window.store, 'a'), 'Note');
    await rest();
    window.kill();
    const other = two.open();
    await other.store.start();
    await rest();
    expect(two.texts()).toEqual([]);
    expect(storage.kept.size).toBe(1);
  });
});

describe('two windows of one browser', () => {
  it('share the outbox without sending anything twice', async () => {
    const { server, open, note, texts } = setting();
    const [a, b] = [open(), open()];
    await a.store.start();
    await b.store.start();
    server.weather = () => 'down';
    a.store.make(note(a.store, 'a'), 'Note');
    b.store.make(note(b.store, 'b'), 'Note');
    await rest();
    server.weather = () => 'fine';
    await Promise.all([a.store.resume(), b.store.resume()]);
    await rest();
    expect(texts()).toEqual(['a', 'b']);
    expect(server.isSound()).toBe(true);
    for (const { store } of [a, b]) {
      expect(toObject(store.present())).toEqual(toObject(server.plan));
      expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
    }
  });

  it('are told apart: the same record changed in both is a conflict, not an overwrite', async () => {
    const { server, open, fixture, move } = setting();
    const [a, b] = [open(), open()];
    await a.store.start();
    const f = fixture(a.store, 100);
    await rest();
    await b.store.start();
    server.weather = () => 'down';
    move(a.store, f, 5);
    move(b.store, f, 9);
    await rest();
    server.weather = () => 'fine';
    await a.store.resume();
    await b.store.resume();
    await rest();
    expect(b.store.saving.getState()).toMatchObject({ phase: 'conflict', conflicts: [{ recordId: f }] });
    expect(xOf(server.plan, f)).toBe(105);
  });

  it('take over from one another while open', async () => {
    const { server, open, note, texts } = setting();
    const [a, b] = [open(), open()];
    await a.store.start();
    await b.store.start();
    server.weather = () => 'down';
    a.store.make(note(a.store, 'a'), 'Note');
    await rest();
    a.kill();
    server.weather = () => 'fine';
    await b.store.resume();
    await rest();
    expect(texts()).toEqual(['a']);
    expect(toObject(b.store.present())).toEqual(toObject(server.plan));
  });
});
