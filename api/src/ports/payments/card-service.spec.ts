import { randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import {
  type CardEvent,
  CardKeyReused,
  CardServiceAway,
  CardServiceRefusal,
  type NewCheckout,
  WrongSignature,
} from './card-service.js';
import { CARD_KEYS, payWith, startTestCardService, type TestCardService } from './card-service.testkit.js';
import { signatureOf } from './fake/courier.js';
import { StripeCardService } from './stripe-card-service.js';

const reference = { companyId: randomUUID(), paymentId: randomUUID() };
const wanted = (overrides: Partial<NewCheckout> = {}): NewCheckout => ({
  amountMinor: 123_456,
  currency: 'USD',
  name: 'Deposit & more, for <Harrow Bank>',
  customerEmail: 'maren@example.com',
  reference,
  successUrl: 'http://127.0.0.1:3000/p/x?paid={CHECKOUT_SESSION_ID}',
  cancelUrl: 'http://127.0.0.1:3000/p/x',
  idempotencyKey: randomUUID(),
  ...overrides,
});

describe('the card service, through its SDK, against the local stand-in', () => {
  let fake: TestCardService;
  let service: StripeCardService;
  let product: Server;
  let words: { event: CardEvent; raw: Buffer; signature: string }[] = [];
  /** What the product answers to the next words. */
  let answers: number[] = [];

  beforeAll(async () => {
    fake = await startTestCardService();
    service = new StripeCardService({ ...CARD_KEYS, apiBase: fake.apiBase });
    product = createServer(async (request, response) => {
      const raw = await buffer(request);
      const signature = String(request.headers['stripe-signature']);
      words.push({ event: service.readEvent(raw, signature), raw, signature });
      response.writeHead(answers.shift() ?? 200).end();
    });
    await new Promise<void>((resolve) => product.listen(0, '127.0.0.1', resolve));
    fake.deliverTo(`http://127.0.0.1:${(product.address() as AddressInfo).port}/words`);
  });
  afterAll(async () => {
    await fake.close();
    product.closeAllConnections();
    await new Promise((resolve) => product.close(resolve));
  });
  beforeEach(async () => {
    await vi.waitFor(() => expect(fake.undelivered()).toHaveLength(0), 5000);
    words = [];
    answers = [];
  });

  const open = async (overrides: Partial<NewCheckout> = {}) => {
    const checkout = await service.createCheckout(wanted(overrides));
    return { ...checkout, url: checkout.url ?? expect.fail('There is no page.') };
  };
  const types = () => words.map(({ event }) => event.type);
  const told = (count: number) => vi.waitFor(() => expect(words).toHaveLength(count), 5000);

  it('opens a page for an amount, and knows it again', async () => {
    const made = await open();
    expect(made).toMatchObject({
      state: 'open',
      amountMinor: 123_456,
      currency: 'USD',
      paymentIntentId: null,
      reference,
    });
    expect(await service.retrieveCheckout(made.id)).toEqual(made);
    const page = await (await fetch(made.url)).text();
    expect(page).toContain('$1,234.56');
    expect(page).toContain('Deposit &amp; more, for &lt;Harrow Bank&gt;');
  });

  it('is paid, sends the payer back, and says so with a signature', async () => {
    const made = await open();
    expect(await payWith(made.url, 'works')).toEqual({
      status: 303,
      to: `http://127.0.0.1:3000/p/x?paid=${made.id}`,
    });
    const paid = await service.retrieveCheckout(made.id);
    expect(paid).toMatchObject({ state: 'paid', url: null });
    expect(paid?.paymentIntentId).toMatch(/^pi_/);
    await told(2);
    expect(words.map(({ event }) => event.about)).toContainEqual({ kind: 'checkout', checkoutId: made.id });
    // A second press finds the page closed.
    expect((await payWith(made.url, 'works')).status).toBe(200);
    await fake.restart();
    expect(await service.retrieveCheckout(made.id)).toEqual(paid);
  });

  it('declines a card and stays open for another', async () => {
    const made = await open();
    expect((await payWith(made.url, 'declined')).status).toBe(402);
    await told(1);
    expect(words[0]?.event.about).toEqual({ kind: 'declined', reference });
    expect((await service.retrieveCheckout(made.id))?.state).toBe('open');
    expect((await payWith(made.url, 'short')).status).toBe(402);
    expect((await payWith(made.url, 'short')).status).toBe(303);
    expect((await service.retrieveCheckout(made.id))?.state).toBe('paid');
  });

  it('brings each word twice, late, or after the one that follows it', async () => {
    await payWith((await open()).url, 'twice');
    await told(4);
    expect(new Set(words.map(({ event }) => event.id)).size).toBe(2);
    words = [];
    await payWith((await open()).url, 'late');
    await new Promise((resolve) => setTimeout(resolve, 150));
    expect(words).toHaveLength(0);
    await told(2);
    words = [];
    await payWith((await open()).url, 'disorder');
    await told(3);
    expect(types()).toEqual([
      'checkout.session.completed',
      'payment_intent.succeeded',
      'payment_intent.payment_failed',
    ]);
  });

  it.each([
    ['bank-later', 'paid', 'checkout.session.async_payment_succeeded'],
    ['bank-fails', 'failed', 'checkout.session.async_payment_failed'],
  ] as const)('lets a bank debit wait (%s)', async (card, state, type) => {
    const made = await open();
    await payWith(made.url, card);
    expect((await service.retrieveCheckout(made.id))?.state).toBe('waiting');
    await told(2);
    expect(types()).toEqual(['checkout.session.completed', type]);
    expect((await service.retrieveCheckout(made.id))?.state).toBe(state);
  });

  it('brings a word again until it is taken, also after a restart', async () => {
    answers = [500, 503];
    await payWith((await open()).url, 'works');
    await told(2);
    await fake.restart();
    await told(4);
    // It knows so only once the answer has reached it.
    await expect.poll(() => fake.undelivered()).toHaveLength(0);
  });

  it('gives the same page for the same key, and an error for the key with another request', async () => {
    const idempotencyKey = randomUUID();
    const first = await open({ idempotencyKey });
    expect((await open({ idempotencyKey })).id).toBe(first.id);
    await expect(open({ idempotencyKey, amountMinor: 5000 })).rejects.toBeInstanceOf(CardKeyReused);
    expect((await open()).id).not.toBe(first.id);
  });

  it('ends a page once', async () => {
    const made = await open();
    expect((await service.expireCheckout(made.id)).state).toBe('expired');
    await expect(service.expireCheckout(made.id)).rejects.toBeInstanceOf(CardServiceRefusal);
    await told(1);
    expect(types()).toEqual(['checkout.session.expired']);
  });

  it('gives money back in parts, never more than there is, and once for each key', async () => {
    const made = await open();
    await payWith(made.url, 'works');
    const paymentIntentId = (await service.retrieveCheckout(made.id))?.paymentIntentId ?? '';
    const refundId = randomUUID();
    const part = { paymentIntentId, amountMinor: 100_000, refundId, idempotencyKey: refundId };
    const refund = await service.refund(part);
    expect(refund).toMatchObject({ state: 'succeeded', amountMinor: 100_000, currency: 'USD', refundId });
    expect(await service.refund(part)).toEqual(refund);
    expect(await service.retrieveRefund(refund.id)).toEqual(refund);
    const more = { ...part, amountMinor: 23_457, idempotencyKey: randomUUID() };
    await expect(service.refund(more)).rejects.toBeInstanceOf(CardServiceRefusal);
    fake.setNextRefund('fails-later');
    const rest = await service.refund({ ...more, amountMinor: 23_456, idempotencyKey: randomUUID() });
    expect(rest.state).toBe('pending');
    await told(5);
    expect(types()).toContain('refund.failed');
    expect((await service.retrieveRefund(rest.id))?.state).toBe('failed');
  });

  it('knows nothing of what is not there', async () => {
    expect(await service.retrieveCheckout('cs_test_none')).toBeNull();
    expect(await service.retrieveRefund('re_none')).toBeNull();
    expect((await fetch(`${fake.apiBase}/pay/cs_test_none`)).status).toBe(404);
  });

  it('refuses a wrong key and an amount too small, and tells a service that is away', async () => {
    await expect(open({ amountMinor: 3 })).rejects.toBeInstanceOf(CardServiceRefusal);
    const stranger = new StripeCardService({
      ...CARD_KEYS,
      secretKey: 'sk_test_other',
      apiBase: fake.apiBase,
    });
    await expect(stranger.createCheckout(wanted())).rejects.toBeInstanceOf(CardServiceAway);
    const nowhere = new StripeCardService({ ...CARD_KEYS, apiBase: 'http://127.0.0.1:9' });
    await expect(nowhere.createCheckout(wanted())).rejects.toBeInstanceOf(CardServiceAway);
  });

  it('believes no word that was changed, signed by others, or signed long ago', async () => {
    await payWith((await open()).url, 'works');
    await told(2);
    const { raw, signature } = words[0]!;
    expect(service.readEvent(raw, signature).id).toBe(words[0]?.event.id);
    const changed = Buffer.from(raw.toString().replace('123456', '123'));
    const wrong: [Buffer, string][] = [
      [changed, signature],
      [raw, signatureOf(raw.toString(), 'whsec_other')],
      [raw, ''],
      [raw, 't=1,v1=00'],
    ];
    for (const [body, header] of wrong) expect(() => service.readEvent(body, header)).toThrow(WrongSignature);
    vi.setSystemTime(Date.now() + 6 * 60_000);
    expect(() => service.readEvent(raw, signature)).toThrow(WrongSignature);
    vi.useRealTimers();
  });
});
