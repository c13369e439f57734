import { formatDay } from '../../lib/format';
import type { Due, JobPayments, MoneyDocument, Payment, Refund } from './api';

export function methodWord(method: Payment['method']): string {
  switch (method) {
    case 'card':
      return 'Card';
    case 'cheque':
      return 'Cheque';
    case 'transfer':
      return 'Transfer';
    case 'cash':
      return 'Cash';
  }
}

export function documentWord(kind: MoneyDocument['kind']): string {
  switch (kind) {
    case 'invoice':
      return 'Invoice';
    case 'receipt':
      return 'Receipt';
    case 'refund':
      return 'Refund note';
  }
}

function laterWord(due: Due['due']): string {
  switch (due) {
    case 'approval':
      return 'Due when approved';
    case 'start':
      return 'Due when work begins';
    case 'finish':
      return 'Due when finished';
  }
}

/** How a due stands: "Paid", "Asked for on 3 May 2026", "Due when work begins". */
export function dueStanding(due: Due): string {
  if (due.outstandingMinor === 0) return due.paidMinor === 0 ? 'Nothing left, after a change order' : 'Paid';
  if (due.requestedAt !== null) return `Asked for on ${formatDay(due.requestedAt)}`;
  return laterWord(due.due);
}

/** How a payment stands; nothing to say of one that simply came in. */
export function paymentStanding(payment: Payment): string | null {
  switch (payment.status) {
    case 'succeeded':
      return null;
    case 'open':
      return 'On its way: the client is at the card page';
    case 'failed':
      return 'Did not go through';
    case 'expired':
      return 'Left unfinished';
  }
}

export function refundStanding({ status }: Pick<Refund, 'status'>): string {
  switch (status) {
    case 'pending':
      return 'On its way';
    case 'succeeded':
      return 'Paid back';
    case 'failed':
      return 'Did not go through';
  }
}

/** What of a payment can still be paid back, with what is on its way counted as gone. */
export function refundable(payment: Payment, refunds: readonly Refund[]): number {
  if (payment.status !== 'succeeded') return 0;
  const pending = refunds
    .filter(({ paymentId, status }) => paymentId === payment.id && status === 'pending')
    .reduce((sum, { amountMinor }) => sum + amountMinor, 0);
  return Math.max(0, payment.amountMinor - payment.refundedMinor - pending);
}

/** The due to look at next: what was asked for and not paid, or else the first that is left. */
export function nextDue({ dues }: Pick<JobPayments, 'dues'>): Due | undefined {
  const left = dues.filter(({ outstandingMinor }) => outstandingMinor > 0);
  return left.find(({ requestedAt }) => requestedAt !== null) ?? left[0];
}

/** How much can be paid back, and what comes of it: what no change order took off is still agreed, so it is owed. */
export function refundHint(money: (minor: number) => string, mostMinor: number, creditMinor: number): string {
  const most = `At most ${money(mostMinor)}.`;
  if (creditMinor >= mostMinor) return most;
  return creditMinor > 0
    ? `${most} What is over the ${money(creditMinor)} that is to go back is owed again.`
    : `${most} It is owed again afterwards: to make the work cheaper, have a change order approved first.`;
}
