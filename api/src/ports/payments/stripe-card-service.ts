import Stripe from 'stripe';
import { z } from 'zod';
import {
  type CardEvent,
  CardKeyReused,
  type CardReference,
  type CardRefund,
  CardService,
  CardServiceAway,
  CardServiceRefusal,
  type Checkout,
  type NewCardRefund,
  type NewCheckout,
  WrongSignature,
} from './card-service.js';

export interface StripeSettings {
  readonly secretKey: string;
  readonly webhookSecret: string;
  /** Of the local stand-in; the service's own address by default. */
  readonly apiBase?: string | undefined;
}

const TIMEOUT_MILLISECONDS = 15_000;
const NETWORK_RETRIES = 2;

/** What of an event says which object it is about; the object itself is fetched anew. */
const objectSchema = z.object({
  id: z.string(),
  metadata: z.record(z.string(), z.string()).nullish(),
});
const referenceSchema = z.object({ company_id: z.uuid(), payment_id: z.uuid() });

/** Stripe's Checkout, or a stand-in that speaks the same. */
export class StripeCardService extends CardService {
  readonly offered = true;
  private readonly stripe: Stripe;

  constructor(private readonly settings: StripeSettings) {
    super();
    this.stripe = new Stripe(settings.secretKey, {
      maxNetworkRetries: NETWORK_RETRIES,
      timeout: TIMEOUT_MILLISECONDS,
      telemetry: false,
      ...(settings.apiBase === undefined ? {} : addressOf(settings.apiBase)),
    });
  }

  async createCheckout(wanted: NewCheckout): Promise<Checkout> {
    const metadata = metadataOf(wanted.reference);
    const session = await asked(
      this.stripe.checkout.sessions.create(
        {
          mode: 'payment',
          line_items: [
            {
              quantity: 1,
              price_data: {
                currency: wanted.currency.toLowerCase(),
                unit_amount: wanted.amountMinor,
                product_data: { name: wanted.name },
              },
            },
          ],
          customer_email: wanted.customerEmail,
          client_reference_id: wanted.reference.paymentId,
          metadata,
          payment_intent_data: { metadata },
          success_url: wanted.successUrl,
          cancel_url: wanted.cancelUrl,
        },
        { idempotencyKey: wanted.idempotencyKey },
      ),
    );
    return checkoutOf(session);
  }

  async retrieveCheckout(id: string): Promise<Checkout | null> {
    const session = await orNull(this.stripe.checkout.sessions.retrieve(id, { expand: ['payment_intent'] }));
    return session && checkoutOf(session);
  }

  async expireCheckout(id: string): Promise<Checkout> {
    return checkoutOf(await asked(this.stripe.checkout.sessions.expire(id)));
  }

  async refund({
    paymentIntentId,
    amountMinor,
    refundId,
    idempotencyKey,
  }: NewCardRefund): Promise<CardRefund> {
    const refund = await asked(
      this.stripe.refunds.create(
        { payment_intent: paymentIntentId, amount: amountMinor, metadata: { refund_id: refundId } },
        { idempotencyKey },
      ),
    );
    return refundOf(refund);
  }

  async retrieveRefund(id: string): Promise<CardRefund | null> {
    const refund = await orNull(this.stripe.refunds.retrieve(id));
    return refund && refundOf(refund);
  }

  readEvent(body: Buffer, signature: string): CardEvent {
    let event: Stripe.Event;
    try {
      event = this.stripe.webhooks.constructEvent(body, signature, this.settings.webhookSecret);
    } catch (error) {
      throw new WrongSignature('What came was not signed by the card service.', { cause: error });
    }
    return { id: event.id, type: event.type, about: aboutOf(event) };
  }
}

function aboutOf(event: Stripe.Event): CardEvent['about'] {
  const object = objectSchema.safeParse(event.data.object).data;
  if (!object) return { kind: 'other' };
  switch (event.type) {
    case 'checkout.session.completed':
    case 'checkout.session.expired':
    case 'checkout.session.async_payment_succeeded':
    case 'checkout.session.async_payment_failed':
      return { kind: 'checkout', checkoutId: object.id };
    case 'payment_intent.payment_failed': {
      const reference = referenceOf(object.metadata);
      return reference ? { kind: 'declined', reference } : { kind: 'other' };
    }
    case 'refund.created':
    case 'refund.updated':
    case 'refund.failed':
      return { kind: 'refund', refundId: object.id };
    default:
      return { kind: 'other' };
  }
}

function checkoutOf(session: Stripe.Checkout.Session): Checkout {
  const intent = session.payment_intent;
  return {
    id: session.id,
    url: session.url,
    state: stateOf(session),
    amountMinor: session.amount_total ?? 0,
    currency: (session.currency ?? '').toUpperCase(),
    paymentIntentId: typeof intent === 'string' ? intent : (intent?.id ?? null),
    successUrl: session.success_url ?? '',
    reference: referenceOf(session.metadata),
  };
}

function stateOf({ status, payment_status, payment_intent }: Stripe.Checkout.Session): Checkout['state'] {
  if (payment_status === 'paid') return 'paid';
  if (status === 'open') return 'open';
  if (status === 'expired') return 'expired';
  // Completed without money: it may still come, unless the attempt behind it was given up.
  const attempt = typeof payment_intent === 'string' ? null : payment_intent?.status;
  return attempt === 'requires_payment_method' || attempt === 'canceled' ? 'failed' : 'waiting';
}

function refundOf(refund: Stripe.Refund): CardRefund {
  const intent = refund.payment_intent;
  return {
    id: refund.id,
    state: refundStateOf(refund.status),
    amountMinor: refund.amount,
    currency: refund.currency.toUpperCase(),
    paymentIntentId: typeof intent === 'string' ? intent : (intent?.id ?? null),
    refundId: refund.metadata?.refund_id ?? null,
  };
}

function refundStateOf(status: string | null): CardRefund['state'] {
  if (status === 'succeeded') return 'succeeded';
  return status === 'failed' || status === 'canceled' ? 'failed' : 'pending';
}

const metadataOf = ({ companyId, paymentId }: CardReference) => ({
  company_id: companyId,
  payment_id: paymentId,
});

function referenceOf(metadata: unknown): CardReference | null {
  const parsed = referenceSchema.safeParse(metadata);
  return parsed.success ? { companyId: parsed.data.company_id, paymentId: parsed.data.payment_id } : null;
}

function addressOf(base: string): { host: string; port: string; protocol: 'http' | 'https' } {
  const { hostname, port, protocol } = new URL(base);
  const secure = protocol === 'https:';
  return { host: hostname, port: port || (secure ? '443' : '80'), protocol: secure ? 'https' : 'http' };
}

async function orNull<T>(call: Promise<T>): Promise<T | null> {
  try {
    return await call;
  } catch (error) {
    if (error instanceof Stripe.errors.StripeInvalidRequestError && error.statusCode === 404) return null;
    throw told(error);
  }
}

async function asked<T>(call: Promise<T>): Promise<T> {
  try {
    return await call;
  } catch (error) {
    throw told(error);
  }
}

/** The service's own words stay in the cause: they may hold what payers typed. */
function told(error: unknown): Error {
  if (error instanceof Stripe.errors.StripeIdempotencyError)
    return new CardKeyReused('The card service knows this key from another request.', { cause: error });
  if (
    error instanceof Stripe.errors.StripeInvalidRequestError ||
    error instanceof Stripe.errors.StripeCardError
  )
    return new CardServiceRefusal('The card service refused the request.', { cause: error });
  return new CardServiceAway('The card service can’t be reached, or is in trouble.', { cause: error });
}
