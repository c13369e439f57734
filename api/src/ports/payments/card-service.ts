/** What the payment of a due is called by in the card service's own records, to find it again. */
export interface CardReference {
  readonly companyId: string;
  readonly paymentId: string;
}

export interface NewCheckout {
  readonly amountMinor: number;
  /** ISO 4217. */
  readonly currency: string;
  /** What is paid for, as the payer reads it. */
  readonly name: string;
  readonly customerEmail: string;
  readonly reference: CardReference;
  readonly successUrl: string;
  readonly cancelUrl: string;
  readonly idempotencyKey: string;
}

/** A hosted page on which one payment can be made, and what has become of it. */
export interface Checkout {
  readonly id: string;
  /** Null when the page is not open any more. */
  readonly url: string | null;
  /**
   * open: can be paid · paid · waiting: the payer is done, the money is not there yet · failed: it will not
   * come · expired: nobody paid in time, or it was ended.
   */
  readonly state: 'open' | 'paid' | 'waiting' | 'failed' | 'expired';
  readonly amountMinor: number;
  readonly currency: string;
  readonly paymentIntentId: string | null;
  readonly successUrl: string;
  /** Null for one that this product did not make. */
  readonly reference: CardReference | null;
}

export interface NewCardRefund {
  readonly paymentIntentId: string;
  readonly amountMinor: number;
  readonly refundId: string;
  readonly idempotencyKey: string;
}

export interface CardRefund {
  readonly id: string;
  readonly state: 'pending' | 'succeeded' | 'failed';
  readonly amountMinor: number;
  readonly currency: string;
  readonly paymentIntentId: string | null;
  /** Ours; null for one that was made at the card service itself. */
  readonly refundId: string | null;
}

/** Word of the card service that something has changed. It may repeat, be late, or come out of order. */
export interface CardEvent {
  readonly id: string;
  readonly type: string;
  readonly about:
    | { readonly kind: 'checkout'; readonly checkoutId: string }
    /** One try to pay that was declined; the page stays open for another. */
    | { readonly kind: 'declined'; readonly reference: CardReference }
    | { readonly kind: 'refund'; readonly refundId: string }
    | { readonly kind: 'other' };
}

/** Takes payments by card on a page of its own: no card number ever reaches this product. */
export abstract class CardService {
  /** False where no card service is set up; then nothing else here may be called. */
  abstract readonly offered: boolean;
  /** @throws CardServiceRefusal · CardKeyReused */
  abstract createCheckout(checkout: NewCheckout): Promise<Checkout>;
  /** Null when the service knows no such checkout. */
  abstract retrieveCheckout(id: string): Promise<Checkout | null>;
  /** Closes the page of an open checkout. @throws CardServiceRefusal for one that is not open any more */
  abstract expireCheckout(id: string): Promise<Checkout>;
  /** @throws CardServiceRefusal */
  abstract refund(refund: NewCardRefund): Promise<CardRefund>;
  /** Null when the service knows no such refund. */
  abstract retrieveRefund(id: string): Promise<CardRefund | null>;
  /** @throws WrongSignature for what the card service did not sign, or signed too long ago */
  abstract readEvent(body: Buffer, signature: string): CardEvent;
}

/** The service has judged the request and said no: trying again is of no use. */
export class CardServiceRefusal extends Error {}
/** The idempotency key was used for a request that asked for something else. */
export class CardKeyReused extends Error {}
/** The service can't be reached, or is in trouble: trying again may help. */
export class CardServiceAway extends Error {}
export class WrongSignature extends Error {}
