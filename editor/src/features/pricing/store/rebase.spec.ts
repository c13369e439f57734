import { emptyPricing, type JobPricing, jobPricingSchema } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import {
  addGroup,
  assign,
  changeGroup,
  type Edit,
  override,
  putManualLine,
  removeGroup,
  removeManualLine,
  setControl,
  setTerms,
} from './edits';
import { rebase } from './rebase';

const group = (id: string) => ({ id, name: `Group ${id}`, description: '', on: true });
const line = (id: string) => ({
  id,
  groupId: null,
  kind: 'material' as const,
  name: `Line ${id}`,
  quantity: 1,
  unit: 'each' as const,
  costMinor: null,
  priceMinor: 100,
  taxable: true,
});
const after = (pricing: JobPricing, ...edits: readonly Edit[]): JobPricing =>
  edits.reduce((so, edit) => edit(so), pricing);

const base = after(
  emptyPricing,
  addGroup(group('a')),
  assign(['f1', 'f2'], 'a'),
  putManualLine(line('m')),
  override('labour/path', { quantity: 3, priceMinor: null, note: 'counted on site' }),
);

describe('my changes on top of somebody else’s', () => {
  it('keeps both where they touch different things', () => {
    const mine = after(
      base,
      changeGroup('a', { name: 'Front walk' }),
      assign(['f3'], 'a'),
      override('labour/path', { quantity: 3, priceMinor: 9900, note: 'counted on site' }),
    );
    const theirs = after(
      base,
      changeGroup('a', { on: false }),
      setTerms({ taxExempt: true }),
      override('labour/path', { quantity: 4, priceMinor: null, note: 'counted on site' }),
      putManualLine(line('n')),
    );
    const { pricing, clashes, notes } = rebase(base, mine, theirs);
    expect(clashes).toEqual([]);
    expect(notes).toEqual([]);
    expect(pricing.groups).toEqual([{ id: 'a', name: 'Front walk', description: '', on: false }]);
    expect(pricing.members).toEqual({ f1: 'a', f2: 'a', f3: 'a' });
    expect(pricing.overrides['labour/path']).toEqual({
      quantity: 4,
      priceMinor: 9900,
      note: 'counted on site',
    });
    expect(pricing.taxExempt).toBe(true);
    expect(pricing.manualLines.map(({ id }) => id)).toEqual(['m', 'n']);
  });

  it('names what both changed, and takes the side that is asked for', () => {
    const mine = after(base, setTerms({ aimingVisits: 2 }), changeGroup('a', { name: 'Mine' }));
    const theirs = after(base, setTerms({ aimingVisits: 3 }), changeGroup('a', { name: 'Theirs' }));
    const left = rebase(base, mine, theirs);
    expect(left.clashes).toEqual([
      { part: 'group', id: 'a' },
      { part: 'visits', id: '' },
    ]);
    expect(left.pricing.aimingVisits).toBe(3);
    const right = rebase(base, mine, theirs, ({ part }) => (part === 'visits' ? 'mine' : 'theirs'));
    expect(right.pricing.aimingVisits).toBe(2);
    expect(right.pricing.groups[0]?.name).toBe('Theirs');
  });

  it('clashes over a line that one removed and the other changed', () => {
    const mine = after(base, putManualLine({ ...line('m'), priceMinor: 250 }));
    const theirs = after(base, removeManualLine('m'));
    const { clashes, pricing } = rebase(base, mine, theirs);
    expect(clashes).toEqual([{ part: 'manual-line', id: 'm' }]);
    expect(pricing.manualLines).toEqual([]);
    expect(rebase(base, mine, theirs, () => 'mine').pricing.manualLines[0]?.priceMinor).toBe(250);
  });

  it('says that lights lost the group they were put in', () => {
    const mine = after(base, assign(['f3', 'f4'], 'a'));
    const theirs = after(base, removeGroup('a'));
    const { pricing, clashes, notes } = rebase(base, mine, theirs);
    expect(clashes).toEqual([]);
    expect(pricing.members).toEqual({});
    expect(notes).toEqual(['2 lights are in the base again: their group was removed.']);
  });

  it('never makes more groups than there may be, and says which one gave way', () => {
    const full = after(base, ...['b', 'c', 'd', 'e'].map((id) => addGroup(group(id))));
    const mine = after(full, addGroup(group('mine')), assign(['f9'], 'mine'));
    const theirs = after(full, addGroup(group('theirs')));
    const { pricing, notes } = rebase(full, mine, theirs);
    expect(pricing.groups.map(({ id }) => id)).toEqual(['a', 'b', 'c', 'd', 'e', 'theirs']);
    expect(notes[0]).toContain('“Group mine”');
    expect(jobPricingSchema.safeParse(pricing).success).toBe(true);
  });

  it('gives a valid pricing, and mine or theirs where the other did nothing, for random edits', () => {
    const seed = 20_261_201;
    let state = seed;
    const random = (n: number): number => {
      state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
      return Math.floor((state / 2 ** 32) * n);
    };
    const id = (letter: string, n: number) => `${letter}${random(n)}`;
    const anyEdit = (so: JobPricing): JobPricing => {
      const one = so.groups[random(so.groups.length)]?.id ?? null;
      switch (random(8)) {
        case 0:
          return so.groups.length === 0 || random(2) === 0 ? addGroup(group(`g${random(1e6)}`))(so) : so;
        case 1:
          return one === null ? so : changeGroup(one, { name: `Name ${random(5)}` })(so);
        case 2:
          return one === null ? so : removeGroup(one)(so);
        case 3:
          return assign([id('f', 6), id('f', 6)], one)(so);
        case 4:
          return override(
            id('k', 4),
            random(3) === 0 ? null : { quantity: random(5), priceMinor: null, note: '' },
          )(so);
        case 5:
          return putManualLine({ ...line(id('m', 4)), groupId: one, quantity: random(9) })(so);
        case 6:
          return setControl(id('t', 3), random(2) === 0 ? null : undefined)(so);
        default:
          return setTerms({ aimingVisits: random(4) })(so);
      }
    };
    const some = (from: JobPricing, most: number) => {
      let so = from;
      for (let i = random(most + 1); i > 0; i--) so = anyEdit(so);
      return so;
    };
    for (let round = 0; round < 400; round++) {
      const from = some(emptyPricing, 12);
      const mine = some(from, 6);
      const theirs = some(from, 6);
      const { pricing } = rebase(from, mine, theirs, () => (random(2) === 0 ? 'mine' : 'theirs'));
      expect(jobPricingSchema.safeParse(pricing).success, `seed ${seed}, round ${round}`).toBe(true);
      expect(rebase(from, mine, from).pricing, `seed ${seed}, round ${round}`).toEqual(mine);
      expect(rebase(from, from, theirs).pricing, `seed ${seed}, round ${round}`).toEqual(theirs);
    }
  });
});
