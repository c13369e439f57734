import { describe, expect, it } from 'vitest';
import { cable12, choice, pathLight } from '../plan.testkit.js';
import { duplicate, moveRecords, placeFixture, setItem, splitCable } from './index.js';
import { Yard } from './yard.testkit.js';

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
