import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { combinationsOf, type Discount, type PaymentStage, stagesOf, type Terms, totalsOf } from './index.js';

const seed = Date.now() % 1_000_000_007;
const noCap = { percent: null, amountMinor: null };
const percent = fc.integer({ min: 0, max: 1_000_000 }).map((n) => n / 10_000);
const groupIds = ['a', 'b', 'c', 'd', 'e', 'f'];

const line = fc.record({
  groupId: fc.option(fc.constantFrom(...groupIds), { nil: null }),
  priceMinor: fc.option(fc.integer({ min: 0, max: 100_000_000 }), { nil: null }),
  taxable: fc.boolean(),
});
const discount: fc.Arbitrary<Discount> = fc.oneof(
  fc.constant({ kind: 'none' as const }),
  percent.map((p) => ({ kind: 'percent' as const, percent: p, name: '' })),
  fc
    .integer({ min: 0, max: 1_000_000_000 })
    .map((amountMinor) => ({ kind: 'amount' as const, amountMinor, name: '' })),
);
const stages: fc.Arbitrary<PaymentStage[]> = fc
  .array(
    fc.record({
      due: fc.constantFrom('approval' as const, 'start' as const, 'finish' as const),
      percent: fc.integer({ min: 0, max: 200_000 }).map((n) => n / 10_000),
    }),
    { minLength: 1, maxLength: 5 },
  )
  .map((list) => list.map((stage, i) => ({ ...stage, id: `s${i}`, name: `Stage ${i}` })));
const cap = fc.record({
  percent: fc.option(percent, { nil: null }),
  amountMinor: fc.option(fc.integer({ min: 0, max: 10_000_000 }), { nil: null }),
});

/** How far a sum may be from the exact one: half a minor unit for each rounding on the way. */
const HALF = 0.5 + 1e-6;

describe(`sums of a price (seed ${seed})`, () => {
  it('add up to the cent for any discount, tax, stages and set of groups', () => {
    fc.assert(
      fc.property(
        fc.array(line, { maxLength: 40 }),
        fc.subarray(groupIds),
        discount,
        fc.option(percent, { nil: null }),
        stages,
        cap,
        (lines, groups, d, taxPercent, s, depositCap) => {
          const terms: Terms = { discount: d, taxPercent, stages: s, depositCap };
          const t = totalsOf(lines, groups, terms);
          const taken = lines.filter((l) => l.groupId === null || groups.includes(l.groupId));
          const sum = (list: typeof lines) => list.reduce((n, l) => n + (l.priceMinor ?? 0), 0);
          expect(t.subtotalMinor).toBe(sum(taken));
          expect(t.totalMinor).toBe(t.subtotalMinor - t.discountMinor + t.taxMinor);
          expect(t.stages.reduce((n, stage) => n + stage.amountMinor, 0)).toBe(t.totalMinor);
          for (const value of [t.discountMinor, t.taxableMinor, t.taxMinor, t.totalMinor]) {
            expect(Number.isSafeInteger(value)).toBe(true);
            expect(value).toBeGreaterThanOrEqual(0);
          }
          expect(t.discountMinor).toBeLessThanOrEqual(t.subtotalMinor);
          const exactDiscount =
            d.kind === 'none'
              ? 0
              : d.kind === 'percent'
                ? (t.subtotalMinor * d.percent) / 100
                : Math.min(d.amountMinor, t.subtotalMinor);
          expect(Math.abs(t.discountMinor - exactDiscount)).toBeLessThanOrEqual(HALF);
          const taxed = taxPercent === null ? 0 : sum(taken.filter((l) => l.taxable));
          const exactTaxable = t.subtotalMinor === 0 ? 0 : taxed * (1 - t.discountMinor / t.subtotalMinor);
          expect(Math.abs(t.taxableMinor - exactTaxable)).toBeLessThanOrEqual(HALF);
          expect(Math.abs(t.taxMinor - (t.taxableMinor * (taxPercent ?? 0)) / 100)).toBeLessThanOrEqual(HALF);
          const deposit = t.stages
            .filter((stage) => stage.due === 'approval')
            .reduce((n, stage) => n + stage.amountMinor, 0);
          if (depositCap.percent !== null)
            expect(deposit).toBeLessThanOrEqual((t.totalMinor * depositCap.percent) / 100 + 1e-6);
          if (depositCap.amountMinor !== null) expect(deposit).toBeLessThanOrEqual(depositCap.amountMinor);
        },
      ),
      { seed, numRuns: 1000 },
    );
  });

  it('differ between two sets of groups by exactly the lines that differ, before discount and tax', () => {
    fc.assert(
      fc.property(
        fc.array(line, { maxLength: 40 }),
        fc.subarray(groupIds),
        fc.constantFrom(...groupIds),
        (lines, groups, extra) => {
          const terms: Terms = {
            discount: { kind: 'none' },
            taxPercent: null,
            stages: [{ id: 's', name: 's', due: 'finish', percent: 100 }],
            depositCap: noCap,
          };
          const without = groups.filter((id) => id !== extra);
          const more =
            totalsOf(lines, [...without, extra], terms).totalMinor -
            totalsOf(lines, without, terms).totalMinor;
          expect(more).toBe(
            lines.filter((l) => l.groupId === extra).reduce((n, l) => n + (l.priceMinor ?? 0), 0),
          );
        },
      ),
      { seed, numRuns: 300 },
    );
  });
});

describe('sums of a price', () => {
  it('are those of a worked example: 3,330.00, 6 % on materials of 1,450.00, 30 % deposit', () => {
    const lines = [
      { groupId: null, priceMinor: 98_000, taxable: false },
      { groupId: 'path', priceMinor: 79_000, taxable: true },
      { groupId: 'path', priceMinor: 45_000, taxable: false },
      { groupId: 'shrubs', priceMinor: 66_000, taxable: true },
      { groupId: 'shrubs', priceMinor: 45_000, taxable: false },
      { groupId: 'wall', priceMinor: 129_000, taxable: true },
    ];
    const stage = (id: string, due: PaymentStage['due'], p: number): PaymentStage => ({
      id,
      name: id,
      due,
      percent: p,
    });
    const terms: Terms = {
      discount: { kind: 'none' },
      taxPercent: 6,
      stages: [stage('deposit', 'approval', 30), stage('final', 'finish', 70)],
      depositCap: noCap,
    };
    expect(totalsOf(lines, ['path', 'shrubs'], terms)).toEqual({
      groups: ['path', 'shrubs'],
      subtotalMinor: 333_000,
      discountMinor: 0,
      taxableMinor: 145_000,
      taxMinor: 8_700,
      totalMinor: 341_700,
      stages: [
        { id: 'deposit', name: 'deposit', due: 'approval', percent: 30, amountMinor: 102_510, capped: false },
        { id: 'final', name: 'final', due: 'finish', percent: null, amountMinor: 239_190, capped: false },
      ],
    });
  });

  it('keep the deposit within the cap of the law, and ask for the rest later', () => {
    const only: PaymentStage[] = [{ id: 'all', name: 'All', due: 'approval', percent: 100 }];
    expect(stagesOf(100_00, only, { percent: 10, amountMinor: null })).toEqual([
      { id: 'all', name: 'All', due: 'approval', percent: null, amountMinor: 1000, capped: true },
      { id: 'balance', name: 'Balance', due: 'finish', percent: null, amountMinor: 9000, capped: false },
    ]);
    const two: PaymentStage[] = [
      { id: 'deposit', name: 'Deposit', due: 'approval', percent: 50 },
      { id: 'final', name: 'Balance', due: 'finish', percent: 50 },
    ];
    expect(
      stagesOf(333_33, two, { percent: 33.3333, amountMinor: 1000_00 }).map((s) => s.amountMinor),
    ).toEqual([11110, 22223]);
    expect(stagesOf(333_33, two, { percent: null, amountMinor: 100_00 })[0]).toMatchObject({
      amountMinor: 10000,
      capped: true,
    });
  });

  it('list every set of groups once, the offered one first', () => {
    const group = (id: string, on: boolean) => ({ id, name: id, description: '', on });
    const sets = combinationsOf({ groups: [group('a', true), group('b', false), group('c', true)] });
    expect(sets[0]).toEqual(['a', 'c']);
    expect(new Set(sets.map((s) => s.join())).size).toBe(8);
    expect(combinationsOf({ groups: [] })).toEqual([[]]);
  });
});
