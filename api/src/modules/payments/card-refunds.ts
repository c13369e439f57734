import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { CardService, CardServiceRefusal } from '../../ports/payments/card-service.js';
import { PaymentsRepository } from './payments.repository.js';
import { Settlements } from './settlements.js';

/** Has the card service pay money back. */
@Injectable()
export class CardRefunds {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(Settlements) private readonly settlements: Settlements,
    @Inject(CardService) private readonly cards: CardService,
  ) {}

  /**
   * Does nothing for a refund that is settled. The refund's id is the idempotency key, so that another try does
   * not pay back twice.
   * @throws CardServiceAway to be tried again
   */
  async send({
    companyId,
    refundId,
  }: {
    readonly companyId: string;
    readonly refundId: string;
  }): Promise<void> {
    const refund = await this.repository.findRefund(companyId, refundId);
    if (refund?.status !== 'pending') return;
    const payment = await this.repository.findPayment(companyId, refund.paymentId);
    if (!payment) return;
    const answer = await this.ask(payment.paymentIntentId, refundId, refund.amountMinor);
    await this.database.transaction(async () => {
      const proposal = await this.repository.lock(payment);
      const now = await this.repository.findRefund(companyId, refundId);
      if (!proposal || !now) return;
      if (answer !== null) await this.settlements.followRefund(proposal, refundId, answer);
      else if (now.status === 'pending') await this.settlements.refundFailed(proposal, now);
    });
  }

  /** Null when the service refuses. */
  private async ask(paymentIntentId: string | null, refundId: string, amountMinor: number) {
    if (paymentIntentId === null) return null;
    try {
      return await this.cards.refund({ paymentIntentId, amountMinor, refundId, idempotencyKey: refundId });
    } catch (error) {
      if (error instanceof CardServiceRefusal) return null;
      throw error;
    }
  }
}
