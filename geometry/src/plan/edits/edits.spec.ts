import { describe, expect, it } from 'vitest';
import { apply } from '../change.js';
import { planProblems } from '../integrity.js';
import {
  cable12,
  cable16,
  choice,
  countedIds,
  first,
  must,
  pathLight,
  sheet,
  startPlan,
  transformer300,
  transformerSplit,
} from '../plan.testkit.js';
import type { CableRecord, PlanDocument, RunRecord } from '../records.js';
import {
  type CableStop,
  deleteRecords,
  drawCable,
  duplicate,
  type EditResult,
  moveRecords,
  placeFeed,
  placeFixture,
  placeTransformer,
  putRecords,
  setFields,
  setItem,
  setRunTerminals,
  splitCable,
} from './index.js';

/** A plan under edit, with names for what was placed. */
class Yard {
  doc: PlanDocument = startPlan();
  readonly ids = countedIds();

  do(result: EditResult): string[] {
    this.doc = apply(this.doc, must(result));
    expect(planProblems(this.doc)).toEqual([]);
    return result.kind === 'change' ? result.selected : [];
  }
  fixture(x: number, y: number, sheetId = 'sheet1'): string {
    const placing = { sheetId, at: { x, y }, fixture: choice(pathLight), lamp: null };
    return this.do(placeFixture(this.doc, placing, this.ids))[0] ?? '';
  }
  transformer(item = transformer300): string {
    const placing = { sheetId: 'sheet1', at: { x: 0, y: 0 }, transformer: choice(item) };
    return this.do(placeTransformer(this.doc, placing, this.ids))[0] ?? '';
  }
  try(
    stops: readonly (string | CableStop)[],
    more: { markedToMarked?: boolean; runId?: string; gauge?: 16 } = {},
  ) {
    const { gauge, ...rest } = more;
    return drawCable(
      this.doc,
      {
        sheetId: 'sheet1',
        stops: stops.map((stop) => (typeof stop === 'string' ? { on: 'record', id: stop } : stop)),
        cable: choice(gauge === 16 ? cable16 : cable12),
        ...rest,
      },
      this.ids,
    );
  }
  cable(...args: Parameters<Yard['try']>): string[] {
    return this.do(this.try(...args));
  }
  delete(...ids: string[]) {
    this.do(deleteRecords(this.doc, ids, this.ids));
  }
  cables(): CableRecord[] {
    return [...this.doc.values()].filter((r) => r.kind === 'cable');
  }
  runs(): RunRecord[] {
    return [...this.doc.values()].filter((r) => r.kind === 'run');
  }
  get(id: string | undefined) {
    return this.doc.get(id ?? '');
  }
}

describe('drawing cable', () => {
  it('starts a run on the lowest usual tap and the roomiest common', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const [f1, f2, f3] = [yard.fixture(100, 0), yard.fixture(200, 0), yard.fixture(0, 100)];
    const drawn = yard.cable([t, { on: 'sheet', at: { x: 50, y: 20 } }, f1, f2]);
    expect(drawn).toHaveLength(2);
    expect(yard.runs()).toMatchObject([{ number: 1, transformerId: t, tapId: '12V', commonId: 'C1' }]);
    expect(yard.cables().map((c) => c.runId)).toEqual([yard.runs()[0]?.id, yard.runs()[0]?.id]);
    expect(yard.get(drawn[0])).toMatchObject({ fromId: t, toId: f1, via: [{ x: 50, y: 20 }] });
    yard.cable([t, f3]);
    expect(yard.runs()[1]).toMatchObject({ number: 2, tapId: '12V', commonId: 'C2' });
  });

  it('feeds what was drawn before anything fed it', () => {
    const yard = new Yard();
    const [f1, f2] = [yard.fixture(100, 0), yard.fixture(200, 0)];
    yard.cable([f1, f2]);
    expect(yard.cables()[0]?.runId).toBeNull();
    yard.cable([yard.transformer(), f1]);
    expect(new Set(yard.cables().map((c) => c.runId))).toEqual(new Set([yard.runs()[0]?.id]));
  });

  it('tees into a cable with a splice and divides what was measured', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const f1 = yard.fixture(400, 0);
    const [home = ''] = yard.cable([t, f1]);
    yard.do(
      setFields(yard.doc, [home], 'cable', { measuredMeters: 8, riseMeters: 2, extraOhms: 0.1 }, yard.ids),
    );
    const f2 = yard.fixture(100, 100);
    yard.cable([{ on: 'cable', id: home, at: { x: 100, y: 4 } }, f2]);
    const splice = first(yard.doc, 'junction');
    expect(splice).toMatchObject({ at: { x: 100, y: 0 }, style: 'splice' });
    expect(yard.get(home)).toMatchObject({
      toId: splice.id,
      measuredMeters: 2,
      riseMeters: 0,
      extraOhms: 0.1,
    });
    const other = yard.cables().find((c) => c.toId === f1);
    expect(other).toMatchObject({ fromId: splice.id, measuredMeters: 6, riseMeters: 2, extraOhms: 0 });
    expect(new Set(yard.cables().map((c) => c.runId)).size).toBe(1);
  });

  it('caps an end on bare ground', () => {
    const yard = new Yard();
    yard.cable([yard.transformer(), { on: 'sheet', at: { x: 70, y: 0 } }]);
    expect(first(yard.doc, 'junction')).toMatchObject({ style: 'splice', at: { x: 70, y: 0 } });
  });

  it('asks for marked-to-marked before a loop, and notes it on the closing cable only', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const [f1, f2, f3] = [yard.fixture(100, 0), yard.fixture(200, 0), yard.fixture(200, 100)];
    yard.cable([t, f1, f2, f3]);
    expect(yard.try([f3, f1])).toMatchObject({ kind: 'confirm', needs: 'marked-to-marked' });
    const [closing] = yard.cable([f3, f1], { markedToMarked: true });
    expect(
      yard
        .cables()
        .filter((c) => c.markedToMarked)
        .map((c) => c.id),
    ).toEqual([closing]);
  });

  it('asks for marked-to-marked when the far end comes back to the transformer', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const f1 = yard.fixture(100, 0);
    yard.cable([t, f1]);
    expect(yard.try([f1, { on: 'sheet', at: { x: 50, y: 50 } }, t])).toMatchObject({ kind: 'confirm' });
    yard.cable([f1, { on: 'sheet', at: { x: 50, y: 50 } }, t], { markedToMarked: true });
    expect(yard.runs()).toHaveLength(1);
  });

  it('makes one run of two on the same tap and winding', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const [f1, f2] = [yard.fixture(100, 0), yard.fixture(0, 100)];
    yard.cable([t, f1]);
    yard.cable([t, f2]);
    expect(yard.runs()).toHaveLength(2);
    const asked = yard.try([f1, f2]);
    expect(asked).toMatchObject({ kind: 'confirm' });
    const joined = yard.try([f1, f2], { markedToMarked: true });
    expect(joined).toMatchObject({ notes: ['run 2 became part of run 1; both ends now land on common C1.'] });
    yard.do(joined);
    expect(yard.runs()).toHaveLength(1);
    expect(new Set(yard.cables().map((c) => c.runId)).size).toBe(1);
  });

  it('refuses joins across taps, windings and transformers in words', () => {
    const yard = new Yard();
    const t1 = yard.transformer();
    const t2 = yard.transformer(transformerSplit);
    const [f1, f2, f3, f4] = [1, 2, 3, 4].map((n) => yard.fixture(n * 100, 0)) as [
      string,
      string,
      string,
      string,
    ];
    yard.cable([t1, f1]);
    yard.cable([t1, f2]);
    yard.do(setRunTerminals(yard.doc, yard.runs()[1]?.id ?? '', { tapId: '13V' }, yard.ids));
    expect(yard.try([f1, f2], { markedToMarked: true })).toMatchObject({
      kind: 'refused',
      code: 'joins-taps',
    });
    yard.cable([t2, f3]);
    yard.cable([t2, f4]);
    expect(yard.try([f1, f3], { markedToMarked: true })).toMatchObject({ code: 'joins-transformers' });
    expect(yard.try([t1, f3], { markedToMarked: true })).toMatchObject({ code: 'joins-transformers' });
    yard.do(setRunTerminals(yard.doc, yard.runs()[3]?.id ?? '', { tapId: '12B' }, yard.ids));
    expect(yard.runs()[3]).toMatchObject({ tapId: '12B', commonId: 'CB' });
    expect(yard.try([f3, f4], { markedToMarked: true })).toMatchObject({ kind: 'refused' });
    expect(yard.try([t1, t2])).toMatchObject({ code: 'cable-between-feeds' });
    expect(yard.try([f1])).toMatchObject({ code: 'too-few-points' });
  });

  it('refuses commons of different windings even where the taps carry one name', () => {
    const yard = new Yard();
    const t = yard.transformer(transformerSplit);
    const [f1, f2] = [yard.fixture(100, 0), yard.fixture(200, 0)];
    yard.cable([t, f1]);
    yard.cable([t, f2]);
    const second = yard.runs()[1] as RunRecord;
    expect(setRunTerminals(yard.doc, second.id, { commonId: 'CB' })).toMatchObject({
      code: 'different-windings',
    });
    expect(setRunTerminals(yard.doc, second.id, { tapId: '14V' })).toMatchObject({
      code: 'unknown-terminal',
    });
  });

  it('lands on an existing run when told so', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const [f1, f2] = [yard.fixture(100, 0), yard.fixture(200, 0)];
    yard.cable([t, f1]);
    yard.cable([t, f2], { runId: yard.runs()[0]?.id });
    expect(yard.runs()).toHaveLength(1);
  });

  it('feeds a second sheet of the job from the same transformer', () => {
    const yard = new Yard();
    const t = yard.transformer();
    yard.do(putRecords(yard.doc, [sheet('sheet2', 1)], yard.ids));
    expect(placeFeed(yard.doc, { sheetId: 'sheet1', at: { x: 1, y: 1 }, transformerId: t }).kind).toBe(
      'refused',
    );
    const [feed = ''] = yard.do(
      placeFeed(yard.doc, { sheetId: 'sheet2', at: { x: 1, y: 1 }, transformerId: t }, yard.ids),
    );
    const f = yard.fixture(10, 10, 'sheet2');
    expect(yard.try([t, f])).toMatchObject({ kind: 'refused' });
    const drawing = {
      sheetId: 'sheet2',
      stops: [feed, f].map((id) => ({ on: 'record' as const, id })),
      cable: choice(cable12),
    };
    yard.do(drawCable(yard.doc, drawing, yard.ids));
    expect(yard.runs()).toMatchObject([{ transformerId: t }]);
  });
});

describe('deleting', () => {
  function chain() {
    const yard = new Yard();
    const t = yard.transformer();
    const fixtures = [100, 200, 300].map((x) => yard.fixture(x, 0)) as [string, string, string];
    const cables = yard.cable([t, ...fixtures]) as [string, string, string];
    return { yard, t, fixtures, cables };
  }

  it('a fixture in the middle keeps the rest fed by one cable through its place', () => {
    const { yard, fixtures, cables } = chain();
    yard.do(setFields(yard.doc, cables, 'cable', { slackToMeters: 0.2, riseMeters: 1 }, yard.ids));
    yard.delete(fixtures[1]);
    expect(yard.cables()).toHaveLength(2);
    expect(yard.get(cables[1])).toMatchObject({
      fromId: fixtures[0],
      toId: fixtures[2],
      via: [{ x: 200, y: 0 }],
      slackToMeters: 0.2,
      riseMeters: 2,
      runId: yard.runs()[0]?.id,
    });
  });

  it('the last fixture takes its cable', () => {
    const { yard, fixtures, cables } = chain();
    yard.delete(fixtures[2]);
    expect(yard.cables().map((c) => c.id)).toEqual([cables[0], cables[1]]);
  });

  it('the whole chain leaves nothing, and its run goes too', () => {
    const { yard, fixtures } = chain();
    yard.delete(...fixtures);
    expect(yard.cables()).toEqual([]);
    expect(yard.runs()).toEqual([]);
  });

  it('the first cable leaves the rest unfed', () => {
    const { yard, cables } = chain();
    yard.delete(cables[0]);
    expect(yard.cables().map((c) => c.runId)).toEqual([null, null]);
    expect(yard.runs()).toEqual([]);
  });

  it('cables of different gauge keep a splice where the fixture was', () => {
    const { yard, fixtures, cables } = chain();
    yard.do(setItem(yard.doc, [cables[2]], 'itemId', choice(cable16), yard.ids));
    yard.delete(fixtures[1]);
    const splice = first(yard.doc, 'junction');
    expect(splice.at).toEqual({ x: 200, y: 0 });
    expect(yard.cables().map((c) => c.runId)).toEqual(Array(3).fill(yard.runs()[0]?.id));
  });

  it('a transformer takes its runs; its cables stay, capped and unfed', () => {
    const { yard, t, cables } = chain();
    yard.delete(t);
    expect(yard.runs()).toEqual([]);
    expect(yard.cables().map((c) => c.id)).toEqual(cables);
    expect(yard.cables().map((c) => c.runId)).toEqual([null, null, null]);
    expect(first(yard.doc, 'junction')).toMatchObject({ at: { x: 0, y: 0 }, style: 'splice' });
  });

  it('the branch of a tee heals the cable that it left', () => {
    const { yard, cables } = chain();
    const f = yard.fixture(50, 90);
    const [branch = ''] = yard.cable([{ on: 'cable', id: cables[0], at: { x: 50, y: 0 } }, f]);
    expect(yard.cables()).toHaveLength(5);
    yard.delete(branch);
    expect(yard.cables()).toHaveLength(3);
    expect([...yard.doc.values()].some((r) => r.kind === 'junction')).toBe(false);
    expect(yard.get(cables[0])).toMatchObject({ via: [{ x: 50, y: 0 }] });
  });

  it('a sheet takes everything on it', () => {
    const { yard } = chain();
    yard.delete('sheet1');
    expect(new Set([...yard.doc.values()].map((r) => r.kind))).toEqual(new Set(['settings', 'item']));
  });

  it('refuses items in use and the settings', () => {
    const { yard, fixtures } = chain();
    const fixture = yard.get(fixtures[0]);
    const itemId = fixture?.kind === 'fixture' ? fixture.itemId : '';
    expect(deleteRecords(yard.doc, [itemId])).toMatchObject({ kind: 'refused', code: 'in-use' });
    expect(deleteRecords(yard.doc, ['settings'])).toMatchObject({ kind: 'refused' });
  });
});

describe('other edits', () => {
  it('places a fixture on a cable, which then runs through it', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const f1 = yard.fixture(200, 0);
    const [home = ''] = yard.cable([t, f1]);
    const placing = {
      sheetId: 'sheet1',
      at: { x: 60, y: 3 },
      fixture: choice(pathLight),
      lamp: null,
      onCableId: home,
    };
    const [f2] = yard.do(placeFixture(yard.doc, placing, yard.ids));
    expect(yard.get(f2)).toMatchObject({ at: { x: 60, y: 0 }, number: 2 });
    expect(yard.cables().map((c) => [c.fromId, c.toId])).toEqual([
      [t, f2],
      [f2, f1],
    ]);
  });

  it('uses an equal copy of an item again', () => {
    const yard = new Yard();
    yard.fixture(1, 1);
    yard.fixture(2, 2);
    expect([...yard.doc.values()].filter((r) => r.kind === 'item')).toHaveLength(1);
  });

  it('moves fixtures and leaves the bends of their cables', () => {
    const yard = new Yard();
    const [f1, f2] = [yard.fixture(0, 0), yard.fixture(100, 0)];
    const [cable = ''] = yard.cable([f1, { on: 'sheet', at: { x: 50, y: 50 } }, f2]);
    yard.do(moveRecords(yard.doc, [f1, f2], 10, 0, yard.ids));
    expect(yard.get(cable)).toMatchObject({ via: [{ x: 50, y: 50 }] });
    yard.do(moveRecords(yard.doc, [cable], 10, 0, yard.ids));
    expect(yard.get(cable)).toMatchObject({ via: [{ x: 60, y: 50 }] });
    expect(moveRecords(yard.doc, [f1], 1e6, 0)).toMatchObject({ kind: 'refused', code: 'out-of-range' });
  });

  it('duplicates a transformer with what hangs on it, on runs of its own', () => {
    const yard = new Yard();
    const t = yard.transformer();
    const f1 = yard.fixture(100, 0);
    const [cable = ''] = yard.cable([t, f1]);
    const copies = yard.do(duplicate(yard.doc, [t, f1, cable], { dx: 20, dy: 20 }, yard.ids));
    expect(copies).toHaveLength(3);
    expect(yard.runs()).toHaveLength(2);
    expect(yard.runs()[1]).toMatchObject({ number: 2, tapId: '12V' });
    expect(yard.get(copies[1])).toMatchObject({ number: 2, at: { x: 120, y: 20 } });
  });

  it('splits at bends without losing any', () => {
    const yard = new Yard();
    const [f1, f2] = [yard.fixture(0, 0), yard.fixture(300, 0)];
    const bends = [100, 200].map((x) => ({ on: 'sheet' as const, at: { x, y: 0 } }));
    const [cable = ''] = yard.cable([f1, ...bends, f2]);
    yard.do(splitCable(yard.doc, cable, { x: 150, y: 9 }, yard.ids));
    expect(yard.cables().map((c) => c.via)).toEqual([[{ x: 100, y: 0 }], [{ x: 200, y: 0 }]]);
  });

  it('refuses an item of another category', () => {
    const yard = new Yard();
    const f1 = yard.fixture(0, 0);
    expect(setItem(yard.doc, [f1], 'itemId', choice(cable12))).toMatchObject({ kind: 'refused' });
  });
});
