import { describe, expect, it } from 'vitest';
import {
  apply,
  applyAll,
  changeSchema,
  compose,
  emptyPlan,
  inverse,
  isEmpty,
  PLAN_SCHEMA_VERSION,
  touched,
} from './change.js';
import { networks } from './edits/index.js';
import { sameData } from './equal.js';
import { changeProblems, planProblems } from './integrity.js';
import { countedIds, randomEdit, seeded, sheet, startPlan } from './plan.testkit.js';
import type { PlanDocument } from './records.js';

const asObject = (doc: PlanDocument) => Object.fromEntries(doc);
const seeds = [1, 2, 3, 4, 5, 6, 7, 8];

describe('random edits', () => {
  it.each(seeds)('seed %i: undone to the start equals the start, replayed equals the plan', (seed) => {
    const random = seeded(seed);
    const ids = countedIds(`s${seed}-`);
    const start = startPlan();
    let doc = start;
    const changes = [];
    const inverses = [];
    for (let i = 0; i < 250; i += 1) {
      const change = randomEdit(doc, random, ids);
      if (!change) continue;
      expect(changeSchema.safeParse(change).error).toBeUndefined();
      expect(changeProblems(doc, change)).toEqual([]);
      inverses.push(inverse(doc, change, ids()));
      changes.push(change);
      doc = apply(doc, change);
      expect(planProblems(doc)).toEqual([]);
    }
    expect(changes.length).toBeGreaterThan(80);
    expect(doc.size).toBeGreaterThan(20);
    expect(asObject(applyAll(start, changes))).toEqual(asObject(doc));
    const whole = changes.reduce((a, b) => compose(a, b, 'whole'));
    expect(asObject(apply(start, whole))).toEqual(asObject(doc));
    let back = doc;
    for (const undoing of inverses.reverse()) back = apply(back, undoing);
    expect(asObject(back)).toEqual(asObject(start));
  });

  it.each(seeds)('seed %i: every network has one run, or none where nothing feeds it', (seed) => {
    const random = seeded(seed + 1000);
    const ids = countedIds();
    let doc = startPlan();
    for (let i = 0; i < 200; i += 1) {
      const change = randomEdit(doc, random, ids);
      if (change) doc = apply(doc, change);
    }
    for (const network of networks(doc)) {
      const runs = new Set(network.cables.map((cable) => cable.runId));
      expect(runs.size).toBe(1);
      if (network.attachments.length === 0) expect([...runs]).toEqual([null]);
    }
  });

  it.each(seeds)(
    'seed %i: looking at the change alone finds what looking at the whole plan finds',
    (seed) => {
      const random = seeded(seed + 2000);
      const ids = countedIds();
      let doc = startPlan();
      let broken = 0;
      for (let i = 0; i < 200; i += 1) {
        const change = randomEdit(doc, random, ids);
        if (change) doc = apply(doc, change);
        const all = [...doc.keys()];
        const victim = all[Math.floor(random() * all.length)] as string;
        const removal = { put: {}, remove: [victim] };
        const incremental = changeProblems(doc, removal);
        const whole = planProblems(apply(doc, removal));
        const key = (p: { recordId: string; code: string }) => `${p.recordId} ${p.code}`;
        expect(incremental.map(key).sort()).toEqual(whole.map(key).sort());
        if (whole.length > 0) broken += 1;
      }
      expect(broken).toBeGreaterThan(10);
    },
  );
});

describe('a change', () => {
  const change = (put: Record<string, unknown>, remove: string[] = []) => ({
    id: 'c1',
    schema: PLAN_SCHEMA_VERSION,
    put,
    remove,
  });

  it('is refused when a key is not the id of its record', () => {
    const result = changeSchema.safeParse(change({ other: sheet() }));
    expect(result.error?.issues[0]?.message).toBe('The record under other calls itself sheet1.');
  });

  it('is refused when it names a record twice', () => {
    expect(changeSchema.safeParse(change({ sheet1: sheet() }, ['sheet1'])).success).toBe(false);
    expect(changeSchema.safeParse(change({}, ['a', 'a'])).success).toBe(false);
  });

  it('is refused beyond 5000 records', () => {
    const ids = Array.from({ length: 5001 }, (_, i) => `r${i}`);
    expect(changeSchema.safeParse(change({}, ids)).success).toBe(false);
    expect(changeSchema.safeParse(change({}, ids.slice(1))).success).toBe(true);
  });

  it('can not name the prototype of an object', () => {
    const hostile: unknown = JSON.parse('{"__proto__": {"id": "__proto__", "kind": "note"}}');
    const parsed = changeSchema.safeParse(change(hostile as Record<string, unknown>));
    expect(Object.hasOwn(parsed.data?.put ?? {}, '__proto__')).toBe(false);
    expect(changeSchema.safeParse(change({}, ['__proto__'])).success).toBe(false);
  });

  it('shares untouched records and leaves the old plan as it was', () => {
    const doc = startPlan();
    const next = apply(doc, { put: { sheet2: sheet('sheet2', 1) }, remove: ['settings'] });
    expect(next.get('sheet1')).toBe(doc.get('sheet1'));
    expect(doc.has('settings')).toBe(true);
    expect(touched({ put: { sheet2: sheet('sheet2') }, remove: ['settings'] })).toEqual([
      'sheet2',
      'settings',
    ]);
    expect(apply(doc, { put: {}, remove: [] })).toBe(doc);
    expect(isEmpty(inverse(emptyPlan, { put: {}, remove: ['gone'] }, 'i'))).toBe(true);
  });
});

describe('sameData', () => {
  it('ignores the order of keys and keys that hold undefined, nothing else', () => {
    expect(sameData({ a: 1, b: [1, { c: 2 }] }, { b: [1, { c: 2 }], a: 1, d: undefined })).toBe(true);
    expect(sameData({ a: 1 }, { a: 1, b: null })).toBe(false);
    expect(sameData([1, 2], [2, 1])).toBe(false);
    expect(sameData([], {})).toBe(false);
    expect(sameData(0, -0)).toBe(true);
  });
});
