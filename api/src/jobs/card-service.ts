import { Inject, Injectable } from '@nestjs/common';
import { CardCheckouts } from '../modules/payments/card-checkouts.js';
import { CardRefunds } from '../modules/payments/card-refunds.js';
import { CardService } from '../ports/payments/card-service.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import type { JobHandler } from './job-handler.js';

/** Has the card service send a refund. */
@Injectable()
export class SendCardRefund implements JobHandler<'card-refund.send'> {
  readonly queue = 'card-refund.send';

  constructor(@Inject(CardRefunds) private readonly refunds: CardRefunds) {}

  async handle(refund: QueuePayloads['card-refund.send']): Promise<void> {
    await this.refunds.send(refund);
  }
}

/** Ends a page of the card service that nobody should pay any more. */
@Injectable()
export class EndCardCheckout implements JobHandler<'card-checkout.end'> {
  readonly queue = 'card-checkout.end';

  constructor(
    @Inject(CardCheckouts) private readonly checkouts: CardCheckouts,
    @Inject(CardService) private readonly cards: CardService,
  ) {}

  async handle(payment: QueuePayloads['card-checkout.end']): Promise<void> {
    // Where the card service was taken away, its pages are out of reach.
    if (this.cards.offered) await this.checkouts.end(payment);
  }
}
