import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { addJob } from '../plans/plans.testkit.js';
import { startProposalTest } from '../proposals/proposals.testkit.js';
import { addQuestion, addShownProposal, type ShownProposal } from '../proposals/shown.testkit.js';
import { type JobEventData, type JobEventKind, JobEvents } from './job-events.repository.js';
import type { Board, Numbers, Timeline } from './timeline.dto.js';

const DAY_MS = 86_400_000;
const TOTAL = 100_000;

describe('what happened, and what is next', () => {
  let test: TestApp;
  let owner: TestPerson;
  let crew: TestPerson;
  let companyId: string;
  beforeAll(async () => {
    test = await startProposalTest();
  });
  afterAll(() => test?.close());
  beforeEach(async () => {
    companyId = await addCompany(test);
    owner = await addPerson(test, companyId, 'owner');
    crew = await addPerson(test, companyId, 'crew');
  });

  const sql = (text: string, ...values: unknown[]) => test.database.executeSql(text, values);
  const note = (
    { jobId }: { readonly jobId: string },
    kind: JobEventKind,
    data: JobEventData[JobEventKind],
  ): Promise<void> => test.app.get(JobEvents, { strict: false }).note({ companyId, jobId }, kind, data, null);
  const timeline = async ({ agent }: TestPerson, jobId: string): Promise<Timeline> =>
    (await agent.get(`/api/jobs/${jobId}/timeline`).expect(200)).body;
  const board = async ({ agent }: TestPerson): Promise<Board> =>
    (await agent.get('/api/board').expect(200)).body;
  const cardOf = async (jobId: string, person = owner) => {
    const { columns } = await board(person);
    const card = columns.flatMap(({ cards }) => cards).find((one) => one.jobId === jobId);
    if (!card) throw new Error(`no card of ${jobId}`);
    return card;
  };
  const approvedOnly = async (): Promise<ShownProposal> => {
    const proposal = await addShownProposal(test, companyId, 'Harrow Bank');
    await sql('DELETE FROM proposal_revisions WHERE id = $1', proposal.sentId);
    return proposal;
  };

  it('tells a job from its beginning, newest first, to crew without sums and reasons', async () => {
    const proposal = await addShownProposal(test, companyId, 'Harrow Bank');
    await note(proposal, 'approved', { revision: 1, amountMinor: TOTAL });
    await note(proposal, 'declined', { revision: 2, reason: 'Too dear for us' });
    const full = await timeline(owner, proposal.jobId);
    expect(full.items[0]?.sentence).toContain('Too dear for us');
    expect(full.items[1]).toMatchObject({ kind: 'approved', amountMinor: TOTAL });
    expect(full.items.at(-1)?.kind).toBe('job-made');
    const seen = await timeline(crew, proposal.jobId);
    expect(seen.items.map(({ kind }) => kind)).toEqual(['declined', 'approved', 'job-made']);
    expect(seen.items.every(({ amountMinor }) => amountMinor === null)).toBe(true);
    expect(JSON.stringify(seen)).not.toContain('Too dear');
  });

  it('tells who moved a job to another stage by hand, and of no move that is none', async () => {
    const jobId = await addJob(owner);
    await owner.agent.patch(`/api/jobs/${jobId}`).send({ stage: 'plan' }).expect(200);
    await owner.agent.patch(`/api/jobs/${jobId}`).send({ stage: 'plan', notes: 'x' }).expect(200);
    const { items } = await timeline(owner, jobId);
    expect(items.map(({ kind }) => kind)).toEqual(['stage-changed', 'job-made']);
    expect(items[0]).toMatchObject({ sentence: 'Moved from Enquiry to Plan' });
    expect(items[0]?.actor).toMatch(/^Someone/);
  });

  it('shows on the board what is owed next, and by whom', async () => {
    const bare = await addJob(owner);
    expect((await cardOf(bare)).next.by).toBe('company');
    const waiting = await addShownProposal(test, companyId, 'Sandpiper Row');
    expect(await cardOf(waiting.jobId)).toMatchObject({
      proposal: 'sent',
      next: { by: 'homeowner', what: 'Answer the proposal' },
    });
    await addQuestion(test, waiting, 'How long does it take?');
    expect(await cardOf(waiting.jobId)).toMatchObject({
      openQuestions: 1,
      next: { by: 'company', what: 'Answer 1 question' },
    });
    const agreed = await approvedOnly();
    expect(await cardOf(agreed.jobId)).toMatchObject({
      proposal: 'approved',
      next: { by: 'homeowner', what: 'Pay: Deposit' },
      totalMinor: TOTAL,
      outstandingMinor: TOTAL,
    });
    expect(await cardOf(agreed.jobId, crew)).toMatchObject({ totalMinor: null, outstandingMinor: null });
    await pay(agreed, 30_000);
    expect(await cardOf(agreed.jobId)).toMatchObject({
      next: { by: 'company', what: 'Release the plan to the crew' },
      outstandingMinor: TOTAL - 30_000,
    });
  });

  it('counts all jobs of a stage, and shows the newest of them', async () => {
    const first = await addJob(owner);
    await sql(
      `INSERT INTO jobs (company_id, property_id, name)
        SELECT company_id, property_id, 'Job ' || n FROM jobs, generate_series(1, 54) n WHERE id = $1`,
      first,
    );
    await sql(`UPDATE jobs SET updated_at = now() - interval '1 day' WHERE id = $1`, first);
    const { columns } = await board(owner);
    const enquiry = columns.find(({ stage }) => stage === 'enquiry');
    expect(columns).toHaveLength(8);
    expect(enquiry?.count).toBe(55);
    expect(enquiry?.cards).toHaveLength(50);
    expect(enquiry?.cards.some(({ jobId }) => jobId === first)).toBe(false);
  });

  it('counts what was sent and won in a time, and what is still to come in', async () => {
    const won = await approvedOnly();
    await sql(
      `UPDATE proposal_revisions SET sent_at = now() - interval '4 days' WHERE id = $1`,
      won.approvedId,
    );
    const before = await approvedOnly();
    await sql(
      `UPDATE proposal_revisions SET sent_at = now() - interval '500 days' WHERE id = $1`,
      before.approvedId,
    );
    await pay(won, 30_000);
    const numbers = async (query = {}): Promise<Numbers> =>
      (await owner.agent.get('/api/numbers').query(query).expect(200)).body;
    expect(await numbers()).toMatchObject({
      sent: 1,
      won: 1,
      declined: 0,
      waiting: 0,
      wonShare: 1,
      sentMinor: TOTAL,
      wonMinor: TOTAL,
      medianDaysToYes: 4,
      outstandingMinor: 2 * TOTAL - 30_000,
      receivedMinor: 30_000,
    });
    const long = new Date(Date.now() - 600 * DAY_MS).toISOString().slice(0, 10);
    expect((await numbers({ from: long })).sent).toBe(2);
    await owner.agent.get('/api/numbers').query({ from: '2026-06-01', to: '2026-05-01' }).expect(400);
  });

  async function pay({ proposalId }: ShownProposal, amountMinor: number): Promise<void> {
    await sql(
      `INSERT INTO payments (company_id, proposal_id, due_id, method, status, amount_minor, currency)
        SELECT company_id, proposal_id, id, 'cash', 'succeeded', $2, currency FROM dues
        WHERE proposal_id = $1 ORDER BY position LIMIT 1`,
      proposalId,
      amountMinor,
    );
  }
});
