import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { AppError, conflict, notFound } from '../../http/app-error.js';
import {
  CardKeyReused,
  CardService,
  CardServiceAway,
  CardServiceRefusal,
  type Checkout,
} from '../../ports/payments/card-service.js';
import { balanceOf } from './ledger.js';
import { type DueRow, type PaymentRow, PaymentsRepository, type ProposalKey } from './payments.repository.js';
import { Settlements } from './settlements.js';

export interface Payer extends ProposalKey {
  readonly email: string;
}

interface Begun {
  readonly payment: PaymentRow;
  readonly due: DueRow;
  readonly outstandingMinor: number;
}

/** Several tabs at once settle on one page within a few rounds. */
const ROUNDS = 6;
/** The card service forgets a key after a day; an older payment without a page begins anew. */
const KEY_LIVES_MILLISECONDS = 12 * 3_600_000;

/**
 * Brings a payer to a page of the card service. At most one page of a due can be paid at a time.
 *
 * The payment is kept first, then the service is asked for a page with the payment's id as idempotency key, then
 * the page is kept. Whoever stops in between leaves a payment without a page, which the next caller takes up
 * with the same key.
 */
@Injectable()
export class CardCheckouts {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PaymentsRepository) private readonly repository: PaymentsRepository,
    @Inject(Settlements) private readonly settlements: Settlements,
    @Inject(CardService) private readonly cards: CardService,
  ) {}

  /** @throws AppError 404 no such due · 409 not asked for, paid already, or on its way · 503 */
  async begin(payer: Payer, dueId: string, returnUrl: string): Promise<{ readonly url: string }> {
    if (!this.cards.offered)
      throw conflict(
        'no-card-payment',
        'Payment by card is not offered here. Please pay by transfer, cheque or cash, as you agreed with the company.',
      );
    const success = new URL(returnUrl);
    success.searchParams.set('paid', dueId);
    for (let round = 0; round < ROUNDS; round += 1) {
      const begun = await this.open(payer, dueId);
      const url =
        begun.payment.checkoutId === null
          ? await this.newPage(begun, payer, success.href, returnUrl)
          : await this.knownPage(begun, begun.payment.checkoutId, success.href);
      if (url !== null) return { url };
    }
    throw conflict(
      'checkout-busy',
      'This payment is being started in another window. Please try again there.',
    );
  }

  /** Ends the page of a payment whose amount is not owed any more. */
  async end({
    companyId,
    paymentId,
  }: {
    readonly companyId: string;
    readonly paymentId: string;
  }): Promise<void> {
    const payment = await this.repository.findPayment(companyId, paymentId);
    if (payment?.status !== 'open') return;
    if (payment.checkoutId === null) await this.giveUp(payment);
    else await this.endPage(payment, await this.cards.retrieveCheckout(payment.checkoutId));
  }

  /** The payment of a due that is open, or a new one over what is outstanding. */
  private async open(payer: Payer, dueId: string): Promise<Begun> {
    const { companyId, proposalId } = payer;
    return this.database.transaction(async () => {
      const proposal = await this.repository.lock(payer);
      const dues = proposal ? await this.repository.dues(proposal) : [];
      const due = dues.find(({ id }) => id === dueId);
      if (!due) throw notFound('This payment');
      if (due.requestedAt === null)
        throw conflict('not-requested', 'This is not due yet. You will be asked for it by mail.');
      const payments = await this.repository.payments(payer);
      const balance = balanceOf(dues, payments, await this.repository.refunds(payer));
      const outstandingMinor = balance.dues.find(({ id }) => id === dueId)?.outstandingMinor ?? 0;
      if (outstandingMinor === 0) throw conflict('nothing-owed', 'This has been paid. Thank you.');
      const open = payments.find(
        (payment) => payment.dueId === dueId && payment.method === 'card' && payment.status === 'open',
      );
      if (open && !isStale(open, outstandingMinor)) return { payment: open, due, outstandingMinor };
      if (open) await this.expire(open);
      const payment = await this.repository.insertPayment({
        companyId,
        proposalId,
        dueId,
        method: 'card',
        status: 'open',
        amountMinor: outstandingMinor,
        currency: due.currency,
      });
      return { payment, due, outstandingMinor };
    });
  }

  private async newPage(
    { payment, due }: Begun,
    payer: Payer,
    successUrl: string,
    cancelUrl: string,
  ): Promise<string | null> {
    const { companyId, amountMinor, currency, id } = payment;
    let page: Checkout;
    try {
      page = await this.cards.createCheckout({
        amountMinor,
        currency,
        name: due.name,
        customerEmail: payer.email,
        reference: { companyId, paymentId: id },
        successUrl,
        cancelUrl,
        idempotencyKey: id,
      });
    } catch (error) {
      // Somebody else began it, by another link: their request stopped in between, or is about to keep its page.
      if (error instanceof CardKeyReused) {
        await this.giveUp(payment);
        return null;
      }
      if (error instanceof CardServiceRefusal) {
        await this.giveUp(payment);
        throw conflict(
          'card-refused',
          'The card service does not take this payment. Please pay in another way, or ask the company.',
        );
      }
      throw awayOr(error);
    }
    if (page.state !== 'open' || page.url === null) {
      await this.giveUp(payment);
      return null;
    }
    const kept = await this.repository.nameCheckout(companyId, id, {
      checkoutId: page.id,
      checkoutUrl: page.url,
    });
    if (kept) return page.url;
    const now = await this.repository.findPayment(companyId, id);
    if (now?.status === 'open' && now.checkoutId === page.id) return page.url;
    // The payment was given up meanwhile: nobody may pay it by this page.
    await this.cards.expireCheckout(page.id).catch(ignoreRefusal);
    return null;
  }

  private async knownPage(
    { payment, outstandingMinor }: Begun,
    checkoutId: string,
    successUrl: string,
  ): Promise<string | null> {
    const page = await asked(this.cards.retrieveCheckout(checkoutId));
    if (page?.state === 'paid' || page?.state === 'waiting')
      throw conflict(
        'payment-under-way',
        'A payment by card for this has been made. It shows here as soon as the card service confirms it.',
      );
    const fits =
      page?.state === 'open' &&
      page.amountMinor === outstandingMinor &&
      page.currency === payment.currency &&
      // By another link it would lead back to a page that is not theirs.
      page.successUrl === successUrl;
    if (fits && page.url !== null) return page.url;
    await this.endPage(payment, page);
    return null;
  }

  /** Ends a page if it is open, and has the payment follow. One that was paid waits for the service's word. */
  private async endPage(payment: PaymentRow, page: Checkout | null): Promise<void> {
    if (page === null) {
      await this.expire(payment);
      return;
    }
    let ended = page;
    if (page.state === 'open') {
      try {
        ended = await this.cards.expireCheckout(page.id);
      } catch (error) {
        // Paid in this very moment: the next look tells.
        if (error instanceof CardServiceRefusal) return;
        throw awayOr(error);
      }
    }
    if (ended.state === 'paid' || ended.state === 'waiting') return;
    await this.database.transaction(async () => {
      const proposal = await this.repository.lock(payment);
      if (proposal) await this.settlements.follow(proposal, payment.id, ended);
    });
  }

  /** A payment that has no page yet is not gone on with. */
  private async giveUp(payment: PaymentRow): Promise<void> {
    await this.database.transaction(async () => {
      await this.repository.lock(payment);
      const now = await this.repository.findPayment(payment.companyId, payment.id);
      if (now?.status === 'open' && now.checkoutId === null) await this.expire(now);
    });
  }

  private async expire({ companyId, id }: PaymentRow): Promise<void> {
    const settledAt = await this.repository.now();
    await this.repository.updatePayment(companyId, id, { status: 'expired', settledAt });
  }
}

const isStale = ({ checkoutId, amountMinor, createdAt }: PaymentRow, outstandingMinor: number): boolean =>
  checkoutId === null &&
  (amountMinor !== outstandingMinor || createdAt.getTime() < Date.now() - KEY_LIVES_MILLISECONDS);

async function asked<T>(call: Promise<T>): Promise<T> {
  try {
    return await call;
  } catch (error) {
    throw awayOr(error);
  }
}

export const awayOr = (error: unknown): unknown =>
  error instanceof CardServiceAway
    ? new AppError(
        503,
        'card-service-away',
        'The card service can’t be reached at the moment. Nothing was charged; please try again shortly.',
      )
    : error;

function ignoreRefusal(error: unknown): void {
  if (!(error instanceof CardServiceRefusal)) throw awayOr(error);
}
