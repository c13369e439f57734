import { formatMoney } from '@lampwright/geometry/price';
import { Inject, Injectable, Logger } from '@nestjs/common';
import type { CardRefund, Checkout } from '../../ports/payments/card-service.js';
import { type EventActor, JobEvents } from '../timeline/job-events.repository.js';
import { AgreementsRepository } from './agreements.repository.js';
import { MoneyPapers } from './money-papers.js';
import {
  type DueRow,
  type PaymentRow,
  PaymentsRepository,
  type ProposalOfMoney,
  type RefundRow,
} from './payments.repository.js';

/**
 * What payments and refunds come to. Every method runs in the transaction that holds the proposal's money,
 * reads the row anew, and does nothing for one that is settled already: words about it may come twice, late and
 * in any order.
 */
@Injectable()
export class Settlements {
  private readonly logger = new Logger('payments');

  constructor(
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(AgreementsRepository) private readonly agreements: AgreementsRepository,
    @Inject(MoneyPapers) private readonly papers: MoneyPapers,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  /** Follows what has become of a payment's page at the card service. */
  async follow(proposal: ProposalOfMoney, paymentId: string, checkout: Checkout): Promise<void> {
    const payment = await this.payment(proposal, paymentId);
    switch (checkout.state) {
      case 'open':
      case 'waiting':
        return;
      case 'paid':
        if (payment.status === 'succeeded') return;
        if (checkout.amountMinor === payment.amountMinor && checkout.currency === payment.currency)
          await this.succeed(proposal, payment, checkout.paymentIntentId);
        else await this.mismatch(proposal, payment, checkout);
        return;
      case 'failed':
        if (payment.status !== 'open') return;
        await this.end(proposal, payment, 'failed');
        await this.noteFailure(proposal, payment);
        return;
      case 'expired':
        if (payment.status === 'open') await this.end(proposal, payment, 'expired');
        return;
    }
  }

  /** A try was declined. No news once the payment is settled. */
  async declined(proposal: ProposalOfMoney, paymentId: string): Promise<void> {
    const payment = await this.payment(proposal, paymentId);
    if (payment.status === 'open') await this.noteFailure(proposal, payment);
  }

  /** A payment has come in: the receipt and the timeline follow. */
  async received(
    proposal: ProposalOfMoney,
    payment: PaymentRow,
    due: DueRow,
    actor: EventActor,
  ): Promise<void> {
    const { name } = due;
    const { method, amountMinor } = payment;
    await this.events.note(proposal, 'payment-received', { name, method, amountMinor }, actor);
    await this.papers.receipt(proposal, due, payment);
  }

  /** Follows what has become of a refund at the card service. */
  async followRefund(proposal: ProposalOfMoney, refundId: string, state: CardRefund): Promise<void> {
    const { companyId } = proposal;
    const refund = await this.repository.findRefund(companyId, refundId);
    if (!refund) throw new Error('A refund is gone.');
    if (refund.providerId === null)
      await this.repository.updateRefund(companyId, refundId, { providerId: state.id });
    switch (state.state) {
      case 'pending':
        return;
      case 'succeeded':
        if (refund.status !== 'pending') return;
        await this.refundSucceeded(proposal, refund, null);
        return;
      case 'failed':
        // Banks send money back even after it was reported as gone.
        if (refund.status !== 'failed') await this.refundFailed(proposal, refund);
        return;
    }
  }

  async refundSucceeded(proposal: ProposalOfMoney, refund: RefundRow, actor: EventActor): Promise<void> {
    const settledAt = await this.repository.now();
    await this.repository.updateRefund(proposal.companyId, refund.id, { status: 'succeeded', settledAt });
    const { reason, amountMinor } = refund;
    await this.events.note(proposal, 'refunded', { reason, amountMinor }, actor);
    const payment = await this.payment(proposal, refund.paymentId);
    await this.papers.refundNote(proposal, await this.dueOf(proposal, payment), payment, refund);
  }

  async refundFailed(proposal: ProposalOfMoney, refund: RefundRow): Promise<void> {
    const settledAt = await this.repository.now();
    await this.repository.updateRefund(proposal.companyId, refund.id, { status: 'failed', settledAt });
    const { reason, amountMinor } = refund;
    await this.events.note(proposal, 'refund-failed', { reason, amountMinor }, null);
  }

  async dueOf(proposal: ProposalOfMoney, { dueId }: Pick<PaymentRow, 'dueId'>): Promise<DueRow> {
    const due = (await this.repository.dues(proposal)).find(({ id }) => id === dueId);
    if (!due) throw new Error('A payment belongs to no due of its proposal.');
    return due;
  }

  private async succeed(
    proposal: ProposalOfMoney,
    payment: PaymentRow,
    paymentIntentId: string | null,
  ): Promise<void> {
    const settled = { status: 'succeeded', settledAt: await this.repository.now(), paymentIntentId } as const;
    await this.repository.updatePayment(proposal.companyId, payment.id, settled);
    const due = await this.dueOf(proposal, payment);
    await this.received(proposal, { ...payment, ...settled }, due, null);
  }

  /** Money came that is not what was asked for. It does not count; somebody must look at it. */
  private async mismatch(proposal: ProposalOfMoney, payment: PaymentRow, checkout: Checkout): Promise<void> {
    if (payment.paymentIntentId !== null) return;
    const { amountMinor, currency, paymentIntentId } = checkout;
    this.logger.error(
      {
        paymentId: payment.id,
        checkoutId: checkout.id,
        expected: `${payment.amountMinor} ${payment.currency}`,
        reported: `${amountMinor} ${currency}`,
      },
      'the card service reports another sum than was asked for; it is not counted as paid',
    );
    const locale = (await this.agreements.newest(proposal))?.document.locale ?? 'en-US';
    const note = `The card service reports ${formatMoney(amountMinor, currency, locale)} where ${formatMoney(payment.amountMinor, payment.currency, locale)} was asked for. It is not counted as paid.`;
    await this.repository.updatePayment(proposal.companyId, payment.id, {
      status: 'failed',
      settledAt: await this.repository.now(),
      paymentIntentId,
      note,
    });
    const { name } = await this.dueOf(proposal, payment);
    await this.events.note(
      proposal,
      'payment-mismatch',
      { name, amountMinor, expectedMinor: payment.amountMinor },
      null,
    );
  }

  private async end(
    { companyId }: ProposalOfMoney,
    { id }: PaymentRow,
    status: 'failed' | 'expired',
  ): Promise<void> {
    await this.repository.updatePayment(companyId, id, { status, settledAt: await this.repository.now() });
  }

  private async noteFailure(proposal: ProposalOfMoney, payment: PaymentRow): Promise<void> {
    const { name } = await this.dueOf(proposal, payment);
    const { amountMinor } = payment;
    await this.events.note(proposal, 'payment-failed', { name, amountMinor }, null);
  }

  private async payment({ companyId }: ProposalOfMoney, id: string): Promise<PaymentRow> {
    const payment = await this.repository.findPayment(companyId, id);
    if (!payment) throw new Error('A payment is gone.');
    return payment;
  }
}
