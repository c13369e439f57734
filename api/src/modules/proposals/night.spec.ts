import { PLAN_SCHEMA_VERSION } from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { demoDocument, harrowBank, sandpiperRow } from '../../paper/paper.testkit.js';
import { differencesOf } from './differences.js';
import { nightScenesOf } from './night.js';
import type { RevisionDocument } from './revision-document.js';

const SHEET = 'sheet';
const kept = { pictures: { [SHEET]: 'kept.jpg' } };

type Records = RevisionDocument['plan']['records'];
const withRecords = (document: RevisionDocument, records: Records): RevisionDocument => ({
  ...document,
  plan: { ...document.plan, records },
});

/** What the second form of a record added. */
const LATER = ['whiteLux', 'schedule', 'aim', 'mountingHeightMeters', 'zoneId', 'lightTarget'] as const;
const LATER_KINDS: readonly string[] = ['face', 'tree', 'zone'];

/** The same as it was frozen before there was a second form of records, and before evenings were kept. */
function asOfOld(document: RevisionDocument): RevisionDocument {
  const { evening: _evening, ...rest } = document;
  const records = document.plan.records
    .filter(({ kind }) => !LATER_KINDS.includes(kind))
    .map((record) => {
      const old: Record<string, unknown> = { ...record };
      for (const key of LATER) delete old[key];
      return old as Records[number];
    });
  return { ...rest, plan: { version: document.plan.version, records } };
}

describe('the night of a revision', () => {
  it('has a scene for each sheet with a picture and a scale, and for no other', () => {
    const document = demoDocument(harrowBank);
    const [scene, ...others] = nightScenesOf(kept, document);
    expect(others).toEqual([]);
    expect(scene).toMatchObject({ sheetId: SHEET, view: 'photo' });
    expect(scene!.sources.map(({ id }) => id).sort()).toEqual(
      document.lights.map(({ recordId }) => recordId).sort(),
    );
    expect(nightScenesOf({ pictures: {} }, document)).toEqual([]);
    const unscaled = document.plan.records.map((record) =>
      record.kind === 'sheet' ? { ...record, references: [], groundMetersPerPaperMeter: null } : record,
    );
    expect(nightScenesOf(kept, withRecords(document, unscaled))).toEqual([]);
  });

  it('shows lamps at the volts that were frozen, and switches them with the groups that were', () => {
    const document = demoDocument(harrowBank);
    const [first] = document.lights;
    const at = (volts: number | null) => {
      const lights = document.lights.map((light) => ({
        ...light,
        technical: { ...light.technical, volts: light === first ? volts : 12 },
      }));
      const { sources } = nightScenesOf(kept, { ...document, lights })[0]!;
      return new Map(sources.map(({ id, output }) => [id, output]));
    };
    // Without a figure it is shown as at its rated volts; at a twelfth of them no driver starts.
    expect(at(null).get(first!.recordId)).toBe(1);
    const [whole, dark] = [at(12), at(1)];
    expect(dark.get(first!.recordId)).toBeLessThan(0.05);
    expect(whole.get(first!.recordId)).toBeGreaterThan(0.9);
    for (const [id, output] of dark) if (id !== first!.recordId) expect(output).toBe(whole.get(id));
    const groups = new Map(nightScenesOf(kept, document)[0]!.sources.map(({ id, groupId }) => [id, groupId]));
    for (const { recordId, groupId } of document.lights) expect(groups.get(recordId)).toBe(groupId);
    expect(new Set(groups.values())).toEqual(new Set([null, 'tree', 'bed']));
  });

  it('tells nothing of notes, names of items and people, numbers of parts or prices', () => {
    const document = demoDocument(sandpiperRow);
    const secret = 'Gate code 4711';
    const records = document.plan.records.map((record) =>
      'note' in record ? { ...record, note: secret } : record,
    );
    const noted = withRecords(document, [
      ...records,
      { kind: 'note', id: 'n1', sheetId: SHEET, at: { x: 1, y: 1 }, text: secret },
    ]);
    const told = JSON.stringify(nightScenesOf(kept, noted));
    expect(told).toContain(document.lights[0]!.recordId);
    const items = document.plan.records.filter(({ kind }) => kind === 'item');
    expect(items.length).toBeGreaterThan(3);
    for (const { item } of items as unknown as { item: { name: string } }[])
      expect(told).not.toContain(item.name);
    for (const word of [
      secret,
      document.client.name,
      document.company.name,
      'Minor',
      'cost',
      'volts',
      'watts',
    ])
      expect(told).not.toContain(word);
  });

  it('is there for a revision of the first form, whose records know nothing of light', () => {
    const old = asOfOld(demoDocument(sandpiperRow));
    expect(old.plan.schema).toBeUndefined();
    const [scene] = nightScenesOf(kept, old);
    expect(scene!.sources).toHaveLength(old.lights.length);
    expect(scene!.zones.map(({ schedule }) => schedule.off)).toEqual([{ kind: 'clock', at: '23:00' }]);
    expect(() =>
      nightScenesOf(kept, { ...old, plan: { ...old.plan, schema: PLAN_SCHEMA_VERSION } }),
    ).toThrow();
  });
});

describe('what changed between two revisions', () => {
  it('is told from the first form to the second, and says nothing of evenings or forms', () => {
    const document = demoDocument(harrowBank);
    const old = asOfOld(document);
    const nothing = { added: [], removed: [], moved: [], replaced: [], lines: [] };
    expect(differencesOf(old, document)).toMatchObject(nothing);
    const elsewhere = { place: null, timeZone: 'Europe/London' };
    expect(differencesOf(document, { ...document, evening: elsewhere })).toMatchObject(nothing);
    const [first, ...rest] = document.lights;
    const moved = differencesOf(old, { ...document, lights: [{ ...first!, x: first!.x + 60 }, ...rest] });
    expect(moved.moved).toHaveLength(1);
    expect(moved.moved[0]!.meters).toBeGreaterThan(0.05);
  });
});
