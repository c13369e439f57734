import { cableLengths, estimateRequestOf } from '@lampwright/geometry/estimate';
import {
  addZone,
  apply,
  type EditResult,
  placeFace,
  placeTree,
  setFields,
  usualSchedule,
} from '@lampwright/geometry/plan';
import { describe, expect, it } from 'vitest';
import { type Driver, yardWith } from '../tools/driver.testkit';
import { nodesInOrder, outlineOf } from './outline';
import { FOLD_FROM, unfoldedFor, visibleRows } from './visible';

function outline(d: Driver) {
  const lengths = cableLengths(d.doc);
  const unwired = new Set(estimateRequestOf(d.doc, lengths).unwired);
  return outlineOf(d.doc, { answers: null, unwired }, lengths, {
    length: (m) => (m === null ? '–' : `${m.toFixed(2)} m`),
    area: (use) => use,
  });
}

const text = (d: Driver) => outline(d).map((r) => `${'  '.repeat(r.level - 1)}${r.title}`);

describe('the ledger', () => {
  it('lists transformer, common, run and what hangs on it, in the order of the cable', () => {
    const d = yardWith(3);
    // Drawn from the far end inwards: the ledger still begins at the transformer.
    d.use('cable').click(700, 100).click(500, 100).click(300, 100).click(100, 100).key('Enter');
    expect(text(d)).toEqual([
      'T1',
      '  Common 1',
      '    Run 1',
      '      P1 Brass path light, 3 W',
      '      P2 Brass path light, 3 W',
      '      P3 Brass path light, 3 W',
      '      Cable, 3 lengths',
      '        P3 to P2',
      '        P2 to P1',
      '        P1 to T1',
      'Times and zones',
      '  The plan’s lights',
    ]);
  });

  it('says what a run is made of and how long its cable is, slack included', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const run = outline(d).find((r) => r.kind === 'run')!;
    expect(run.detail).toBe('12 AWG · 12 V tap');
    // 2 m drawn, 0.9144 m slack at the transformer and 0.6096 m at the fixture.
    expect(run.figure).toBe('3.52 m');
  });

  it('tells what is not wired yet, and what waits for a scale', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const result = setFields(d.doc, ['sheet'], 'sheet', { references: [] });
    if (result.kind !== 'change') throw new Error('the scale could not be taken away');
    d.doc = apply(d.doc, result.change);
    const rows = outline(d);
    expect(rows.find((r) => r.title.startsWith('P2'))).toMatchObject({
      figure: 'not wired yet',
      look: { kind: 'unwired' },
    });
    expect(rows.find((r) => r.title.startsWith('P1'))).toMatchObject({
      figure: '',
      look: { kind: 'waiting' },
    });
    expect(rows.find((r) => r.kind === 'run')!.figure).toBe('waits for scale');
  });

  it('has a line for everything that the drawing can choose', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    d.use('hub').click(900, 600);
    d.use('measure').click(800, 800).click(900, 800).key('Enter');
    d.use('cable').click(900, 600).click(1100, 900).key('Enter');
    const listed = new Set(outline(d).map((r) => r.recordId));
    for (const record of d.doc.values()) {
      if (['sheet', 'item'].includes(record.kind)) continue;
      // A bare splice is part of its cable: it goes and comes with it.
      if (record.kind === 'junction' && record.style === 'splice') continue;
      expect(listed, record.kind).toContain(record.id);
    }
    const keys = outline(d).map((r) => r.key);
    expect(new Set(keys).size).toBe(keys.length);
  });

  it('lists walls and trees with their heights, and zones with what is in them', () => {
    const d = yardWith(2);
    const made = (result: EditResult) => {
      if (result.kind !== 'change') throw new Error('it was refused');
      d.doc = apply(d.doc, result.change);
    };
    const points = [
      { x: 0, y: 0 },
      { x: 300, y: 0 },
      { x: 300, y: 200 },
    ];
    made(
      placeTree(d.doc, {
        sheetId: 'sheet',
        foot: points[0]!,
        outline: points,
        heightMeters: 6,
        crownBaseMeters: 0,
      }),
    );
    made(placeFace(d.doc, { sheetId: 'sheet', name: 'House', foot: points, top: null, heightMeters: 2.75 }));
    made(addZone(d.doc, { name: 'Pond', schedule: usualSchedule }, [d.all('fixture')[0]!.id]));
    const lines = outline(d).map((r) => [r.title, r.detail, r.figure].filter(Boolean).join(' | '));
    expect(lines.slice(lines.indexOf('Walls and trees'))).toEqual([
      'Walls and trees',
      'House | 2.75 m',
      'Tree | 6.00 m',
      'Times and zones',
      'The plan’s lights | From sunset until 23:00',
      'Pond | From sunset until 23:00 | 1 light',
    ]);
  });

  it('walks each branch to its end before the next', () => {
    const d = yardWith(4);
    d.use('cable').click(100, 100).click(300, 100).click(500, 100).key('Enter');
    d.click(300, 100).click(700, 100).click(900, 100).key('Enter');
    const [run] = d.all('run');
    const tags = nodesInOrder(run!, d.all('cable')).map((id) => d.doc.get(id));
    expect(tags.map((r) => (r !== undefined && 'number' in r ? r.number : 0))).toEqual([1, 1, 2, 3, 4]);
  });
});

describe('folding', () => {
  it('hides cable at first, and shows it when it is opened', () => {
    const d = yardWith(1);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const rows = outline(d);
    expect(visibleRows(rows, new Set(), '').map((s) => s.row.kind)).not.toContain('cable');
    const group = rows.find((r) => r.kind === 'group')!;
    expect(visibleRows(rows, new Set([group.key]), '').map((s) => s.row.kind)).toContain('cable');
    const cable = rows.find((r) => r.kind === 'cable')!;
    const opened = unfoldedFor(rows, new Set([cable.key]));
    expect(visibleRows(rows, opened, '').map((s) => s.row.key)).toContain(cable.key);
    expect(unfoldedFor(rows, new Set())).toEqual(new Set());
  });

  it('folds to runs when the plan is long', () => {
    const d = yardWith(1);
    d.use('fixture');
    for (let i = 0; i < FOLD_FROM; i++) d.click(100 + (i % 20) * 60, 300 + Math.floor(i / 20) * 60);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const shown = visibleRows(outline(d), new Set(), '');
    expect(shown.find((s) => s.row.kind === 'run')).toMatchObject({ open: false });
    expect(shown.some((s) => s.row.title.startsWith('P1 '))).toBe(false);
  });

  it('finds lines by any of their words, with what they stand under', () => {
    const d = yardWith(2);
    d.use('cable').click(100, 100).click(300, 100).key('Enter');
    const shown = visibleRows(outline(d), new Set(), 'p1 brass').map((s) => s.row.title);
    expect(shown).toEqual(['T1', 'Common 1', 'Run 1', 'P1 Brass path light, 3 W']);
    expect(visibleRows(outline(d), new Set(), 'bollard')).toEqual([]);
  });
});
