import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import {
  CARD_KEYS,
  payWith,
  startTestCardService,
  type TestCardService,
} from '../../ports/payments/card-service.testkit.js';
import { signatureOf } from '../../ports/payments/fake/courier.js';
import { StripeCardService } from '../../ports/payments/stripe-card-service.js';
import { CardCheckouts } from './card-checkouts.js';
import { CardRefunds } from './card-refunds.js';
import { Dues } from './dues.js';
import type { JobPayments } from './payments.dto.js';
import { addProposal, approve, type TestProposal } from './payments.testkit.js';

const RETURN = 'http://127.0.0.1:3000/p/some-link';

describe('payments by card', () => {
  let cards: TestCardService;
  let test: TestApp;
  let owner: TestPerson;
  let proposal: TestProposal;
  let dueId: string;

  beforeAll(async () => {
    cards = await startTestCardService();
    test = await startTestApp(cards.settings);
    cards.deliverTo(`${test.url}/api/webhooks/stripe`);
  });
  afterAll(async () => {
    await test.close();
    await cards.close();
  });
  beforeEach(async () => {
    owner = await addPerson(test, await addCompany(test), 'owner');
    proposal = await addProposal(test, owner.actor.companyId);
    await approve(test, proposal, { revision: 1, totalMinor: 100_000, taxMinor: 7_622 });
    dueId = (await books()).dues[0]!.id;
  });

  const service = () => new StripeCardService({ ...CARD_KEYS, apiBase: cards.apiBase });
  const books = async (): Promise<JobPayments> =>
    (await owner.agent.get(`/api/jobs/${proposal.jobId}/payments`).expect(200)).body;
  const dues = () => test.app.get(Dues, { strict: false });
  const checkout = (returnUrl = RETURN, due = dueId) =>
    dues().checkout({ ...proposal, email: proposal.email }, due, returnUrl);
  const quiet = () => vi.waitFor(() => expect(cards.undelivered()).toHaveLength(0), 8000);
  const events = async () => {
    const { rows } = await test.database.executeSql(
      'SELECT kind, data FROM job_events WHERE job_id = $1 ORDER BY created_at, kind',
      [proposal.jobId],
    );
    return (rows as { kind: string }[]).map(({ kind }) => kind);
  };
  const post = (path: string, body: object, key: string = randomUUID()) =>
    owner.agent.post(`/api/jobs/${proposal.jobId}/${path}`).set('Idempotency-Key', key).send(body);
  const sentWord = (payload: string, signature: string) =>
    test
      .agent()
      .post('/api/webhooks/stripe')
      .set('Content-Type', 'application/json')
      .set('Stripe-Signature', signature)
      .send(payload);

  it('are declined, then paid, and count when the word comes', async () => {
    const { url } = await checkout();
    expect((await payWith(url, 'declined')).status).toBe(402);
    await quiet();
    expect((await books()).paidMinor).toBe(0);
    expect(await events()).toEqual(['payment-requested', 'payment-failed']);
    const paid = await payWith(url, 'works');
    expect(paid.to).toBe(`${RETURN}?paid=${dueId}`);
    await quiet();
    const { paidMinor, outstandingMinor, payments, documents } = await books();
    expect({ paidMinor, outstandingMinor }).toEqual({ paidMinor: 30_000, outstandingMinor: 70_000 });
    expect(payments).toMatchObject([{ method: 'card', status: 'succeeded', amountMinor: 30_000 }]);
    expect(documents.map(({ kind, amountMinor }) => [kind, amountMinor])).toEqual([
      ['invoice', 30_000],
      ['receipt', 30_000],
    ]);
    expect(await events()).toEqual(['payment-requested', 'payment-failed', 'payment-received']);
    expect(await dues().shared(proposal.companyId, proposal.proposalId)).toMatchObject([
      { outstandingMinor: 0, paidMinor: 30_000, payable: false, pending: false, requested: true },
      { outstandingMinor: 40_000, payable: false, requested: false },
      { outstandingMinor: 30_000, payable: false, requested: false },
    ]);
  });

  it('do not count by the payer’s coming back alone', async () => {
    cards.deliverTo(null);
    const { url } = await checkout();
    await payWith(url, 'works');
    expect((await books()).paidMinor).toBe(0);
    // Nor can they be paid once more.
    await expect(checkout()).rejects.toMatchObject({ status: 409, code: 'payment-under-way' });
    cards.deliverTo(`${test.url}/api/webhooks/stripe`);
    await quiet();
    expect((await books()).paidMinor).toBe(30_000);
    await expect(checkout()).rejects.toMatchObject({ status: 409, code: 'nothing-owed' });
  });

  it.each(['twice', 'disorder', 'late', 'bank-later'] as const)(
    'count once when words come: %s',
    async (card) => {
      const { url } = await checkout();
      await payWith(url, card);
      await vi.waitFor(async () => expect((await books()).paidMinor).toBe(30_000), 8000);
      await quiet();
      const { paidMinor, documents } = await books();
      expect(paidMinor).toBe(30_000);
      expect(documents.filter(({ kind }) => kind === 'receipt')).toHaveLength(1);
      expect((await events()).filter((kind) => kind === 'payment-received')).toHaveLength(1);
    },
  );

  it('fail with a bank debit that does not come, and can be tried again', async () => {
    await payWith((await checkout()).url, 'bank-fails');
    await vi.waitFor(async () => expect((await books()).payments[0]?.status).toBe('failed'), 8000);
    await quiet();
    expect(await events()).toContain('payment-failed');
    await payWith((await checkout()).url, 'works');
    await quiet();
    expect((await books()).paidMinor).toBe(30_000);
  });

  it('hear only what the card service signed, and each word once', async () => {
    cards.deliverTo(null);
    const { url } = await checkout();
    await payWith(url, 'works');
    const { payload } = cards.undelivered().find((word) => word.payload.includes('session.completed'))!;
    const wrong: [string, string][] = [
      [payload, signatureOf(payload, 'whsec_of_somebody_else')],
      [payload.replace('30000', '10000'), signatureOf(payload, CARD_KEYS.webhookSecret)],
      [payload, ''],
    ];
    for (const [body, signature] of wrong)
      expect((await sentWord(body, signature)).body.code).toBe('wrong-signature');
    expect((await books()).paidMinor).toBe(0);
    const right = signatureOf(payload, CARD_KEYS.webhookSecret);
    const answers = await Promise.all([1, 2, 3, 4].map(() => sentWord(payload, right)));
    expect(answers.map(({ status }) => status)).toEqual([204, 204, 204, 204]);
    await sentWord(payload, right).expect(204);
    const { paidMinor, documents } = await books();
    expect(paidMinor).toBe(30_000);
    expect(documents).toHaveLength(2);
    cards.deliverTo(`${test.url}/api/webhooks/stripe`);
    await quiet();
    expect((await books()).documents).toHaveLength(2);
  });

  it('refuse words from another site’s page, and words too large', async () => {
    await test.agent().post('/api/webhooks/stripe').set('Sec-Fetch-Site', 'cross-site').send({}).expect(403);
    await sentWord('x'.repeat(300_000), 'x').expect(413);
  });

  it('do not count when the card service reports another sum', async () => {
    const { url } = await checkout();
    await test.database.executeSql('UPDATE payments SET amount_minor = 29999 WHERE due_id = $1', [dueId]);
    await payWith(url, 'twice');
    await quiet();
    const { paidMinor, payments } = await books();
    expect(paidMinor).toBe(0);
    expect(payments[0]).toMatchObject({ status: 'failed' });
    expect(payments[0]?.note).toContain('$300.00');
    expect((await events()).filter((kind) => kind === 'payment-mismatch')).toHaveLength(1);
  });

  it('lead two tabs to one page', async () => {
    const urls = await Promise.all([checkout(), checkout(), checkout()]);
    expect(new Set(urls.map(({ url }) => url)).size).toBe(1);
    expect((await books()).payments).toHaveLength(1);
  });

  it('lead two links to a page of their own, of which only the newer can be paid', async () => {
    const first = await checkout();
    const second = await checkout('http://127.0.0.1:3000/p/another-link');
    expect(second.url).not.toBe(first.url);
    expect((await payWith(first.url, 'works')).to).toBeNull();
    expect((await payWith(second.url, 'works')).status).toBe(303);
    await quiet();
    const { paidMinor, payments } = await books();
    expect(paidMinor).toBe(30_000);
    expect(payments.map(({ status }) => status).sort()).toEqual(['expired', 'succeeded']);
  });

  it('of two links at the same moment count once', async () => {
    const others = [RETURN, 'http://127.0.0.1:3000/p/b', RETURN, 'http://127.0.0.1:3000/p/c'];
    const begun = await Promise.allSettled(others.map((returnUrl) => checkout(returnUrl)));
    const urls = begun.flatMap((one) => (one.status === 'fulfilled' ? [one.value.url] : []));
    for (const url of urls) await payWith(url, 'works');
    await payWith((await checkout().catch(() => ({ url: urls[0] ?? '' }))).url, 'works');
    await quiet();
    const { paidMinor, payments, creditMinor } = await books();
    expect(paidMinor).toBe(30_000);
    expect(creditMinor).toBe(0);
    expect(payments.filter(({ status }) => status === 'succeeded')).toHaveLength(1);
  });

  it('go on after a stop between keeping the payment and keeping its page', async () => {
    await checkout();
    await test.database.executeSql('UPDATE payments SET checkout_id = NULL WHERE due_id = $1', [dueId]);
    const { url } = await checkout();
    expect((await books()).payments).toHaveLength(1);
    await payWith(url, 'works');
    await quiet();
    expect((await books()).paidMinor).toBe(30_000);
  });

  it('count when the word comes before the page was kept', async () => {
    const { url } = await checkout();
    await test.database.executeSql('UPDATE payments SET checkout_id = NULL WHERE due_id = $1', [dueId]);
    await payWith(url, 'works');
    await quiet();
    expect((await books()).paidMinor).toBe(30_000);
  });

  it('keep money that came by a page that was thought gone', async () => {
    const { url } = await checkout();
    await test.database.executeSql(
      `UPDATE payments SET checkout_id = 'cs_test_other', status = 'expired' WHERE due_id = $1`,
      [dueId],
    );
    await payWith(url, 'twice');
    await quiet();
    const { paidMinor, payments } = await books();
    expect(paidMinor).toBe(30_000);
    expect(payments.map(({ status }) => status).sort()).toEqual(['expired', 'succeeded']);
  });

  it('begin anew when the card service knows nothing of the page', async () => {
    await checkout();
    await test.database.executeSql(`UPDATE payments SET checkout_id = 'cs_test_gone' WHERE due_id = $1`, [
      dueId,
    ]);
    await payWith((await checkout()).url, 'works');
    await quiet();
    expect((await books()).paidMinor).toBe(30_000);
  });

  it('are refused for what is not asked for, not owed, or not of this proposal', async () => {
    const [, start] = (await books()).dues;
    await expect(checkout(RETURN, start!.id)).rejects.toMatchObject({ code: 'not-requested' });
    await expect(checkout(RETURN, randomUUID())).rejects.toMatchObject({ status: 404 });
    const other = await addProposal(test, owner.actor.companyId);
    await expect(dues().checkout({ ...other, email: other.email }, dueId, RETURN)).rejects.toMatchObject({
      status: 404,
    });
  });

  it('end their page when the money came in another way', async () => {
    const { url } = await checkout();
    const money = { method: 'cheque', amountMinor: 30_000, receivedOn: '2026-05-31', note: 'No. 7' };
    await post(`dues/${dueId}/payments`, money).expect(201);
    const open = (await books()).payments.find(({ method }) => method === 'card')!;
    await test.app
      .get(CardCheckouts, { strict: false })
      .end({ companyId: owner.actor.companyId, paymentId: open.id });
    expect((await payWith(url, 'works')).to).toBeNull();
    expect((await books()).payments.find(({ id }) => id === open.id)?.status).toBe('expired');
  });

  describe('paid back', () => {
    let paymentId: string;
    beforeEach(async () => {
      await payWith((await checkout()).url, 'works');
      await quiet();
      paymentId = (await books()).payments[0]!.id;
    });
    const refund = (amountMinor: number, key?: string) =>
      post(`payments/${paymentId}/refunds`, { amountMinor, reason: 'Fewer lights' }, key);
    const send = async () => {
      const refunds = test.app.get(CardRefunds, { strict: false });
      for (const { id } of (await books()).refunds)
        await refunds.send({ companyId: owner.actor.companyId, refundId: id });
    };

    it('once for one key, and never more than was paid', async () => {
      const first = await refund(20_000, 'the-key').expect(201);
      const second = await refund(20_000, 'the-key').expect(201);
      expect(second.body).toEqual(first.body);
      await refund(10_001).expect(409);
      await send();
      await send();
      await quiet();
      const { paidMinor, outstandingMinor, refunds, documents } = await books();
      expect({ paidMinor, outstandingMinor }).toEqual({ paidMinor: 10_000, outstandingMinor: 90_000 });
      expect(refunds).toMatchObject([{ amountMinor: 20_000, status: 'succeeded' }]);
      expect(documents.filter(({ kind }) => kind === 'refund')).toHaveLength(1);
      expect((await events()).filter((kind) => kind === 'refunded')).toHaveLength(1);
    });

    it.each([
      ['later', 'succeeded', 20_000],
      ['fails-later', 'failed', 30_000],
    ] as const)('%s', async (course, status, paidMinor) => {
      cards.setNextRefund(course);
      await refund(10_000).expect(201);
      await send();
      expect((await books()).refunds[0]?.status).toBe('pending');
      expect((await books()).paidMinor).toBe(20_000);
      await vi.waitFor(async () => expect((await books()).refunds[0]?.status).toBe(status), 8000);
      await quiet();
      expect((await books()).paidMinor).toBe(paidMinor);
    });

    it('at the card service itself, is in the books too', async () => {
      const { rows } = await test.database.executeSql(
        'SELECT payment_intent_id FROM payments WHERE id = $1',
        [paymentId],
      );
      const { payment_intent_id: paymentIntentId } = rows[0] as { payment_intent_id: string };
      await service().refund({
        paymentIntentId,
        amountMinor: 5_000,
        refundId: 'made-elsewhere',
        idempotencyKey: randomUUID(),
      });
      await quiet();
      const { paidMinor, refunds } = await books();
      expect(paidMinor).toBe(25_000);
      expect(refunds).toMatchObject([{ amountMinor: 5_000, status: 'succeeded' }]);
      await refund(25_001).expect(409);
    });
  });
});
