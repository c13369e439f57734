import { emptyPricing, type JobPricing, type QuoteGroup, type QuoteLine } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { arrange, groupsWithEdits, linesWithEdits } from './arrange';
import { addGroup, override, putManualLine, removeGroup, removeManualLine } from './store/edits';

const line = (key: string, more: Partial<QuoteLine> = {}): QuoteLine => ({
  key,
  groupId: null,
  section: 'fixtures',
  kind: 'material',
  name: key,
  quantity: 5,
  unit: 'each',
  source: 'P1 to P5',
  recordIds: ['p1'],
  itemId: null,
  priceMinor: 50_000,
  costMinor: null,
  taxable: true,
  origin: 'plan',
  planned: null,
  note: '',
  ...more,
});
const group = (id: string | null, name = 'Base'): QuoteGroup => ({
  id,
  name,
  description: '',
  on: true,
  fixtures: 0,
  priceMinor: 0,
});
const walk = { id: 'walk', name: 'Front walk', description: '', on: true };
const permit = {
  id: 'permit',
  groupId: 'walk',
  kind: 'labour' as const,
  name: 'Permit',
  quantity: 2,
  unit: 'each' as const,
  costMinor: null,
  priceMinor: 4_500,
  taxable: false,
};
const withWalk = addGroup(walk)(emptyPricing);
const only = (lines: readonly QuoteLine[], pricing: JobPricing) => linesWithEdits(lines, pricing)[0];

describe('lines with the edits that the quote does not know yet', () => {
  it('are the quote’s where nothing was edited', () => {
    expect(only([line('a')], emptyPricing)).toEqual({ ...line('a'), ahead: false });
  });

  it('show a typed quantity and price at once, beside what the plan says', () => {
    const pricing = override('a', { quantity: 4, priceMinor: 39_000, note: 'one less' })(emptyPricing);
    expect(only([line('a')], pricing)).toMatchObject({
      quantity: 4,
      priceMinor: 39_000,
      origin: 'overridden',
      planned: { quantity: 5, priceMinor: 50_000 },
      note: 'one less',
      ahead: true,
    });
  });

  it('go back to the plan’s as soon as the override is taken away', () => {
    const quoted = line('a', {
      quantity: 4,
      priceMinor: 39_000,
      origin: 'overridden',
      planned: { quantity: 5, priceMinor: 50_000 },
      note: 'one less',
    });
    expect(only([quoted], emptyPricing)).toEqual({ ...line('a'), ahead: true });
  });

  it('follow lines by hand as they are added, changed and removed', () => {
    const added = putManualLine(permit)(withWalk);
    expect(linesWithEdits([], added)).toMatchObject([
      { key: 'manual:permit', groupId: 'walk', section: 'labour', priceMinor: 9_000, ahead: true },
    ]);
    const quoted = line('manual:permit', {
      ...permit,
      section: 'labour',
      priceMinor: 9_000,
      origin: 'manual',
    });
    const changed = putManualLine({ ...permit, quantity: 3 })(added);
    expect(only([quoted], changed)).toMatchObject({ quantity: 3, priceMinor: 13_500, ahead: true });
    expect(linesWithEdits([quoted], removeManualLine('permit')(added))).toEqual([]);
  });

  it('stay in sight when their group is removed', () => {
    const quoted = line('a', { groupId: 'walk' });
    expect(only([quoted], removeGroup('walk')(withWalk))?.groupId).toBeNull();
  });
});

describe('lines by group and section', () => {
  it('begin with the base, keep the order of sections, and keep a group that is empty', () => {
    const lines = linesWithEdits(
      [
        line('labour', { section: 'labour', kind: 'labour' }),
        line('p', { groupId: 'walk' }),
        line('cable', { section: 'cable', unit: 'foot' }),
        line('f'),
      ],
      addGroup({ ...walk, id: 'trees' })(withWalk),
    );
    const arranged = arrange([group(null), group('walk'), group('trees')], lines);
    expect(
      arranged.map(({ group: { id }, sections }) => [id, sections.map(({ section }) => section)]),
    ).toEqual([
      [null, ['fixtures', 'cable', 'labour']],
      ['walk', ['fixtures']],
      ['trees', []],
    ]);
  });

  it('show a group before the quote knows it', () => {
    const quote = { groups: [group(null)] };
    expect(groupsWithEdits(quote, withWalk).map(({ id, name }) => [id, name])).toEqual([
      [null, 'Base'],
      ['walk', 'Front walk'],
    ]);
  });
});
