import { createHash, randomUUID } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { TestApp } from '../../../test/harness.js';
import { SignApproval } from '../../jobs/sign-approval.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { addPricedCompany, type PricedCompany } from '../pricing/pricing.testkit.js';
import { post } from '../proposals/proposals.testkit.js';
import type { SharedPage } from './share.dto.js';
import {
  addLink,
  copyProposal,
  freezeReady,
  type Homeowner,
  handlerOf,
  open,
  pageOf,
  type SharedProposal,
  sendCopy,
  sharePath,
  startShareTest,
  yesTo,
} from './share.testkit.js';

let test: TestApp;
let company: PricedCompany;
let base: string;

beforeAll(async () => {
  test = await startShareTest({ TRUST_PROXY_HOPS: '1' });
  company = await addPricedCompany(test);
  base = (await freezeReady(test, company)).revisionId;
}, 120_000);
afterAll(() => test?.close());

async function rows<T>(sql: string, ...values: unknown[]): Promise<T[]> {
  return (await test.database.executeSql(sql, values)).rows as T[];
}

interface Fresh {
  readonly proposal: SharedProposal;
  readonly home: Homeowner;
  readonly email: string;
}

async function fresh(edit: Parameters<typeof copyProposal>[3] = {}): Promise<Fresh> {
  const proposal = await copyProposal(test, company.designer, base, edit);
  const email = `${randomUUID()}@example.com`;
  const { token } = await addLink(test, proposal, { email });
  return { proposal, home: await open(test, token), email };
}

const approve = ({ agent, linkId }: Homeowner, yes: object, key?: string) =>
  post(agent, sharePath(linkId, '/approve'), yes, key);
const decline = ({ agent, linkId }: Homeowner, revisionId: string, reason = 'Too much.') =>
  post(agent, sharePath(linkId, '/decline'), { revisionId, reason });

const approvalsOf = ({ proposalId }: SharedProposal) =>
  rows<Record<string, unknown> & { id: string }>(
    'SELECT * FROM approvals WHERE proposal_id = $1 ORDER BY approved_at',
    proposalId,
  );
const eventsOf = ({ jobId }: SharedProposal) =>
  rows<{ kind: string; data: object; actor_name: string }>(
    'SELECT kind, data, actor_name FROM job_events WHERE job_id = $1 ORDER BY created_at, id',
    jobId,
  );
const duesOf = ({ proposalId }: SharedProposal) =>
  rows<{ amount_minor: string; reduced_minor: string; requested_at: Date | null }>(
    'SELECT amount_minor, reduced_minor, requested_at FROM dues WHERE proposal_id = $1 ORDER BY created_at, position',
    proposalId,
  );
const stageOf = async ({ jobId }: SharedProposal) =>
  (await rows<{ stage: string }>('SELECT stage FROM jobs WHERE id = $1', jobId))[0]?.stage;
const lettersTo = (email: string) =>
  rows<{ subject: string; attachments: { key: string }[] }>(
    'SELECT subject, attachments FROM mail_messages WHERE "to" = $1',
    email,
  );
const signingsOf = (approvalId: string) =>
  rows("SELECT 1 FROM pgboss.job WHERE name = 'approval.sign' AND data->>'approvalId' = $1", approvalId);

describe('a yes', () => {
  it('is kept with its evidence, opens what is owed, moves the job on and has the paper signed', async () => {
    const { proposal, home } = await fresh();
    const page = await pageOf(home);
    const before = Date.now();
    const answer = await post(home.agent, sharePath(home.linkId, '/approve'), yesTo(page, ['more']))
      .set('X-Forwarded-For', '203.0.113.24')
      .set('User-Agent', 'A phone of a test')
      .expect(200);
    const [row, ...others] = await approvalsOf(proposal);
    expect(others).toEqual([]);
    const [revision] = await rows<{ hash: string; pdf_hash: string }>(
      'SELECT hash, pdf_hash FROM proposal_revisions WHERE id = $1',
      proposal.revisionId,
    );
    const taken = page.document.price.combinations.find(({ groups }) => groups.length === 1)!;
    expect(row).toMatchObject({
      revision_id: proposal.revisionId,
      link_id: home.linkId,
      groups: ['more'],
      total_minor: String(taken.totalMinor),
      typed_name: 'Ida Fairweather',
      agreed_to: page.sentences.approval,
      consented_to: page.sentences.consent,
      address: '203.0.113.24',
      user_agent: 'A phone of a test',
      revision_hash: revision?.hash,
      pdf_hash: revision?.pdf_hash,
    });
    expect((row!.approved_at as Date).getTime()).toBeGreaterThanOrEqual(before);
    const dues = await duesOf(proposal);
    expect(dues.reduce((sum, { amount_minor }) => sum + Number(amount_minor), 0)).toBe(taken.totalMinor);
    expect(dues[0]?.requested_at).not.toBeNull();
    expect(await stageOf(proposal)).toBe('prepare');
    const kinds = (await eventsOf(proposal)).map(({ kind }) => kind);
    expect(kinds.sort()).toEqual(['approved', 'payment-requested', 'stage-changed']);
    expect(await signingsOf(row!.id)).toHaveLength(1);
    const approved = answer.body as SharedPage;
    expect(approved).toMatchObject({
      state: 'approved',
      approval: { typedName: 'Ida Fairweather', groups: ['more'], totalMinor: taken.totalMinor, revision: 1 },
    });
    expect(approved.dues).toHaveLength(dues.length);
    expect(approved.papers.find(({ id }) => id === 'signed')?.url).toBeNull();
  });

  it('gives both sides one signed copy, however often its paper is asked for', async () => {
    const { proposal, home, email } = await fresh();
    await approve(home, yesTo(await pageOf(home))).expect(200);
    const [row] = await approvalsOf(proposal);
    const sign = await handlerOf(test, SignApproval);
    const ask = { companyId: company.companyId, approvalId: row!.id };
    await Promise.all([sign.handle(ask), sign.handle(ask)]);
    await sign.handle(ask);
    const [signed] = await approvalsOf(proposal);
    const key = signed?.signed_pdf_key as string;
    const stored = await test.app.get(ObjectStorage, { strict: false }).get(key);
    const pdf = await buffer(stored!.stream);
    expect(createHash('sha256').update(pdf).digest('hex')).toBe(signed?.signed_pdf_hash);
    const copies = (await lettersTo(email)).filter(({ subject }) => subject.startsWith('Your copy'));
    expect(copies.map(({ attachments }) => attachments.map((one) => one.key))).toEqual([[key]]);
    const [designer] = await rows<{ email: string }>(
      'SELECT email FROM users WHERE id = $1',
      company.designer.actor.userId,
    );
    const told = (await lettersTo(designer!.email)).filter(({ attachments }) =>
      attachments.some((one) => one.key === key),
    );
    expect(told).toHaveLength(1);
    const { papers } = await pageOf(home);
    const url = papers.find(({ id }) => id === 'signed')?.url ?? '';
    const answer = await home.agent.get(url).buffer(true).expect(200);
    expect(answer.headers['content-length']).toBe(String(pdf.length));
  });

  it('of two tabs at once is given once, and once for one key', async () => {
    const { proposal, home } = await fresh();
    const yes = yesTo(await pageOf(home));
    const second = await open(test, home.token);
    const answers = await Promise.all([approve(home, yes), approve(second, yes), approve(home, yes)]);
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses).toEqual([200, 409, 409]);
    expect(answers.filter(({ status }) => status === 409).map(({ body }) => body.code)).toEqual([
      'already-approved',
      'already-approved',
    ]);
    expect(await approvalsOf(proposal)).toHaveLength(1);

    const again = await fresh();
    const yesAgain = yesTo(await pageOf(again.home));
    const first = await approve(again.home, yesAgain, 'the same key').expect(200);
    const replay = await approve(again.home, yesAgain, 'the same key').expect(200);
    expect(replay.body).toEqual(first.body);
    expect(await approvalsOf(again.proposal)).toHaveLength(1);
  });

  it('to a change order changes what is owed by the difference, and moves no stage back', async () => {
    const { proposal, home } = await fresh();
    const first = await pageOf(home);
    const [offered, more] = first.document.price.combinations;
    await approve(home, yesTo(first)).expect(200);
    await test.database.executeSql("UPDATE jobs SET stage = 'install' WHERE id = $1", [proposal.jobId]);
    await sendCopy(test, company.companyId, proposal.revisionId, { changesRevisionId: proposal.revisionId });
    const changed = await pageOf(home);
    expect(changed).toMatchObject({ state: 'open', approval: { revision: 1 } });
    expect(changed.differences).toMatchObject({ wasTotalMinor: offered!.totalMinor, added: [] });
    const answer = await approve(home, yesTo(changed, ['more'])).expect(200);
    expect(answer.body).toMatchObject({ state: 'approved', approval: { revision: 2 }, differences: null });
    const dues = await duesOf(proposal);
    const owed = dues.reduce((sum, due) => sum + Number(due.amount_minor) - Number(due.reduced_minor), 0);
    expect(owed).toBe(more!.totalMinor);
    expect(await stageOf(proposal)).toBe('install');
    expect((answer.body as SharedPage).papers.map(({ id }) => id)).toEqual(
      expect.arrayContaining(['proposal', 'signed', 'signed-1']),
    );
  });

  it('is refused for whatever is not on offer as it was on the screen', async () => {
    const yesterday = new Date(Date.now() - 2 * 86_400_000);
    const document = (
      await rows<{ document: string }>('SELECT document FROM proposal_revisions WHERE id = $1', base)
    )[0]!.document;
    const notOffered = JSON.parse(document);
    for (const one of notOffered.price.combinations)
      if (one.groups.length > 0) Object.assign(one, { offerable: false, reason: 'The wiring would not do.' });
    const unused = async () => undefined;
    const cases: [string, Parameters<typeof fresh>[0], object, (made: Fresh) => Promise<unknown>][] = [
      ['changed-since', {}, {}, ({ proposal }) => sendCopy(test, company.companyId, proposal.revisionId)],
      [
        'withdrawn',
        {},
        {},
        ({ proposal }) =>
          test.database.executeSql('UPDATE proposal_revisions SET withdrawn_at = now() WHERE id = $1', [
            proposal.revisionId,
          ]),
      ],
      ['expired', { validUntil: yesterday }, {}, unused],
      ['declined', {}, {}, ({ home, proposal }) => decline(home, proposal.revisionId).expect(200)],
      ['other-content', {}, { hash: 'another' }, unused],
      ['not-ready', { pdfHash: null }, {}, unused],
      ['unknown-groups', {}, { groups: ['nothing'] }, unused],
      ['unknown-groups', {}, { groups: ['more', 'more'] }, unused],
      ['other-total', {}, { totalMinor: 1 }, unused],
      ['other-total', {}, { groups: ['more'] }, unused],
      ['not-offered', { document: JSON.stringify(notOffered) }, { groups: ['more'] }, unused],
    ];
    for (const [code, edit, input, meanwhile] of cases) {
      const made = await fresh(edit);
      const yes = { ...yesTo(await pageOf(made.home)), ...input };
      await meanwhile(made);
      const answer = await approve(made.home, yes);
      expect([answer.status, answer.body.code, code]).toEqual([409, code, code]);
      expect(answer.body.detail).toMatch(/^[A-Z].*\.$/);
      expect(await approvalsOf(made.proposal)).toEqual([]);
      expect(await duesOf(made.proposal)).toEqual([]);
    }
  });

  it('needs a name, both ticks and a key, and a revision that was sent to whoever gives it', async () => {
    const { proposal, home } = await fresh();
    const yes = yesTo(await pageOf(home));
    for (const fault of [{ typedName: ' x ' }, { agreed: false }, { consented: false }])
      await approve(home, { ...yes, ...fault }).expect(400);
    await home.agent.post(sharePath(home.linkId, '/approve')).send(yes).expect(400);
    const unsent = await sendCopy(test, company.companyId, proposal.revisionId, { sentAt: null });
    const others = (await fresh()).proposal.revisionId;
    for (const revisionId of [unsent, others, randomUUID()])
      await approve(home, { ...yes, revisionId }).expect(404);
    expect(await approvalsOf(proposal)).toEqual([]);
  });
});

describe('a no', () => {
  it('is kept with its reason and told to the company; a new revision may be approved', async () => {
    const { proposal, home } = await fresh();
    const answer = await decline(home, proposal.revisionId, 'Not this year.').expect(200);
    expect(answer.body).toMatchObject({ state: 'declined', decline: { reason: 'Not this year.' } });
    expect(await eventsOf(proposal)).toEqual([
      { kind: 'declined', data: { revision: 1, reason: 'Not this year.' }, actor_name: 'Ida Fairweather' },
    ]);
    expect((await decline(home, proposal.revisionId)).body.code).toBe('declined');
    await sendCopy(test, company.companyId, proposal.revisionId);
    const page = await pageOf(home);
    expect(page).toMatchObject({ state: 'open', decline: null });
    await approve(home, yesTo(page)).expect(200);
    expect((await decline(home, page.revisionId)).body.code).toBe('already-approved');
  });
});
