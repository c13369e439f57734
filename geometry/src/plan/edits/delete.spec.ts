import { describe, expect, it } from 'vitest';
import { cable16, choice, first } from '../plan.testkit.js';
import { deleteRecords, setFields, setItem } from './index.js';
import { Yard } from './yard.testkit.js';

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
