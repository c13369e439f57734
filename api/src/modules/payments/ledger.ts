/**
 * What is agreed, paid and owed on one proposal, in minor units of its currency. At every moment
 *
 *     agreed = paid + outstanding − credit
 *
 * where paid is what came in less what goes or went back. A refund therefore opens its due again, except for
 * what was credit: what a change order took off, or somebody paid, beyond what is owed.
 */
export interface DueSums {
  readonly id: string;
  readonly amountMinor: number;
  readonly reducedMinor: number;
}
export interface PaymentSums {
  readonly id: string;
  readonly dueId: string;
  readonly status: 'open' | 'succeeded' | 'failed' | 'expired';
  readonly amountMinor: number;
}
export interface RefundSums {
  readonly paymentId: string;
  readonly status: 'pending' | 'succeeded' | 'failed';
  readonly amountMinor: number;
}

export interface DueBalance {
  readonly id: string;
  /** As agreed, less what change orders took off. */
  readonly netMinor: number;
  readonly reducedMinor: number;
  readonly paidMinor: number;
  readonly outstandingMinor: number;
  readonly creditMinor: number;
}
export interface Balance {
  readonly agreedMinor: number;
  readonly paidMinor: number;
  readonly outstandingMinor: number;
  readonly creditMinor: number;
  /** In the order of the dues. */
  readonly dues: readonly DueBalance[];
}

const sum = (amounts: readonly number[]): number => amounts.reduce((total, amount) => total + amount, 0);

/** What goes or went back of a payment: a refund counts from when it is asked for, until it fails. */
export const refundedOf = (paymentId: string, refunds: readonly RefundSums[]): number =>
  sum(
    refunds
      .filter((refund) => refund.paymentId === paymentId && refund.status !== 'failed')
      .map(({ amountMinor }) => amountMinor),
  );

export function balanceOf(
  dues: readonly DueSums[],
  payments: readonly PaymentSums[],
  refunds: readonly RefundSums[],
): Balance {
  const paidOf = (dueId: string) =>
    sum(
      payments
        .filter((payment) => payment.dueId === dueId && payment.status === 'succeeded')
        .map(({ id, amountMinor }) => amountMinor - refundedOf(id, refunds)),
    );
  const balances = dues.map(({ id, amountMinor, reducedMinor }) => {
    const netMinor = amountMinor - reducedMinor;
    const paidMinor = paidOf(id);
    const outstandingMinor = Math.max(0, netMinor - paidMinor);
    const creditMinor = Math.max(0, paidMinor - netMinor);
    return { id, netMinor, reducedMinor, paidMinor, outstandingMinor, creditMinor };
  });
  return {
    agreedMinor: sum(balances.map(({ netMinor }) => netMinor)),
    paidMinor: sum(balances.map(({ paidMinor }) => paidMinor)),
    outstandingMinor: sum(balances.map(({ outstandingMinor }) => outstandingMinor)),
    creditMinor: sum(balances.map(({ creditMinor }) => creditMinor)),
    dues: balances,
  };
}

export interface ChangeOfDues {
  /** What is taken off each due from now on, where that changes. */
  readonly reduced: ReadonlyMap<string, number>;
  /** What is left to be asked for by a due of its own. */
  readonly moreMinor: number;
}

/**
 * How the dues follow a change order to a new total.
 * - Less: the last dues that are still to be paid shrink first; what goes beyond all of them is taken off what
 *   is paid, again from the last, and becomes credit.
 * - More: credit that an earlier change order left is used up first; the rest is a new due.
 */
export function changeTo(totalMinor: number, balance: Balance): ChangeOfDues {
  const reduced = new Map(balance.dues.map(({ id, reducedMinor }) => [id, reducedMinor]));
  const left = new Map(balance.dues.map(({ id, netMinor }) => [id, netMinor]));
  let rest = totalMinor - balance.agreedMinor;
  /** Takes from a due (or gives back to it, where negative). */
  const take = (id: string, amountMinor: number) => {
    reduced.set(id, (reduced.get(id) ?? 0) + amountMinor);
    left.set(id, (left.get(id) ?? 0) - amountMinor);
    rest += amountMinor;
  };
  if (rest < 0) {
    const fromLast = [...balance.dues].reverse();
    for (const { id, outstandingMinor } of fromLast) take(id, Math.min(-rest, outstandingMinor));
    for (const { id } of fromLast) take(id, Math.min(-rest, left.get(id) ?? 0));
  } else {
    for (const { id, creditMinor, reducedMinor } of balance.dues)
      take(id, -Math.min(rest, creditMinor, reducedMinor));
  }
  const changed = [...reduced].filter(
    ([id, amountMinor]) => balance.dues.find((due) => due.id === id)?.reducedMinor !== amountMinor,
  );
  return { reduced: new Map(changed), moreMinor: Math.max(0, rest) };
}
