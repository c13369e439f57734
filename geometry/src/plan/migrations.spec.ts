import { describe, expect, it } from 'vitest';
import { apply, emptyPlan, PLAN_SCHEMA_VERSION } from './change.js';
import { planProblems } from './integrity.js';
import { type KnownForms, PlanFormError, planMigrations, readChange, readRecord } from './migrations.js';
import { cable12, halogenLamp, pathLight, transformer300 } from './plan.testkit.js';
import { planRecordSchema, type RecordKind } from './records.js';

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

/** A record of every kind that the first form knew, as it was stored then. */
const formOne = {
  sheet1: {
    kind: 'sheet',
    id: 'sheet1',
    name: 'Plot plan',
    order: 0,
    widthPx: 4000,
    heightPx: 3000,
    view: 'plan',
    pixelsPerPaperMeter: null,
    references: [{ id: 'r1', kind: 'length', a: { x: 0, y: 0 }, b: { x: 1000, y: 0 }, meters: 10 }],
    groundMetersPerPaperMeter: null,
  },
  t1: {
    kind: 'transformer',
    id: 't1',
    sheetId: 'sheet1',
    at: { x: 0, y: 0 },
    number: 1,
    name: '',
    itemId: 'i1',
    lineVolts: null,
    note: '',
  },
  feed1: { kind: 'feed', id: 'feed1', sheetId: 'sheet1', at: { x: 9, y: 9 }, transformerId: 't1', name: '' },
  f1: {
    kind: 'fixture',
    id: 'f1',
    sheetId: 'sheet1',
    at: { x: 100, y: 0 },
    number: 1,
    name: '',
    itemId: 'i2',
    lampId: null,
    quantity: 2,
    lead: null,
    note: 'By the gate.',
  },
  j1: {
    kind: 'junction',
    id: 'j1',
    sheetId: 'sheet1',
    at: { x: 50, y: 0 },
    style: 'splice',
    number: 1,
    name: '',
    itemId: null,
  },
  run1: {
    kind: 'run',
    id: 'run1',
    number: 1,
    name: 'Front',
    transformerId: 't1',
    tapId: '12V',
    commonId: 'C1',
  },
  c1: {
    kind: 'cable',
    id: 'c1',
    sheetId: 'sheet1',
    runId: 'run1',
    fromId: 't1',
    toId: 'j1',
    via: [{ x: 20, y: 5 }],
    itemId: 'i3',
    measuredMeters: null,
    slackFromMeters: null,
    slackToMeters: 0.4,
    riseMeters: 0,
    extraOhms: 0,
    markedToMarked: false,
  },
  a1: {
    kind: 'area',
    id: 'a1',
    sheetId: 'sheet1',
    use: 'building',
    name: 'House',
    points: [
      { x: 0, y: 0 },
      { x: 90, y: 0 },
      { x: 0, y: 90 },
    ],
    heightMeters: 5,
  },
  m1: {
    kind: 'measurement',
    id: 'm1',
    sheetId: 'sheet1',
    points: [
      { x: 0, y: 0 },
      { x: 90, y: 0 },
    ],
  },
  n1: { kind: 'note', id: 'n1', sheetId: 'sheet1', at: { x: 1, y: 2 }, text: 'Bury deep.' },
  i1: { kind: 'item', id: 'i1', sourceId: null, item: transformer300 },
  i2: { kind: 'item', id: 'i2', sourceId: 'cat-1', item: pathLight },
  i3: { kind: 'item', id: 'i3', sourceId: null, item: cable12 },
  i4: { kind: 'item', id: 'i4', sourceId: null, item: halogenLamp },
  settings: {
    kind: 'settings',
    id: 'settings',
    lineVolts: 120,
    conductorTemperatureC: 25,
    slackAtFixtureMeters: 0.6,
    slackAtTransformerMeters: 0.9,
    slackAtJunctionMeters: 0.3,
    waterClearanceMeters: 3.048,
  },
};

/** What the second form says beyond the first, by kind: nothing is aimed, timed or wanted that nobody asked for. */
const added: Partial<Record<RecordKind, object>> = {
  sheet: { whiteLux: null },
  transformer: { schedule: null },
  run: { schedule: null },
  fixture: { aim: null, mountingHeightMeters: null, zoneId: null },
  area: { lightTarget: null },
  measurement: { lightTarget: null },
  settings: {
    schedule: { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'clock', at: '23:00' } },
  },
};

describe('the second form', () => {
  const newInTwo: RecordKind[] = ['face', 'tree', 'zone'];
  const kinds = planRecordSchema.options.map((option) => option.shape.kind.value as RecordKind);

  it('is tested with a record of every kind that there was', () => {
    const stored = new Set(Object.values(formOne).map(({ kind }) => kind));
    expect([...stored].sort()).toEqual(kinds.filter((kind) => !newInTwo.includes(kind)).sort());
  });

  it.each(Object.values(formOne).map((record) => [`${record.kind} ${record.id}`, record] as const))(
    'reads the first form’s %s as it was, with nothing asked of its light',
    (_, record) => {
      expect(readRecord(1, record)).toEqual({ ...record, ...added[record.kind as RecordKind] });
    },
  );

  it('does not take the first form for its own', () => {
    for (const record of Object.values(formOne))
      if (added[record.kind as RecordKind]) expect(() => readRecord(2, record)).toThrow(PlanFormError);
  });

  it('reads an unsent change of the first form, and the plan of it is sound', () => {
    const change = readChange({ id: 'c', schema: 1, put: formOne, remove: [] });
    expect(change.schema).toBe(PLAN_SCHEMA_VERSION);
    expect(planProblems(apply(emptyPlan, change))).toEqual([]);
  });

  it('leaves what it was given alone', () => {
    const before = structuredClone(formOne);
    for (const record of Object.values(formOne)) readRecord(1, record);
    expect(formOne).toEqual(before);
  });
});
