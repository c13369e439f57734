import { randomBytes } from 'node:crypto';
import type { TestCard } from './cards.js';
import { type FormTree, textAt, textsIn, treeAt } from './form.js';
import type { FakeIntent, FakeRefund, FakeSession, FakeState } from './state.js';

const SESSION_LIVES_MILLISECONDS = 24 * 3_600_000;
/** The real service takes no payment below about half a unit of money. */
const LEAST_AMOUNT = 50;

export interface Pace {
  /** How late word comes that comes late. */
  readonly lateMilliseconds: number;
}

/** How the next refund goes. */
export type RefundCourse = 'at-once' | 'later' | 'fails-later';

/** A request that the service refuses, in the form that its SDK reads. */
export class Refusal extends Error {
  constructor(
    readonly status: number,
    readonly type: 'invalid_request_error' | 'idempotency_error',
    message: string,
    readonly code?: string,
  ) {
    super(message);
  }
}

const missing = (what: string, id: string) =>
  new Refusal(404, 'invalid_request_error', `No such ${what}: '${id}'`, 'resource_missing');

const newId = (prefix: string) => `${prefix}_${randomBytes(16).toString('hex')}`;

interface Word {
  readonly payload: string;
  readonly delayMilliseconds: number;
}

/** Sessions, payments and refunds of the stand-in, and the words about them. */
export class Bank {
  nextRefund: RefundCourse = 'at-once';

  constructor(
    private readonly state: FakeState,
    private readonly pageOf: (sessionId: string) => string,
    private readonly pace: Pace,
  ) {}

  createSession(form: FormTree): object {
    const price = treeAt(form, 'line_items', '0', 'price_data');
    const amount = Number(textAt(price, 'unit_amount')) * Number(textAt(form, 'line_items', '0', 'quantity'));
    const required = {
      currency: textAt(price, 'currency'),
      name: textAt(price, 'product_data', 'name'),
      success_url: textAt(form, 'success_url'),
    };
    for (const [name, value] of Object.entries(required))
      if (value === '')
        throw new Refusal(
          400,
          'invalid_request_error',
          `Missing required param: ${name}.`,
          'parameter_missing',
        );
    if (textAt(form, 'mode') !== 'payment')
      throw new Refusal(400, 'invalid_request_error', 'Only mode=payment is known here.');
    if (!Number.isInteger(amount) || amount < LEAST_AMOUNT)
      throw new Refusal(400, 'invalid_request_error', 'The amount is too small.', 'amount_too_small');
    const session: FakeSession = {
      id: newId('cs_test'),
      createdAt: Date.now(),
      expiresAt: Date.now() + SESSION_LIVES_MILLISECONDS,
      status: 'open',
      paymentStatus: 'unpaid',
      amount,
      currency: required.currency,
      name: required.name,
      customerEmail: textAt(form, 'customer_email'),
      clientReferenceId: textAt(form, 'client_reference_id'),
      metadata: textsIn(treeAt(form, 'metadata')),
      intentMetadata: textsIn(treeAt(form, 'payment_intent_data', 'metadata')),
      intentId: null,
      successUrl: required.success_url,
      cancelUrl: textAt(form, 'cancel_url'),
      shortTries: 0,
    };
    this.state.sessions[session.id] = session;
    return this.sessionBody(session, false);
  }

  session(id: string): FakeSession {
    const session = this.state.sessions[id];
    if (!session) throw missing('checkout.session', id);
    this.expireIfOld(session);
    return session;
  }

  readSession(id: string, expand: boolean): object {
    return this.sessionBody(this.session(id), expand);
  }

  expireSession(id: string): object {
    const session = this.session(id);
    if (session.status !== 'open')
      throw new Refusal(
        400,
        'invalid_request_error',
        `Only Checkout Sessions with a status in ["open"] can be expired. This one is ${session.status}.`,
      );
    this.expire(session);
    return this.sessionBody(session, false);
  }

  readIntent(id: string): object {
    const intent = this.state.intents[id];
    if (!intent) throw missing('payment_intent', id);
    return intentBody(intent);
  }

  createRefund(form: FormTree): object {
    const intentId = textAt(form, 'payment_intent');
    const intent = this.state.intents[intentId];
    if (!intent) throw missing('payment_intent', intentId);
    if (intent.status !== 'succeeded')
      throw new Refusal(400, 'invalid_request_error', 'This payment has no money to give back.');
    const left = intent.amount - this.refunded(intentId);
    const text = textAt(form, 'amount');
    const amount = text === '' ? left : Number(text);
    if (!Number.isInteger(amount) || amount < 1 || amount > left)
      throw new Refusal(
        400,
        'invalid_request_error',
        `Refund amount is greater than what is left of the payment (${left}).`,
        left === 0 ? 'charge_already_refunded' : 'amount_too_large',
      );
    const course = this.nextRefund;
    this.nextRefund = 'at-once';
    const refund: FakeRefund = {
      id: newId('re'),
      createdAt: Date.now(),
      intentId,
      amount,
      currency: intent.currency,
      metadata: textsIn(treeAt(form, 'metadata')),
      status: course === 'at-once' ? 'succeeded' : 'pending',
    };
    this.state.refunds[refund.id] = refund;
    this.tell(this.word('refund.created', refundBody(refund)));
    if (course !== 'at-once')
      this.state.timers.push({
        at: Date.now() + this.pace.lateMilliseconds,
        what: 'refund',
        refundId: refund.id,
        comes: course === 'later',
      });
    return refundBody(refund);
  }

  readRefund(id: string): object {
    const refund = this.state.refunds[id];
    if (!refund) throw missing('refund', id);
    return refundBody(refund);
  }

  /** Somebody pressed the button of a card on the page of an open session. */
  pay(session: FakeSession, card: TestCard): 'done' | 'declined' {
    switch (card) {
      case 'works':
        this.tell(...this.succeed(session));
        return 'done';
      case 'declined':
        this.tell(this.decline(session));
        return 'declined';
      case 'short':
        session.shortTries += 1;
        if (session.shortTries === 1) {
          this.tell(this.decline(session));
          return 'declined';
        }
        this.tell(...this.succeed(session));
        return 'done';
      case 'late':
        this.tell(...this.succeed(session).map((word) => delayed(word, this.pace.lateMilliseconds)));
        return 'done';
      case 'twice': {
        const words = this.succeed(session);
        this.tell(...words, ...words);
        return 'done';
      }
      case 'disorder': {
        const words = [this.decline(session), ...this.succeed(session)];
        const last = words.length - 1;
        this.tell(...words.map((word, i) => delayed(word, (last - i) * OVERTAKING_MILLISECONDS)));
        return 'done';
      }
      case 'bank-later':
      case 'bank-fails':
        this.beginDebit(session, card === 'bank-later');
        return 'done';
    }
  }

  /** Lets happen what is due: old pages end, debits and refunds come through or don't. True if anything did. */
  passTime(): boolean {
    let happened = false;
    for (const session of Object.values(this.state.sessions)) if (this.expireIfOld(session)) happened = true;
    const due = this.state.timers.filter(({ at }) => at <= Date.now());
    this.state.timers = this.state.timers.filter((timer) => !due.includes(timer));
    for (const timer of due) {
      switch (timer.what) {
        case 'bank':
          this.endDebit(this.state.sessions[timer.sessionId], timer.comes);
          break;
        case 'refund':
          this.endRefund(this.state.refunds[timer.refundId], timer.comes);
          break;
      }
      happened = true;
    }
    return happened;
  }

  private succeed(session: FakeSession): Word[] {
    const intent = this.intentOf(session);
    intent.status = 'succeeded';
    session.status = 'complete';
    session.paymentStatus = 'paid';
    return [
      this.word('payment_intent.succeeded', intentBody(intent)),
      this.word('checkout.session.completed', this.sessionBody(session, false)),
    ];
  }

  private decline(session: FakeSession): Word {
    const intent = this.intentOf(session);
    intent.status = 'requires_payment_method';
    return this.word('payment_intent.payment_failed', intentBody(intent));
  }

  private beginDebit(session: FakeSession, comes: boolean): void {
    const intent = this.intentOf(session);
    intent.status = 'processing';
    session.status = 'complete';
    this.tell(this.word('checkout.session.completed', this.sessionBody(session, false)));
    this.state.timers.push({
      at: Date.now() + this.pace.lateMilliseconds,
      what: 'bank',
      sessionId: session.id,
      comes,
    });
  }

  private endDebit(session: FakeSession | undefined, comes: boolean): void {
    if (!session) return;
    const intent = this.intentOf(session);
    intent.status = comes ? 'succeeded' : 'requires_payment_method';
    session.paymentStatus = comes ? 'paid' : 'unpaid';
    const type = comes ? 'checkout.session.async_payment_succeeded' : 'checkout.session.async_payment_failed';
    this.tell(this.word(type, this.sessionBody(session, false)));
  }

  private endRefund(refund: FakeRefund | undefined, comes: boolean): void {
    if (!refund) return;
    refund.status = comes ? 'succeeded' : 'failed';
    this.tell(this.word(comes ? 'refund.updated' : 'refund.failed', refundBody(refund)));
  }

  private intentOf(session: FakeSession): FakeIntent {
    const known = session.intentId === null ? undefined : this.state.intents[session.intentId];
    if (known) return known;
    const intent: FakeIntent = {
      id: newId('pi'),
      createdAt: Date.now(),
      amount: session.amount,
      currency: session.currency,
      metadata: session.intentMetadata,
      status: 'requires_payment_method',
    };
    this.state.intents[intent.id] = intent;
    session.intentId = intent.id;
    return intent;
  }

  private refunded(intentId: string): number {
    return Object.values(this.state.refunds)
      .filter((refund) => refund.intentId === intentId && refund.status !== 'failed')
      .reduce((sum, { amount }) => sum + amount, 0);
  }

  private expireIfOld(session: FakeSession): boolean {
    if (session.status !== 'open' || session.expiresAt > Date.now()) return false;
    this.expire(session);
    return true;
  }

  private expire(session: FakeSession): void {
    session.status = 'expired';
    this.tell(this.word('checkout.session.expired', this.sessionBody(session, false)));
  }

  /** Words keep what they told when it happened, as the real ones do. */
  private word(type: string, object: object): Word {
    const payload = JSON.stringify({
      id: newId('evt'),
      object: 'event',
      created: seconds(Date.now()),
      livemode: false,
      type,
      data: { object },
    });
    return { payload, delayMilliseconds: 0 };
  }

  private tell(...words: Word[]): void {
    for (const { payload, delayMilliseconds } of words)
      this.state.deliveries.push({
        id: newId('delivery'),
        payload,
        dueAt: Date.now() + delayMilliseconds,
        tries: 0,
      });
  }

  private sessionBody(session: FakeSession, expand: boolean): object {
    const intent = session.intentId === null ? undefined : this.state.intents[session.intentId];
    return {
      id: session.id,
      object: 'checkout.session',
      amount_subtotal: session.amount,
      amount_total: session.amount,
      cancel_url: session.cancelUrl || null,
      client_reference_id: session.clientReferenceId || null,
      created: seconds(session.createdAt),
      currency: session.currency,
      customer_email: session.customerEmail || null,
      expires_at: seconds(session.expiresAt),
      livemode: false,
      metadata: session.metadata,
      mode: 'payment',
      payment_intent: expand && intent ? intentBody(intent) : session.intentId,
      payment_status: session.paymentStatus,
      status: session.status,
      success_url: session.successUrl,
      url: session.status === 'open' ? this.pageOf(session.id) : null,
    };
  }
}

/** Enough for a word to be overtaken by the one after it. */
const OVERTAKING_MILLISECONDS = 400;

const delayed = (word: Word, by: number): Word => ({ ...word, delayMilliseconds: by });

const seconds = (milliseconds: number) => Math.floor(milliseconds / 1000);

const intentBody = ({ id, createdAt, amount, currency, metadata, status }: FakeIntent) => ({
  id,
  object: 'payment_intent',
  amount,
  amount_received: status === 'succeeded' ? amount : 0,
  created: seconds(createdAt),
  currency,
  livemode: false,
  metadata,
  status,
});

const refundBody = ({ id, createdAt, intentId, amount, currency, metadata, status }: FakeRefund) => ({
  id,
  object: 'refund',
  amount,
  created: seconds(createdAt),
  currency,
  metadata,
  payment_intent: intentId,
  status,
});
