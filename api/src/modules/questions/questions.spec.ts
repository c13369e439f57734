import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import type { Question } from '../proposals/proposals.dto.js';
import { post, startProposalTest } from '../proposals/proposals.testkit.js';
import { addQuestion, addShownProposal, type ShownProposal } from '../proposals/shown.testkit.js';

describe('questions of a homeowner', () => {
  let test: TestApp;
  let designer: TestPerson;
  let proposal: ShownProposal;
  let questionId: string;
  beforeAll(async () => {
    test = await startProposalTest();
    designer = await addPerson(test, await addCompany(test), 'designer');
  });
  afterAll(() => test?.close());
  beforeEach(async () => {
    proposal = await addShownProposal(test, designer.actor.companyId, 'Harrow Bank');
    questionId = await addQuestion(test, proposal, 'Will the oak be lit from below?');
  });

  const base = () => `/api/jobs/${proposal.jobId}/questions`;
  const list = async (): Promise<Question[]> => (await designer.agent.get(base()).expect(200)).body.items;
  const answer = (text: string, key: string = randomUUID()) =>
    post(designer.agent, `${base()}/${questionId}/messages`, { text }, key);
  const rows = async (sql: string, ...values: unknown[]) =>
    (await test.database.executeSql(sql, values)).rows as Record<string, string>[];
  const mails = () => rows('SELECT * FROM mail_messages WHERE "to" = $1', proposal.email);

  it('are answered once for a key, on the page and by mail with the homeowner’s own link', async () => {
    const key = randomUUID();
    const first = await answer('Yes, by two lights.', key).expect(201);
    const again = await answer('Yes, by two lights.', key).expect(201);
    expect(again.body).toEqual(first.body);
    const [question] = await list();
    expect(question).toMatchObject({ id: questionId, revision: 2, resolvedAt: null });
    expect(question?.messages.map(({ side, text }) => [side, text])).toEqual([
      ['homeowner', 'Will the oak be lit from below?'],
      ['company', 'Yes, by two lights.'],
    ]);
    const sent = await mails();
    expect(sent).toHaveLength(1);
    expect(sent[0]?.text).toContain('Yes, by two lights.');
    expect(sent[0]?.text).toContain('Will the oak be lit from below?');
    expect(sent[0]?.text).toContain(`/p/${proposal.token}`);
    const events = await rows(
      `SELECT kind FROM job_events WHERE job_id = $1 AND kind = 'question-answered'`,
      proposal.jobId,
    );
    expect(events).toHaveLength(1);
  });

  it('are mailed to nobody whose link was revoked', async () => {
    await test.database.executeSql('UPDATE proposal_links SET revoked_at = now() WHERE id = $1', [
      proposal.linkId,
    ]);
    await answer('Yes.').expect(201);
    expect(await mails()).toEqual([]);
  });

  it('are settled and taken up again', async () => {
    const settled = await designer.agent.post(`${base()}/${questionId}/resolve`).expect(200);
    expect(settled.body.resolvedAt).not.toBeNull();
    expect((await list())[0]?.resolvedAt).toBe(settled.body.resolvedAt);
    await designer.agent.post(`${base()}/${questionId}/reopen`).expect(200);
    expect((await list())[0]?.resolvedAt).toBeNull();
  });

  it('are not found by way of another job', async () => {
    const other = await addShownProposal(test, designer.actor.companyId, 'Sandpiper Row');
    await post(designer.agent, `/api/jobs/${other.jobId}/questions/${questionId}/messages`, {
      text: 'Yes.',
    }).expect(404);
    expect((await list())[0]?.messages).toHaveLength(1);
  });
});
