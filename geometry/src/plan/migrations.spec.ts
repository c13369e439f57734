import { describe, expect, it } from 'vitest';
import { PLAN_SCHEMA_VERSION } from './change.js';
import { type KnownForms, PlanFormError, planMigrations, readChange, readRecord } from './migrations.js';

/** Pretends that notes once called their words `words` and their place `x`, `y`, two forms ago. */
const known: KnownForms = {
  version: PLAN_SCHEMA_VERSION,
  migrations: [
    {
      from: PLAN_SCHEMA_VERSION - 2,
      record: ({ words, ...rest }) => (rest.kind === 'note' ? { ...rest, text: words } : rest),
    },
    {
      from: PLAN_SCHEMA_VERSION - 1,
      record: ({ x, y, ...rest }) => (rest.kind === 'note' ? { ...rest, at: { x, y } } : rest),
    },
  ],
};

describe('reading changes', () => {
  const note = { kind: 'note', id: 'n1', sheetId: 's1', at: { x: 1, y: 2 }, text: 'Bury deep.' };
  const change = { id: 'c1', schema: PLAN_SCHEMA_VERSION, put: { n1: note }, remove: ['n0'] };

  it('takes today’s form as it is', () => {
    expect(readChange(change)).toEqual(change);
    expect(readRecord(PLAN_SCHEMA_VERSION, note)).toEqual(note);
  });

  it('refuses a newer form in words', () => {
    const newer = { ...change, schema: PLAN_SCHEMA_VERSION + 1 };
    expect(() => readChange(newer)).toThrow(PlanFormError);
    expect(() => readChange(newer)).toThrow(/newer version of Lampwright .*Reload the page/);
    expect(() => readRecord(PLAN_SCHEMA_VERSION + 1, note)).toThrow(PlanFormError);
  });

  it('says what is wrong with a change', () => {
    expect(() => readChange({ ...change, extra: 1 })).toThrow(/extra/);
    expect(() => readChange({ ...change, put: { n1: { ...note, text: 3 } } })).toThrow(/put\/n1\/text/);
    expect(() => readChange(null)).toThrow(PlanFormError);
    expect(() => readChange({ ...change, schema: 1.5 })).toThrow(PlanFormError);
  });

  it('has one migration for each form before the present one', () => {
    expect(planMigrations.map((m) => m.from)).toEqual(
      Array.from({ length: PLAN_SCHEMA_VERSION - 1 }, (_, i) => i + 1),
    );
  });
});

describe('migrating', () => {
  // Forms are numbered from 1, so the pretended history is moved up to leave room for two older ones.
  const shifted: KnownForms = {
    version: known.version + 2,
    migrations: known.migrations.map((m) => ({ ...m, from: m.from + 2 })),
  };

  it('takes a record through every step in order', () => {
    const oldest = { kind: 'note', id: 'n1', sheetId: 's1', x: 1, y: 2, words: 'Bury deep.' };
    expect(readRecord(PLAN_SCHEMA_VERSION, oldest, shifted)).toEqual({
      kind: 'note',
      id: 'n1',
      sheetId: 's1',
      at: { x: 1, y: 2 },
      text: 'Bury deep.',
    });
  });

  it('brings an unsent change of an older form to today on receipt', () => {
    const oldest = { kind: 'note', id: 'n1', sheetId: 's1', x: 1, y: 2, words: 'Bury deep.' };
    const read = readChange(
      { id: 'c1', schema: PLAN_SCHEMA_VERSION, put: { n1: oldest }, remove: [] },
      shifted,
    );
    expect(read.schema).toBe(PLAN_SCHEMA_VERSION);
    expect(read.put.n1).toMatchObject({ at: { x: 1, y: 2 }, text: 'Bury deep.' });
  });

  it('says which step is missing', () => {
    const gap = { ...shifted, migrations: shifted.migrations.slice(1) };
    expect(() => readRecord(PLAN_SCHEMA_VERSION, { kind: 'note' }, gap)).toThrow(/no way from plan form/);
  });
});
