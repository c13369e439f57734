import { expect, it } from 'vitest';
import { amountTyped } from './amount';
import type { Due, Payment, Refund } from './api';
import { dueStanding, nextDue, refundable, refundHint } from './words';

const due = (change: Partial<Due> = {}): Due => ({
  id: 'due',
  name: 'Deposit',
  due: 'start',
  amountMinor: 100_000,
  reducedMinor: 0,
  paidMinor: 0,
  outstandingMinor: 100_000,
  requestedAt: null,
  ...change,
});
const payment: Payment = {
  id: 'payment',
  dueId: 'due',
  method: 'card',
  status: 'succeeded',
  amountMinor: 100_000,
  refundedMinor: 20_000,
  receivedOn: null,
  note: '',
  recordedBy: '',
  createdAt: '2026-05-03T18:00:00.000Z',
  settledAt: '2026-05-03T18:01:00.000Z',
};
const refund = (status: Refund['status'], amountMinor: number): Refund => ({
  id: status,
  paymentId: 'payment',
  amountMinor,
  reason: 'One light less.',
  status,
  createdAt: '2026-05-04T18:00:00.000Z',
});

it('says how a due stands', () => {
  expect(dueStanding(due())).toBe('Due when work begins');
  expect(dueStanding(due({ requestedAt: '2026-05-03T12:00:00.000Z' }))).toMatch(/^Asked for on /);
  expect(dueStanding(due({ outstandingMinor: 0, paidMinor: 100_000 }))).toBe('Paid');
  expect(dueStanding(due({ outstandingMinor: 0, reducedMinor: 100_000 }))).toContain('change order');
});

it('looks first at what was asked for', () => {
  const first = due({ id: 'a', outstandingMinor: 0 });
  const later = due({ id: 'b' });
  const asked = due({ id: 'c', requestedAt: '2026-05-03T12:00:00.000Z' });
  expect(nextDue({ dues: [first, later, asked] })?.id).toBe('c');
  expect(nextDue({ dues: [first, later] })?.id).toBe('b');
  expect(nextDue({ dues: [first] })).toBeUndefined();
});

it('pays back no more than came in, what is on its way counted', () => {
  expect(refundable(payment, [refund('succeeded', 20_000)])).toBe(80_000);
  expect(refundable(payment, [refund('succeeded', 20_000), refund('pending', 30_000)])).toBe(50_000);
  expect(refundable(payment, [refund('succeeded', 20_000), refund('failed', 30_000)])).toBe(80_000);
  expect(refundable({ ...payment, status: 'open' }, [])).toBe(0);
});

it('reads an amount as it is typed, up to what there is', () => {
  const amount = amountTyped({ currency: 'USD', locale: 'en-US' }, 100_000);
  expect(amount.parse('1,000')).toBe(100_000);
  expect(amount.parse('$12.50')).toBe(1250);
  for (const wrong of ['', '0', 'much', '1.005', '1,000.01'])
    expect(amount.safeParse(wrong).success).toBe(false);
});

it('says what paying back comes to: owed again, but for what a change order took off', () => {
  const money = (minor: number) => `$${minor / 100}`;
  expect(refundHint(money, 50_000, 0)).toMatch(/^At most \$500\. It is owed again afterwards/);
  expect(refundHint(money, 50_000, 20_000)).toBe(
    'At most $500. What is over the $200 that is to go back is owed again.',
  );
  expect(refundHint(money, 50_000, 50_000)).toBe('At most $500.');
});
