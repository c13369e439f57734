import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { seeded } from '../../../../geometry/src/plan/plan.testkit.js';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import {
  CARD_KEYS,
  payWith,
  startTestCardService,
  type TestCardService,
} from '../../ports/payments/card-service.testkit.js';
import { signatureOf } from '../../ports/payments/fake/courier.js';
import { CardRefunds } from './card-refunds.js';
import { Dues } from './dues.js';
import type { JobPayments } from './payments.dto.js';
import { addProposal, approve, type TestProposal } from './payments.testkit.js';

const STEPS = 25;

/** What should be true, by the plainest of means. */
interface Model {
  agreedMinor: number;
  taxMinor: number;
  revision: number;
  readonly payments: Map<string, { readonly amountMinor: number; backMinor: number }>;
  /** Paid at the card service; word of it has not been heard. */
  readonly unheard: Map<string, number>;
}

const sum = (amounts: readonly number[]) => amounts.reduce((total, one) => total + one, 0);

describe('the books of a job', () => {
  let cards: TestCardService;
  let test: TestApp;
  let owner: TestPerson;

  beforeAll(async () => {
    cards = await startTestCardService();
    test = await startTestApp(cards.settings);
  });
  afterAll(async () => {
    await test.close();
    await cards.close();
  });

  it.each([1, 2, 3, 4])('balance after anything that may happen (seed %i)', async (seed) => {
    const random = seeded(seed);
    const whole = (from: number, to: number) => from + Math.floor(random() * (to - from + 1));
    const oneOf = <T>(items: readonly T[]): T | undefined => items[whole(0, items.length - 1)];
    owner = await addPerson(test, await addCompany(test), 'owner');
    const proposal = await addProposal(test, owner.actor.companyId);
    const model: Model = {
      agreedMinor: 0,
      taxMinor: 0,
      revision: 0,
      payments: new Map(),
      unheard: new Map(),
    };
    const words: string[] = [];

    const agree = async (totalMinor: number) => {
      const taxMinor = whole(0, Math.floor(totalMinor / 5));
      const before =
        model.revision === 0 ? null : { totalMinor: model.agreedMinor, revision: model.revision };
      model.revision += 1;
      Object.assign(model, { agreedMinor: totalMinor, taxMinor });
      await approve(test, proposal, {
        revision: model.revision,
        totalMinor,
        taxMinor,
        before,
        shares: [whole(0, 50), whole(0, 50)],
      });
    };
    const read = () => books(owner, proposal);
    const post = (path: string, body: object) =>
      owner.agent.post(`/api/jobs/${proposal.jobId}/${path}`).set('Idempotency-Key', randomUUID()).send(body);
    const owed = async () => (await read()).dues.filter(({ outstandingMinor }) => outstandingMinor > 0);

    const hear = async (payload: string) => {
      await test
        .agent()
        .post('/api/webhooks/stripe')
        .set('Content-Type', 'application/json')
        .set('Stripe-Signature', signatureOf(payload, CARD_KEYS.webhookSecret))
        .send(payload)
        .expect(204);
      const { type, data } = JSON.parse(payload) as {
        type: string;
        data: { object: { metadata: { payment_id?: string } } };
      };
      const paymentId = data.object.metadata.payment_id ?? '';
      const amountMinor = model.unheard.get(paymentId);
      // Whatever the word is about, the service is asked what has become of the payment.
      const leads = type.startsWith('checkout.session.') || type === 'payment_intent.payment_failed';
      if (!leads || amountMinor === undefined) return;
      model.unheard.delete(paymentId);
      model.payments.set(paymentId, { amountMinor, backMinor: 0 });
    };

    const steps = {
      more: () => agree(model.agreedMinor + whole(1, 40_000)),
      less: () => agree(Math.max(0, model.agreedMinor - whole(1, 60_000))),
      record: async () => {
        const due = oneOf(await owed());
        if (!due) return;
        const amountMinor = whole(1, due.outstandingMinor);
        const money = { method: 'transfer', amountMinor, receivedOn: '2026-05-31', note: '' };
        const known = new Set((await read()).payments.map(({ id }) => id));
        const { body } = await post(`dues/${due.id}/payments`, money).expect(201);
        const made = (body as JobPayments).payments.find(({ id }) => !known.has(id))!;
        model.payments.set(made.id, { amountMinor, backMinor: 0 });
      },
      recordTooMuch: async () => {
        const due = oneOf((await read()).dues);
        if (!due) return;
        const money = {
          method: 'cash',
          amountMinor: due.outstandingMinor + 1,
          receivedOn: '2026-05-31',
          note: '',
        };
        await post(`dues/${due.id}/payments`, money).expect(409);
      },
      card: async () => {
        const due = oneOf((await owed()).filter(({ outstandingMinor }) => outstandingMinor >= 50));
        if (!due) return;
        if (due.requestedAt === null) await post(`dues/${due.id}/request`, {}).expect(200);
        const begun = await test.app
          .get(Dues, { strict: false })
          .checkout({ ...proposal, email: proposal.email }, due.id, 'http://127.0.0.1:3000/p/x')
          .catch((error: { code?: string }) => {
            expect(error.code).toBe('payment-under-way');
            return null;
          });
        if (!begun) return;
        const before = cards.undelivered().length;
        const paid = await payWith(begun.url, oneOf(['works', 'declined', 'disorder', 'twice'] as const)!);
        words.push(
          ...cards
            .undelivered()
            .slice(before)
            .map(({ payload }) => payload),
        );
        if (paid.status !== 303) return;
        const open = (await read()).payments.find(
          ({ dueId, status }) => dueId === due.id && status === 'open',
        )!;
        model.unheard.set(open.id, open.amountMinor);
      },
      refund: async () => {
        const left = [...model.payments].filter(([, one]) => one.amountMinor > one.backMinor);
        const chosen = oneOf(left);
        if (!chosen) return;
        const [paymentId, payment] = chosen;
        const amountMinor = whole(1, payment.amountMinor - payment.backMinor);
        await post(`payments/${paymentId}/refunds`, { amountMinor, reason: 'As agreed' }).expect(201);
        payment.backMinor += amountMinor;
        const before = cards.undelivered().length;
        for (const { id } of (await read()).refunds)
          await test.app
            .get(CardRefunds, { strict: false })
            .send({ companyId: proposal.companyId, refundId: id });
        words.push(
          ...cards
            .undelivered()
            .slice(before)
            .map(({ payload }) => payload),
        );
      },
      refundTooMuch: async () => {
        const chosen = oneOf([...model.payments]);
        if (!chosen) return;
        const [paymentId, { amountMinor, backMinor }] = chosen;
        const body = { amountMinor: amountMinor - backMinor + 1, reason: 'As agreed' };
        await post(`payments/${paymentId}/refunds`, body).expect(409);
      },
      /** Any word that was ever said, new or not. */
      hear: async () => {
        const word = oneOf(words);
        if (word !== undefined) await hear(word);
      },
    };

    await agree(whole(10_000, 300_000));
    const names = Object.keys(steps) as (keyof typeof steps)[];
    for (let step = 0; step < STEPS; step += 1) {
      const name = names[whole(0, names.length - 1)]!;
      await steps[name]();
      await check(proposal, model, `seed ${seed}, step ${step}: ${name}`);
    }
    for (const word of [...words].sort(() => random() - 0.5)) await hear(word);
    expect(model.unheard.size).toBe(0);
    await check(proposal, model, `seed ${seed}, at the end`);
    // Whatever came before, what is left can be paid.
    for (const due of await owed())
      await post(`dues/${due.id}/payments`, {
        method: 'cash',
        amountMinor: due.outstandingMinor,
        receivedOn: '2026-05-31',
        note: '',
      }).expect(201);
    expect((await read()).outstandingMinor).toBe(0);
  });

  async function check(proposal: TestProposal, model: Model, when: string): Promise<void> {
    const now = await books(owner, proposal);
    const payments = [...model.payments.values()];
    const paidMinor = sum(payments.map(({ amountMinor, backMinor }) => amountMinor - backMinor));
    expect({ agreed: now.agreedMinor, paid: now.paidMinor }, when).toEqual({
      agreed: model.agreedMinor,
      paid: paidMinor,
    });
    expect(now.paidMinor + now.outstandingMinor - now.creditMinor, when).toBe(now.agreedMinor);
    expect(sum(now.dues.map((due) => due.amountMinor - due.reducedMinor)), when).toBe(model.agreedMinor);
    expect(sum(now.dues.map((due) => due.outstandingMinor)), when).toBe(now.outstandingMinor);
    expect(sum(now.dues.map((due) => due.paidMinor)), when).toBe(paidMinor);
    for (const due of now.dues) {
      expect(due.reducedMinor, when).toBeGreaterThanOrEqual(0);
      expect(due.amountMinor - due.reducedMinor, when).toBeGreaterThanOrEqual(0);
      expect(due.outstandingMinor, when).toBeGreaterThanOrEqual(0);
    }
    const counted = now.payments.filter(({ status }) => status === 'succeeded');
    expect(counted.map(({ id }) => id).sort(), when).toEqual([...model.payments.keys()].sort());
    const papers = (kind: string) => now.documents.filter((one) => one.kind === kind);
    expect(sum(papers('receipt').map((one) => one.amountMinor)), when).toBe(
      sum(payments.map(({ amountMinor }) => amountMinor)),
    );
    expect(papers('receipt'), when).toHaveLength(counted.length);
    expect(sum(papers('refund').map((one) => one.amountMinor)), when).toBe(
      sum(payments.map(({ backMinor }) => backMinor)),
    );
    for (const kind of ['invoice', 'receipt', 'refund']) {
      const numbers = papers(kind).map(({ number }) => number);
      expect(numbers, when).toEqual(numbers.map((_, i) => 1001 + i));
    }
  }
});

async function books(owner: TestPerson, { jobId }: TestProposal): Promise<JobPayments> {
  return (await owner.agent.get(`/api/jobs/${jobId}/payments`).expect(200)).body;
}
