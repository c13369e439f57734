import { placeNote } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { must, randomEdit, seeded } from '../../../../../geometry/src/plan/plan.testkit.js';
import { rest, setting, toObject, type Weather } from './store.testkit';

describe('everything at once', () => {
  it.each([41, 42, 43, 44])('seed %i: reloads, kills, losses: every edit is there once', async (seed) => {
    const { server, open, ids, clock, storage } = setting();
    const random = seeded(seed);
    let bad = 0.4;
    const weathers: Weather[] = ['lost-on-the-way', 'answer-lost', 'down', 'signed-out'];
    server.weather = () => (random() < bad ? weathers[Math.floor(random() * weathers.length)]! : 'fine');
    const made: string[] = [];
    let window = open();
    await window.store.start();
    for (let i = 0; i < 300; i += 1) {
      const dice = random();
      const { store } = window;
      if (store.document.getState().status === 'ready' && dice < 0.6) {
        const text = `note ${i}`;
        store.make(
          must(placeNote(store.present(), { sheetId: 'sheet1', at: { x: i, y: i }, text }, ids)),
          'Note',
        );
        made.push(text);
        if (random() < 0.5) await rest(Math.floor(random() * 20));
        await store.written();
      } else if (dice < 0.7) {
        window.kill();
        window = open();
        await window.store.start();
      } else if (dice < 0.85) await store.resume();
      else {
        clock.pass();
        await rest(10);
      }
    }
    bad = 0;
    for (let i = 0; i < 10 && storage.kept.size > 0; i += 1) {
      await window.store.resume();
      await rest();
    }
    const texts = server.log
      .flatMap(({ change }) => Object.values(change.put))
      .flatMap((r) => (r.kind === 'note' ? [r.text] : []));
    expect([...texts].sort()).toEqual([...made].sort());
    expect(made.length).toBeGreaterThan(40);
    expect(server.isSound()).toBe(true);
    expect(toObject(window.store.present())).toEqual(toObject(server.plan));
    expect(window.store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
  });

  it.each([51, 52, 53])('seed %i: two people edit at random and come to the same plan', async (seed) => {
    const shared = setting();
    const { server, ids } = shared;
    const random = seeded(seed);
    const people = [shared.open(), shared.open()];
    for (const { store } of people) await store.start();
    let down = false;
    server.weather = () => (down ? 'down' : 'fine');
    let conflicts = 0;
    const settleAll = async () => {
      for (let i = 0; i < 6; i += 1)
        for (const { store } of people) {
          await store.resume();
          await rest();
          const { phase, conflicts: found } = store.saving.getState();
          if (phase !== 'conflict') continue;
          conflicts += 1;
          for (const { recordId } of found)
            await store.resolveConflict(recordId, random() < 0.5 ? 'mine' : 'theirs');
          await rest();
        }
    };
    for (let i = 0; i < 300; i += 1) {
      const { store } = people[random() < 0.5 ? 0 : 1]!;
      const change = randomEdit(store.present(), random, ids);
      if (change) store.make(change, `step ${i}`);
      if (random() < 0.1) down = !down;
      if (!down && random() < 0.3) await settleAll();
    }
    down = false;
    await settleAll();
    expect(conflicts).toBeGreaterThan(0);
    expect(server.isSound()).toBe(true);
    for (const { store } of people) {
      expect(store.saving.getState()).toMatchObject({ phase: 'saved', unsent: 0 });
      expect(toObject(store.present())).toEqual(toObject(server.plan));
    }
  });
});
