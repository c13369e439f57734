import { Inject, Injectable, Logger } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { AppError, notFound } from '../../http/app-error.js';
import {
  type CardEvent,
  type CardRefund,
  CardService,
  type Checkout,
  WrongSignature,
} from '../../ports/payments/card-service.js';
import { awayOr } from './card-checkouts.js';
import { type PaymentRow, PaymentsRepository, type ProposalOfMoney } from './payments.repository.js';
import { Settlements } from './settlements.js';

/** What refunds are called that were made at the card service itself. */
const REFUNDED_THERE = 'Paid back at the card service';

/**
 * Hears the card service out. A word only says where to look: what has become of the payment is asked of the
 * service itself, since words repeat and overtake each other. The word's id is kept in the transaction of what
 * it led to.
 */
@Injectable()
export class CardWords {
  private readonly logger = new Logger('payments');

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(Settlements) private readonly settlements: Settlements,
    @Inject(CardService) private readonly cards: CardService,
  ) {}

  /** @throws AppError 400 for what the card service did not sign · 404 where none is set up · 503 */
  async hear(body: unknown, signature: string): Promise<void> {
    if (!this.cards.offered) throw notFound('This address');
    const event = this.read(body, signature);
    if (event.about.kind === 'other' || (await this.repository.knowsEvent(event.id))) return;
    switch (event.about.kind) {
      case 'checkout':
        await this.aboutCheckout(event, await this.ask(this.cards.retrieveCheckout(event.about.checkoutId)));
        return;
      case 'declined':
        await this.aboutDecline(event, event.about.reference);
        return;
      case 'refund':
        await this.aboutRefund(event, await this.ask(this.cards.retrieveRefund(event.about.refundId)));
        return;
    }
  }

  private read(body: unknown, signature: string): CardEvent {
    try {
      if (!Buffer.isBuffer(body)) throw new WrongSignature('There is no body.');
      return this.cards.readEvent(body, signature);
    } catch (error) {
      if (!(error instanceof WrongSignature)) throw error;
      throw new AppError(400, 'wrong-signature', 'This was not signed by the card service.');
    }
  }

  private async aboutCheckout(event: CardEvent, checkout: Checkout | null): Promise<void> {
    const payment = checkout && (await this.paymentOf(checkout));
    if (!payment) {
      this.logger.warn({ eventId: event.id }, 'word of the card service about a checkout that is not ours');
      return;
    }
    await this.once(event, payment, async (proposal) => {
      const paymentId = await this.paidBy(proposal, payment.id, checkout);
      if (paymentId !== null) await this.settlements.follow(proposal, paymentId, checkout);
    });
  }

  private async paymentOf({ id, reference }: Checkout): Promise<PaymentRow | null> {
    const known = await this.repository.byCheckout(id);
    if (known || !reference) return known;
    return this.repository.findPayment(reference.companyId, reference.paymentId);
  }

  /**
   * The payment that a page pays. A page that was made but not kept, because the process stopped in between, is
   * kept now. One that was paid though its payment had gone on to another page is a payment of its own: the
   * money is there.
   */
  private async paidBy(
    { companyId, proposalId }: ProposalOfMoney,
    paymentId: string,
    checkout: Checkout,
  ): Promise<string | null> {
    const payment = await this.repository.findPayment(companyId, paymentId);
    if (!payment) return null;
    if (payment.checkoutId === checkout.id) return payment.id;
    if (payment.checkoutId === null) {
      await this.repository.updatePayment(companyId, paymentId, { checkoutId: checkout.id });
      return payment.id;
    }
    if (checkout.state !== 'paid') return null;
    const { dueId, amountMinor, currency } = payment;
    const second = await this.repository.insertPayment({
      companyId,
      proposalId,
      dueId,
      method: 'card',
      status: 'open',
      amountMinor,
      currency,
      checkoutId: checkout.id,
    });
    return second.id;
  }

  private async aboutDecline(
    event: CardEvent,
    { companyId, paymentId }: { readonly companyId: string; readonly paymentId: string },
  ): Promise<void> {
    const payment = await this.repository.findPayment(companyId, paymentId);
    if (!payment) return;
    const { checkoutId } = payment;
    const checkout = checkoutId === null ? null : await this.ask(this.cards.retrieveCheckout(checkoutId));
    await this.once(event, payment, async (proposal) => {
      if (checkout) await this.settlements.follow(proposal, paymentId, checkout);
      await this.settlements.declined(proposal, paymentId);
    });
  }

  private async aboutRefund(event: CardEvent, refund: CardRefund | null): Promise<void> {
    const intent = refund?.paymentIntentId ?? null;
    const payment = intent === null ? null : await this.repository.byPaymentIntent(intent);
    if (!refund || !payment) {
      this.logger.warn({ eventId: event.id }, 'word of the card service about a refund that is not ours');
      return;
    }
    await this.once(event, payment, async (proposal) => {
      const refundId = await this.refundOf(proposal, payment, refund);
      await this.settlements.followRefund(proposal, refundId, refund);
    });
  }

  /** Ours, or a new row for one that was made at the card service itself. */
  private async refundOf(
    proposal: ProposalOfMoney,
    payment: PaymentRow,
    refund: CardRefund,
  ): Promise<string> {
    const known = (await this.repository.refunds(proposal)).find(
      ({ id, providerId }) => providerId === refund.id || id === refund.refundId,
    );
    if (known) return known.id;
    const row = await this.repository.insertRefund({
      companyId: proposal.companyId,
      paymentId: payment.id,
      amountMinor: refund.amountMinor,
      reason: REFUNDED_THERE,
      status: 'pending',
      providerId: refund.id,
    });
    return row.id;
  }

  private async once(
    event: CardEvent,
    payment: PaymentRow,
    act: (proposal: ProposalOfMoney) => Promise<void>,
  ): Promise<void> {
    await this.database.transaction(async () => {
      if (!(await this.repository.noteEvent(event.id, event.type))) return;
      const proposal = await this.repository.lock(payment);
      if (proposal) await act(proposal);
    });
  }

  private async ask<T>(call: Promise<T>): Promise<T> {
    try {
      return await call;
    } catch (error) {
      throw awayOr(error);
    }
  }
}
