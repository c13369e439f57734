import Stripe from 'stripe';
import { MoneyDocumentsRepository } from '../../src/modules/payments/money-documents.repository.js';
import { addProposal, approve } from '../../src/modules/payments/payments.testkit.js';
import { ObjectStorage } from '../../src/ports/storage/storage.js';
import type { RouteCase } from './route-case.js';
import { MARK, type World, walkCardService } from './world.js';

/** A job of ours with an approved proposal, and what is owed on it. */
async function agreed(world: World) {
  const proposal = await addProposal(world.test, world.companyId, `${MARK} job`);
  await approve(world.test, proposal, { revision: 1, totalMinor: 100_000, clientName: `${MARK} client` });
  const { rows } = await world.test.database.executeSql(
    'SELECT id FROM dues WHERE proposal_id = $1 ORDER BY position',
    [proposal.proposalId],
  );
  const [deposit, start] = rows as { id: string }[];
  return { ...proposal, depositId: deposit!.id, startId: start!.id };
}

const money = { method: 'cheque', amountMinor: 10_000, receivedOn: '2026-05-31', note: '' };

async function received(world: World) {
  const job = await agreed(world);
  const { body } = await world.owner
    .post(`/api/jobs/${job.jobId}/dues/${job.depositId}/payments`)
    .set('Idempotency-Key', 'received')
    .send(money)
    .expect(201);
  return { ...job, paymentId: (body as { payments: { id: string }[] }).payments[0]!.id };
}

/** With its PDF made, as the worker would. */
async function paper(world: World) {
  const job = await agreed(world);
  const documents = world.test.app.get(MoneyDocumentsRepository, { strict: false });
  const [row] = await documents.ofProposal(job);
  const pdfKey = `${job.companyId}/money/${row!.id}.pdf`;
  const storage = world.test.app.get(ObjectStorage, { strict: false });
  await storage.put(pdfKey, Buffer.from(`%PDF ${MARK}`), 'application/pdf');
  await documents.update(job.companyId, row!.id, { status: 'ready', pdfKey, pdfHash: 'hash' });
  return { jobId: job.jobId, documentId: row!.id };
}

/** Of a kind that nothing follows from. */
const word = {
  id: 'evt_walk',
  object: 'event',
  type: 'customer.created',
  data: { object: { id: 'cus_walk' } },
};

export const routes: readonly RouteCase[] = [
  {
    route: 'GET /api/jobs/:jobId/payments',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ params: { jobId: (await agreed(world)).jobId } }),
  },
  {
    route: 'POST /api/jobs/:jobId/dues/:dueId/request',
    audience: 'planners',
    answers: 200,
    request: async (world) => {
      const { jobId, startId } = await agreed(world);
      return { params: { jobId, dueId: startId } };
    },
  },
  {
    route: 'POST /api/jobs/:jobId/dues/:dueId/payments',
    audience: 'planners',
    answers: 201,
    request: async (world) => {
      const { jobId, depositId } = await agreed(world);
      return { params: { jobId, dueId: depositId }, body: money };
    },
  },
  {
    route: 'POST /api/jobs/:jobId/payments/:paymentId/refunds',
    audience: 'owners',
    answers: 201,
    request: async (world) => {
      const { jobId, paymentId } = await received(world);
      return { params: { jobId, paymentId }, body: { amountMinor: 500, reason: 'Fewer lights' } };
    },
  },
  {
    route: 'GET /api/jobs/:jobId/money-documents/:documentId/pdf',
    audience: 'planners',
    answers: 200,
    request: async (world) => ({ params: await paper(world) }),
  },
  {
    route: 'GET /api/payments/export',
    audience: 'owners',
    answers: 200,
    request: async (world) => {
      await received(world);
      return {};
    },
  },
  {
    route: 'POST /api/webhooks/stripe',
    audience: 'anyone',
    answers: 204,
    request: () => ({
      body: word,
      headers: {
        'Stripe-Signature': Stripe.webhooks.generateTestHeaderString({
          payload: JSON.stringify(word),
          secret: walkCardService.STRIPE_WEBHOOK_SECRET,
        }),
      },
    }),
  },
];
