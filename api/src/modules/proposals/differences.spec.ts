import { describe, expect, it } from 'vitest';
import { sheet } from '../../../../geometry/src/plan/plan.testkit.js';
import { differencesOf } from './differences.js';
import type { RevisionDocument, ShownLight, ShownLine } from './revision-document.js';

const light = (recordId: string, edit: Partial<ShownLight> = {}): ShownLight => ({
  recordId,
  sheetId: 'sheet1',
  x: 100,
  y: 100,
  tag: recordId.toUpperCase(),
  initial: 'P',
  kind: 'path',
  name: 'Brass path light',
  lights: '',
  quantity: 1,
  groupId: null,
  technical: { volts: null, watts: null, lumens: null, beamDegrees: null, cctKelvin: null },
  ...edit,
});

const line = (key: string, edit: Partial<ShownLine> = {}): ShownLine => ({
  key,
  groupId: null,
  section: 'fixtures',
  kind: 'material',
  name: 'Brass path light',
  quantity: 2,
  unit: 'each',
  priceMinor: 20_000,
  ...edit,
});

/** On a sheet of 100 pixels to the metre, unless it has no scale. */
function documentOf(
  lights: ShownLight[],
  {
    lines = [],
    totalMinor = 0,
    scaled = true,
  }: { lines?: ShownLine[]; totalMinor?: number; scaled?: boolean } = {},
): RevisionDocument {
  const ground = sheet();
  return {
    form: 1,
    number: 1001,
    revision: 1,
    changes: null,
    madeAt: '2026-05-01T12:00:00.000Z',
    validUntil: '2026-06-01',
    currency: 'USD',
    locale: 'en-US',
    region: 'us',
    units: 'imperial',
    company: { name: 'Fernhollow Lights', email: '', phone: '', address: '', licence: '' },
    client: { name: 'Maren Holloway', email: '', phone: '', address: '' },
    job: { id: 'job', name: 'Harrow Bank', property: 'Harrow Bank' },
    plan: { version: 1, records: [scaled ? ground : { ...ground, references: [] }] },
    sheets: [],
    lights,
    price: {
      groups: [],
      lines,
      discountName: '',
      tax: null,
      stages: [{ id: 'last', name: 'When finished', due: 'finish', percent: 0 }],
      combinations: [
        {
          groups: [],
          subtotalMinor: totalMinor,
          discountMinor: 0,
          taxableMinor: 0,
          taxMinor: 0,
          totalMinor,
          stages: [],
          offerable: true,
          reason: '',
        },
      ],
    },
    words: { scope: '', exclusions: '', timeline: '', locate: '', warranty: '', terms: '', cancellation: '' },
    cautions: [],
    acceptedFaults: [],
  };
}

describe('what changed between two revisions', () => {
  it('is nothing for the same document', () => {
    const document = documentOf([light('p1')], { lines: [line('a')], totalMinor: 5 });
    expect(differencesOf(document, document)).toEqual({
      added: [],
      removed: [],
      moved: [],
      replaced: [],
      lines: [],
      wasTotalMinor: 5,
      nowTotalMinor: 5,
    });
  });

  it('names lights that came, went and became others', () => {
    const { added, removed, replaced } = differencesOf(
      documentOf([light('p1'), light('p2'), light('p3')]),
      documentOf([light('p2', { name: 'Copper path light' }), light('p3', { quantity: 2 }), light('p4')]),
    );
    expect(added).toEqual([{ recordId: 'p4', tag: 'P4', name: 'Brass path light' }]);
    expect(removed).toEqual([{ recordId: 'p1', tag: 'P1', name: 'Brass path light' }]);
    expect(replaced).toEqual([
      { recordId: 'p2', tag: 'P2', was: 'Brass path light', now: 'Copper path light' },
      { recordId: 'p3', tag: 'P3', was: 'Brass path light', now: '2 × Brass path light' },
    ]);
  });

  it('measures moves on the ground, and leaves out what nobody meant', () => {
    const before = documentOf([light('p1'), light('p2'), light('p3')]);
    const after = documentOf([
      light('p1', { x: 100 + 150 }),
      // Four centimetres, and then six.
      light('p2', { x: 104 }),
      light('p3', { y: 106 }),
    ]);
    const { moved } = differencesOf(before, after);
    expect(moved.map(({ recordId }) => recordId)).toEqual(['p1', 'p3']);
    expect(moved[0]?.meters).toBeCloseTo(1.5, 6);
    expect(moved[1]?.meters).toBeCloseTo(0.06, 6);
  });

  it('tells a move without metres where a sheet has no scale, or is another one', () => {
    const before = documentOf([light('p1'), light('p2'), light('p3')], { scaled: false });
    const after = documentOf(
      [light('p1', { x: 101.5 }), light('p2', { x: 103 }), light('p3', { sheetId: 'sheet2' })],
      { scaled: false },
    );
    expect(differencesOf(before, after).moved.map(({ tag, meters }) => [tag, meters])).toEqual([
      ['P2', null],
      ['P3', null],
    ]);
  });

  it('adds up lines that are the same thing in several groups', () => {
    const { lines, wasTotalMinor, nowTotalMinor } = differencesOf(
      documentOf([], { lines: [line('lamp'), line('wire', { name: 'Wire' })], totalMinor: 40_000 }),
      documentOf([], {
        lines: [line('lamp@base'), line('lamp@g1', { quantity: 1, priceMinor: 10_000 })],
        totalMinor: 30_000,
      }),
    );
    expect(lines).toEqual([
      { name: 'Brass path light', wasQuantity: 2, nowQuantity: 3, unit: 'each', byMinor: 10_000 },
      { name: 'Wire', wasQuantity: 2, nowQuantity: 0, unit: 'each', byMinor: -20_000 },
    ]);
    expect([wasTotalMinor, nowTotalMinor]).toEqual([40_000, 30_000]);
  });

  it('tells a change order against what was agreed, whatever was offered', () => {
    const before = documentOf([], { totalMinor: 40_000 });
    const changes = { revision: before.revision, hash: 'of it', totalMinor: 55_000 };
    const after = { ...documentOf([], { totalMinor: 57_000 }), changes };
    expect(differencesOf(before, after)).toMatchObject({ wasTotalMinor: 55_000, nowTotalMinor: 57_000 });
    const another = { ...after, changes: { ...changes, revision: before.revision + 1 } };
    expect(differencesOf(before, another).wasTotalMinor).toBe(40_000);
  });

  it('says nothing of prices of lines that are not shown', () => {
    const hidden = (quantity: number) =>
      documentOf([], { lines: [line('lamp', { quantity, priceMinor: null })] });
    expect(differencesOf(hidden(2), hidden(3)).lines).toEqual([
      { name: 'Brass path light', wasQuantity: 2, nowQuantity: 3, unit: 'each', byMinor: null },
    ]);
    expect(differencesOf(hidden(2), hidden(2)).lines).toEqual([]);
  });
});
