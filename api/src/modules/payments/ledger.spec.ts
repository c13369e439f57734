import { describe, expect, it } from 'vitest';
import { balanceOf, changeTo, type DueSums } from './ledger.js';

const due = (id: string, amountMinor: number, reducedMinor = 0): DueSums => ({
  id,
  amountMinor,
  reducedMinor,
});
const paid = (id: string, dueId: string, amountMinor: number) =>
  ({ id, dueId, amountMinor, status: 'succeeded' }) as const;
const back = (paymentId: string, amountMinor: number, status: 'pending' | 'succeeded' | 'failed') => ({
  paymentId,
  amountMinor,
  status,
});
const three = [due('a', 300), due('b', 400), due('c', 300)];

describe('the balance', () => {
  it('counts what came in less what goes back, until that fails', () => {
    const payments = [
      paid('p', 'a', 300),
      { id: 'q', dueId: 'b', amountMinor: 400, status: 'open' as const },
      { id: 'r', dueId: 'b', amountMinor: 400, status: 'failed' as const },
      { id: 's', dueId: 'b', amountMinor: 400, status: 'expired' as const },
    ];
    const sums = (status: 'pending' | 'succeeded' | 'failed') => {
      const { paidMinor, outstandingMinor, creditMinor } = balanceOf(three, payments, [
        back('p', 100, status),
      ]);
      return [paidMinor, outstandingMinor, creditMinor];
    };
    expect(sums('pending')).toEqual([200, 800, 0]);
    expect(sums('succeeded')).toEqual([200, 800, 0]);
    expect(sums('failed')).toEqual([300, 700, 0]);
  });

  it('tells what was paid beyond a due as credit', () => {
    expect(balanceOf(three, [paid('p', 'a', 350)], [])).toMatchObject({
      agreedMinor: 1000,
      paidMinor: 350,
      outstandingMinor: 700,
      creditMinor: 50,
    });
  });
});

describe('a change order', () => {
  const change = (totalMinor: number, dues: DueSums[], payments: ReturnType<typeof paid>[] = []) => {
    const { reduced, moreMinor } = changeTo(totalMinor, balanceOf(dues, payments, []));
    return { reduced: Object.fromEntries(reduced), moreMinor };
  };

  it('that costs more is a due of its own', () => {
    expect(change(1250, three)).toEqual({ reduced: {}, moreMinor: 250 });
  });

  it('that costs less shrinks the last unpaid dues, from behind', () => {
    expect(change(900, three)).toEqual({ reduced: { c: 100 }, moreMinor: 0 });
    expect(change(600, three)).toEqual({ reduced: { b: 100, c: 300 }, moreMinor: 0 });
    expect(change(600, three, [paid('p', 'c', 250)])).toEqual({ reduced: { b: 350, c: 50 }, moreMinor: 0 });
  });

  it('that costs less than what is paid leaves credit', () => {
    const all = [paid('p', 'a', 300), paid('q', 'b', 400), paid('r', 'c', 300)];
    const { reduced } = changeTo(650, balanceOf(three, all, []));
    expect(Object.fromEntries(reduced)).toEqual({ b: 50, c: 300 });
    const after = three.map((one) => ({ ...one, reducedMinor: reduced.get(one.id) ?? 0 }));
    expect(balanceOf(after, all, [])).toMatchObject({
      agreedMinor: 650,
      outstandingMinor: 0,
      creditMinor: 350,
    });
  });

  it('that costs more uses up credit first', () => {
    const all = [paid('p', 'a', 300), paid('q', 'b', 400), paid('r', 'c', 300)];
    const dues = [due('a', 300), due('b', 400, 50), due('c', 300, 300)];
    expect(change(900, dues, all)).toEqual({ reduced: { b: 0, c: 100 }, moreMinor: 0 });
    expect(change(1200, dues, all)).toEqual({ reduced: { b: 0, c: 0 }, moreMinor: 200 });
  });

  it('to nothing takes everything', () => {
    expect(change(0, three)).toEqual({ reduced: { a: 300, b: 400, c: 300 }, moreMinor: 0 });
  });
});
