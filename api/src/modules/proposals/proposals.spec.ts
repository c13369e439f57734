import { createHash, randomUUID } from 'node:crypto';
import { PLAN_SCHEMA_VERSION } from '@lampwright/geometry/plan';
import { emptyPricing } from '@lampwright/geometry/price';
import type { INestApplicationContext } from '@nestjs/common';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Agent, TestApp } from '../../../test/harness.js';
import { LinkGate } from '../../access/link-gate.js';
import { hashToken } from '../../access/one-time-token.js';
import { canonicalJson } from '../../http/canonical-json.js';
import { PrepareProposal } from '../../jobs/prepare-proposal.js';
import { Remind } from '../../jobs/remind.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { addJob } from '../plans/plans.testkit.js';
import {
  addPricedCompany,
  editBook,
  group,
  type PricedCompany,
  savePricing,
} from '../pricing/pricing.testkit.js';
import type { RevisionDetail } from './proposals.dto.js';
import { ProposalsRepository } from './proposals.repository.js';
import {
  addReadyJob,
  approveRevision,
  drawOn,
  freeze,
  frozenAndReady,
  LIGHT,
  post,
  proposalFor,
  proposalPath,
  type ReadyJob,
  sendTo,
  startProposalTest,
  untilRevision,
} from './proposals.testkit.js';
import { revisionDocumentSchema } from './revision-document.js';
import { Sending } from './sending.js';

// Plans are solved and PDFs made here: on a busy machine that takes its time.
vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });

let test: TestApp;
let worker: INestApplicationContext;
let company: PricedCompany;
let agent: Agent;
let job: ReadyJob;

beforeAll(async () => {
  test = await startProposalTest();
  worker = await test.startWorker();
  company = await addPricedCompany(test);
  agent = company.designer.agent;
});
afterAll(() => test?.close());
beforeEach(async () => {
  job = await addReadyJob(test, company);
});

interface StoredRevision {
  readonly id: string;
  readonly document: string;
  readonly hash: string;
  readonly cost_minor: string | null;
  readonly pictures: Record<string, string>;
  readonly pdf_key: string;
  readonly pdf_hash: string;
  readonly changes_revision_id: string | null;
}

async function rows<T>(sql: string, ...values: unknown[]): Promise<T[]> {
  return (await test.database.executeSql(sql, values)).rows as T[];
}

const storedRevisions = ({ jobId }: ReadyJob) =>
  rows<StoredRevision>(
    `SELECT r.* FROM proposal_revisions r JOIN proposals p ON p.id = r.proposal_id
      WHERE p.job_id = $1 ORDER BY r.revision`,
    jobId,
  );

interface StoredMail {
  readonly text: string;
  readonly html: string;
  readonly subject: string;
  readonly reply_to: string | null;
  readonly attachments: { fileName: string; key: string }[];
}
const mailTo = (address: string) =>
  rows<StoredMail>('SELECT * FROM mail_messages WHERE "to" = $1 ORDER BY created_at', address);

const tokenIn = ({ text }: StoredMail): string => {
  const [, token = ''] = /\/p\/([\w-]+)/.exec(text) ?? [];
  return token;
};

const kindsOf = async ({ jobId }: ReadyJob) =>
  (
    await rows<{ kind: string }>(
      'SELECT kind FROM job_events WHERE job_id = $1 ORDER BY created_at, id',
      jobId,
    )
  ).map(({ kind }) => kind);

const address = () => `homeowner-${randomUUID()}@example.com`;
const path = (what: string, { jobId } = job) => `${proposalPath(jobId)}/${what}`;
const send = (revisionId: string, to: string) =>
  post(agent, path(`revisions/${revisionId}/send`), sendTo(to));
const detail = async (revisionId: string): Promise<RevisionDetail> =>
  (await agent.get(path(`revisions/${revisionId}`)).expect(200)).body;
const addLight = () =>
  drawOn(test, company.companyId, job.jobId, job.sheetId, (plan) => {
    const added = plan.fixture(LIGHT, [900, 100]);
    plan.cable('12 AWG landscape cable, 2-core', [job.lights.at(-1) ?? '', added]);
  });

describe('freezing', () => {
  it('keeps plan, price and words as the bytes that are hashed, without a cost', async () => {
    const { id, revision, hash, totalMinor } = await freeze(agent, job.jobId);
    expect(revision).toBe(1);
    const [stored] = await storedRevisions(job);
    expect(stored?.hash).toBe(createHash('sha256').update(stored!.document, 'utf8').digest('hex'));
    expect(hash).toBe(stored?.hash);
    const document = revisionDocumentSchema.parse(JSON.parse(stored!.document));
    expect(canonicalJson(document)).toBe(stored?.document);
    expect(document.lights).toHaveLength(3);
    expect(document.lights[0]).toMatchObject({ tag: 'P1', sheetId: job.sheetId });
    expect(document.price.combinations[0]?.totalMinor).toBe(totalMinor);
    expect(Number(stored?.cost_minor)).toBeGreaterThan(0);
    // Words such as "cost" may stand in texts; no key may be one.
    expect(stored?.document).not.toMatch(/"\w*(cost|margin|markup|supplier)\w*":/i);
    expect((await detail(id)).document).toEqual(document);
    expect(await kindsOf(job)).toContain('proposal-frozen');
  });

  it('keeps the form of the plan, and where its evenings are: about the property, or where the company is', async () => {
    const own = await addPricedCompany(test);
    const elsewhere = await addReadyJob(test, own);
    const place = { latitude: 51.5074, longitude: -0.1278 };
    await own.owner.agent
      .patch('/api/company')
      .send({ settings: { timeZone: 'Europe/London', place } })
      .expect(200);
    const evenings = async () => {
      await freeze(own.designer.agent, elsewhere.jobId);
      return (await storedRevisions(elsewhere)).map(({ document }) => {
        const { evening, plan } = revisionDocumentSchema.parse(JSON.parse(document));
        expect(plan.schema).toBe(PLAN_SCHEMA_VERSION);
        return evening;
      });
    };
    const timeZone = 'Europe/London';
    const company = { place: { latitude: 51.51, longitude: -0.13 }, timeZone };
    expect(await evenings()).toEqual([company]);
    await test.database.executeSql(
      `UPDATE properties SET latitude = 40.71277, longitude = -74.00597
        WHERE id = (SELECT property_id FROM jobs WHERE id = $1)`,
      [elsewhere.jobId],
    );
    const property = { place: { latitude: 40.71, longitude: -74.01 }, timeZone };
    // What was frozen before stays.
    expect(await evenings()).toEqual([company, property]);
  });

  it('happens once for a key, and anew for another', async () => {
    const key = randomUUID();
    const first = await post(agent, path('revisions'), {}, key).expect(201);
    const again = await post(agent, path('revisions'), {}, key).expect(201);
    expect(again.body).toEqual(first.body);
    expect((await freeze(agent, job.jobId)).revision).toBe(2);
    expect(await storedRevisions(job)).toHaveLength(2);
  });

  it('numbers proposals without gaps, and revisions within them, when many ask at once', async () => {
    const other = await addPricedCompany(test);
    const jobs = [await addReadyJob(test, other), await addReadyJob(test, other)];
    const asked = jobs.flatMap(({ jobId }) => [
      freeze(other.owner.agent, jobId),
      freeze(other.owner.agent, jobId),
    ]);
    const made = await Promise.all(asked);
    expect(made.map(({ revision }) => revision).sort()).toEqual([1, 1, 2, 2]);
    const numbers = await Promise.all(
      jobs.map(async ({ jobId }) => (await proposalFor(other.owner.agent, jobId)).number),
    );
    expect(numbers.sort()).toEqual([1001, 1002]);
  });

  it('is refused with all that stands in the way, and leaves nothing behind', async () => {
    const jobId = await addJob(company.designer);
    const { body } = await post(agent, `${proposalPath(jobId)}/revisions`).expect(409);
    expect(body).toMatchObject({
      code: 'not-ready',
      detail: 'The plan has no fixtures yet.',
      obstacles: [{ mend: 'plan' }],
    });
    expect(await proposalFor(agent, jobId)).toMatchObject({ number: null, state: 'draft', revisions: [] });
  });

  it('holds the words of the company, but for those that the job has of its own', async () => {
    await agent.put(path('words')).send({ timeline: 'We begin in June.' }).expect(200);
    const before = await proposalFor(agent, job.jobId);
    expect(before).toMatchObject({ number: null, own: ['timeline'] });
    const { document } = await detail((await freeze(agent, job.jobId)).id);
    expect(document.words).toEqual({ ...before.words, timeline: 'We begin in June.' });
    expect(document.words.cancellation).toContain('three business days');
    expect(document.cautions.join(' ')).toContain('GFCI');
  });

  it('leaves prices of lines out where the company does not show them', async () => {
    const other = await addPricedCompany(test);
    const hidden = await addReadyJob(test, other);
    await editBook(other.owner.agent, (book) => ({ ...book, showLinePrices: false }));
    await freeze(other.owner.agent, hidden.jobId);
    const [stored] = await storedRevisions(hidden);
    const { price } = revisionDocumentSchema.parse(JSON.parse(stored!.document));
    expect(price.lines.length).toBeGreaterThan(2);
    expect(price.lines.every(({ priceMinor }) => priceMinor === null)).toBe(true);
  });

  it('becomes stale with the next edit of plan or price', async () => {
    await freeze(agent, job.jobId);
    expect((await proposalFor(agent, job.jobId)).stale).toBe(false);
    await addLight();
    expect((await proposalFor(agent, job.jobId)).stale).toBe(true);
  });
});

describe('preparing', () => {
  it('keeps light pictures of the sheets and makes the PDF, once', async () => {
    const { id, pdfUrl } = await frozenAndReady(agent, job.jobId);
    const [stored] = await storedRevisions(job);
    const storage = test.app.get(ObjectStorage, { strict: false });
    const key = `${company.companyId}/proposals/${id}/sheet-${job.sheetId}.jpg`;
    expect(stored?.pictures).toEqual({ [job.sheetId]: key });
    const picture = await storage.get(key);
    picture?.stream.destroy();
    expect(picture?.type).toBe('image/jpeg');
    expect(picture?.length).toBeLessThan(250_000);
    const pdf = await agent.get(pdfUrl ?? '').expect(200);
    expect(pdf.headers['content-type']).toBe('application/pdf');
    const { number } = await proposalFor(agent, job.jobId);
    expect(pdf.headers['content-disposition']).toContain(`proposal-${number}-1.pdf`);
    expect(createHash('sha256').update(pdf.body).digest('hex')).toBe(stored?.pdf_hash);
    await worker
      .get(PrepareProposal, { strict: false })
      .handle({ companyId: company.companyId, revisionId: id });
    expect(await storedRevisions(job)).toEqual([stored]);
  });

  it('sends when it is done, to whoever was named before', async () => {
    const to = address();
    const { id } = await freeze(agent, job.jobId);
    await send(id, to).expect(200);
    const sent = await untilRevision(agent, job.jobId, id, ({ state }) => state === 'sent');
    expect(sent.sentAt).not.toBeNull();
    expect(await mailTo(to)).toHaveLength(1);
  });
});

describe('sending', () => {
  it('mails a link of which only the hash is kept, moves the job on and queues reminders', async () => {
    const texts = (await company.owner.agent.get('/api/proposal-texts').expect(200)).body;
    const own = { ...texts.texts.company, email: 'office@fernhollow.example' };
    await company.owner.agent
      .put('/api/proposal-texts')
      .send({ baseVersion: texts.version, texts: { ...texts.texts, company: own } })
      .expect(200);
    const to = address();
    const { id } = await frozenAndReady(agent, job.jobId);
    const key = randomUUID();
    const request = () => post(agent, path(`revisions/${id}/send`), sendTo(to, 'Dear Ida,\n\nhere.'), key);
    expect((await request().expect(200)).body.state).toBe('sent');
    await request().expect(200);
    const mails = await mailTo(to);
    expect(mails).toHaveLength(1);
    const [mail] = mails;
    const { number } = await proposalFor(agent, job.jobId);
    expect(mail).toMatchObject({
      reply_to: 'office@fernhollow.example',
      attachments: [{ fileName: `proposal-${number}-1.pdf` }],
    });
    expect(mail?.text).toContain('Dear Ida,');
    expect(mail?.html).toContain(`/p/${tokenIn(mail!)}`);
    const links = await rows<{ id: string; token_hash: string; sealed_token: string }>(
      'SELECT * FROM proposal_links WHERE email = $1',
      to,
    );
    expect(links).toMatchObject([{ token_hash: hashToken(tokenIn(mail!)) }]);
    expect(JSON.stringify(links)).not.toContain(tokenIn(mail!));
    const reminders = await rows(
      `SELECT 1 FROM pgboss.job WHERE name = 'proposal.remind' AND data->>'linkId' = $1
          AND start_after > now() + interval '2 days'`,
      links[0]!.id,
    );
    expect(reminders).toHaveLength(2);
    const told = await kindsOf(job);
    expect(told.filter((kind) => kind === 'proposal-sent')).toHaveLength(1);
    expect(told).toContain('stage-changed');
    expect((await agent.get(`/api/jobs/${job.jobId}`).expect(200)).body.stage).toBe('propose');
  });

  it('gives a later revision to the same address by the same link, and tells what changed', async () => {
    const to = address();
    const first = await frozenAndReady(agent, job.jobId);
    await send(first.id, to).expect(200);
    await addLight();
    const second = await frozenAndReady(agent, job.jobId);
    await send(second.id, to.toUpperCase()).expect(200);
    const [one, two] = [(await mailTo(to))[0], (await mailTo(to.toUpperCase()))[0]];
    expect(tokenIn(two!)).toBe(tokenIn(one!));
    expect((await proposalFor(agent, job.jobId)).links).toHaveLength(1);
    const { differences } = await detail(second.id);
    expect(differences?.added).toMatchObject([{ tag: 'P4' }]);
    expect(differences).toMatchObject({ removed: [], moved: [], wasTotalMinor: first.totalMinor });
    expect(differences?.nowTotalMinor).toBe(second.totalMinor);
    expect(second.totalMinor).toBeGreaterThan(first.totalMinor);
    // The earlier one is not what the homeowner should see any more.
    expect((await send(first.id, to).expect(409)).body.code).toBe('newer-sent');
  });

  it('is refused for a revision that was frozen before another one was approved', async () => {
    const first = await frozenAndReady(agent, job.jobId);
    await send(first.id, address()).expect(200);
    await addLight();
    const second = await frozenAndReady(agent, job.jobId);
    expect(second.changeOrder).toBe(false);
    await approveRevision(test, company.companyId, first);
    const to = address();
    const refusal = (await send(second.id, to).expect(409)).body;
    expect(refusal).toMatchObject({ code: 'approved-since', detail: expect.stringContaining('Revision 1') });
    expect(await mailTo(to)).toHaveLength(0);
    // What is approved can still be sent to somebody else.
    await send(first.id, to).expect(200);
    const third = await frozenAndReady(agent, job.jobId);
    expect(third.changeOrder).toBe(true);
    await send(third.id, to).expect(200);
    expect(await mailTo(to)).toHaveLength(2);
  });

  it('begins a change order with the groups that were approved', async () => {
    await savePricing(agent, job.jobId, {
      ...emptyPricing,
      groups: [group('more', false)],
      members: { [job.lights[2]!]: 'more' },
    });
    const first = await frozenAndReady(agent, job.jobId);
    await send(first.id, address()).expect(200);
    const { combinations } = (await detail(first.id)).document.price;
    const taken = combinations.find(({ groups }) => groups.includes('more'))!;
    expect(taken.totalMinor).toBeGreaterThan(first.totalMinor);
    await approveRevision(test, company.companyId, first, taken);
    const change = await frozenAndReady(agent, job.jobId);
    expect(change).toMatchObject({ changeOrder: true, totalMinor: taken.totalMinor });
    const { document } = await detail(change.id);
    expect(document.price.combinations[0]?.groups).toEqual(['more']);
    expect(document.price.combinations).toHaveLength(combinations.length);
    expect((await proposalFor(agent, job.jobId)).stale).toBe(false);
    await addLight();
    expect((await proposalFor(agent, job.jobId)).stale).toBe(true);
  });

  it('sends nothing that was overtaken by an approval while its PDF was made', async () => {
    const first = await frozenAndReady(agent, job.jobId);
    await send(first.id, address()).expect(200);
    await addLight();
    const second = await frozenAndReady(agent, job.jobId);
    const proposal = await test.app
      .get(ProposalsRepository, { strict: false })
      .ofJob(company.companyId, job.jobId);
    await approveRevision(test, company.companyId, first);
    const to = address();
    const { id: byId } = (await agent.get('/api/auth/me').expect(200)).body.user;
    await worker
      .get(Sending, { strict: false })
      .send(proposal!, second.id, { ...sendTo(to), byId, byName: 'Rowan Marsh' });
    expect(await mailTo(to)).toHaveLength(0);
    const [newest] = (await proposalFor(agent, job.jobId)).revisions;
    expect(newest).toMatchObject({ revision: 2, state: 'ready', sentAt: null });
  });

  it('reminds by the same link while nobody answered, and not after that', async () => {
    const to = address();
    const revision = await frozenAndReady(agent, job.jobId);
    await send(revision.id, to).expect(200);
    const [link] = (await proposalFor(agent, job.jobId)).links;
    const remind = () =>
      worker
        .get(Remind, { strict: false })
        .handle({ companyId: company.companyId, linkId: link!.id, revisionId: revision.id });
    await remind();
    const [sent, reminder] = await mailTo(to);
    expect(reminder?.subject).toContain('reminder');
    expect(tokenIn(reminder!)).toBe(tokenIn(sent!));
    expect((await proposalFor(agent, job.jobId)).links[0]?.remindersSent).toBe(1);
    expect(await kindsOf(job)).toContain('reminder-sent');
    await approveRevision(test, company.companyId, revision);
    await remind();
    expect(await mailTo(to)).toHaveLength(2);
  });

  it('ends a link at once', async () => {
    const to = address();
    const revision = await frozenAndReady(agent, job.jobId);
    await send(revision.id, to).expect(200);
    const gate = test.app.get(LinkGate, { strict: false });
    const token = tokenIn((await mailTo(to))[0]!);
    const [link] = (await proposalFor(agent, job.jobId)).links;
    expect(await gate.byToken(token, '192.0.2.1')).toMatchObject({ linkId: link?.id, jobId: job.jobId });
    await post(agent, path(`links/${link?.id}/resend`)).expect(200);
    expect((await mailTo(to)).map(tokenIn)).toEqual([token, token]);
    await agent.post(path(`links/${link?.id}/revoke`)).expect(200);
    await expect(gate.byToken(token, '192.0.2.1')).rejects.toMatchObject({ status: 410 });
    expect((await post(agent, path(`links/${link?.id}/resend`)).expect(409)).body.code).toBe('link-gone');
    await worker
      .get(Remind, { strict: false })
      .handle({ companyId: company.companyId, linkId: link!.id, revisionId: revision.id });
    expect(await mailTo(to)).toHaveLength(2);
    // Sent anew, the same address gets another link.
    await send(revision.id, to).expect(200);
    expect(tokenIn((await mailTo(to))[2]!)).not.toBe(token);
  });
});

describe('a revision', () => {
  it('is released to the crew only once it was sent', async () => {
    const { id } = await frozenAndReady(agent, job.jobId);
    expect((await agent.post(path(`revisions/${id}/release`)).expect(409)).body.code).toBe('not-sent');
    await send(id, address()).expect(200);
    const { body } = await agent.post(path(`revisions/${id}/release`)).expect(200);
    expect(body.releasedAt).not.toBeNull();
    const again = await agent.post(path(`revisions/${id}/release`)).expect(200);
    expect(again.body.releasedAt).toBe(body.releasedAt);
    expect((await kindsOf(job)).filter((kind) => kind === 'revision-released')).toHaveLength(1);
  });

  it('is withdrawn while nobody approved it; afterwards a change order follows', async () => {
    const first = await frozenAndReady(agent, job.jobId);
    const withdrawn = await agent.post(path(`revisions/${first.id}/withdraw`)).expect(200);
    expect(withdrawn.body.state).toBe('withdrawn');
    expect((await send(first.id, address()).expect(409)).body.code).toBe('withdrawn');
    const second = await frozenAndReady(agent, job.jobId);
    await send(second.id, address()).expect(200);
    await approveRevision(test, company.companyId, second);
    expect((await agent.post(path(`revisions/${second.id}/withdraw`)).expect(409)).body.code).toBe(
      'approved',
    );
    const change = await freeze(agent, job.jobId);
    expect(change.changeOrder).toBe(true);
    expect((await detail(change.id)).document.changes).toEqual({
      revision: 2,
      hash: second.hash,
      totalMinor: second.totalMinor,
    });
    // Until it is sent, what is approved stands.
    expect((await proposalFor(agent, job.jobId)).state).toBe('approved');
  });

  it('is looked at without changing anything', async () => {
    const to = address();
    const { id, pdfUrl } = await frozenAndReady(agent, job.jobId);
    await send(id, to).expect(200);
    const tables = ['proposals', 'proposal_revisions', 'proposal_links', 'job_events', 'proposal_texts'];
    const state = () =>
      Promise.all(
        tables.map((table) =>
          rows(`SELECT md5(coalesce(string_agg(t::text, '|' ORDER BY t::text), '')) FROM ${table} t`),
        ),
      );
    const before = await state();
    for (let round = 0; round < 2; round += 1) {
      await proposalFor(agent, job.jobId);
      await detail(id);
      await agent.get(pdfUrl ?? '').expect(200);
      await agent.get('/api/proposal-texts').expect(200);
    }
    expect(await state()).toEqual(before);
  });
});
