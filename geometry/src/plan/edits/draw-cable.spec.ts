import { describe, expect, it } from 'vitest';
import { cable12, choice, first, sheet, transformerSplit } from '../plan.testkit.js';
import type { RunRecord } from '../records.js';
import { drawCable, placeFeed, putRecords, setFields, setRunTerminals } from './index.js';
import { Yard } from './yard.testkit.js';

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
