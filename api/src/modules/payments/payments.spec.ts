import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Papa from 'papaparse';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { MakeMoneyDocument } from '../../jobs/make-money-document.js';
import { type MailCatcher, startMailCatcher } from '../../ports/mail/catcher.js';
import { caughtMailListSchema } from '../../ports/mail/caught-mail.js';
import { type FakeS3, startFakeS3 } from '../../ports/storage/fake-s3.js';
import { Dues } from './dues.js';
import { MoneyDocumentsRepository } from './money-documents.repository.js';
import type { JobPayments } from './payments.dto.js';
import { addProposal, approve, type TestProposal } from './payments.testkit.js';

describe('payments of a company that takes no cards', () => {
  let dir: string;
  let storage: FakeS3;
  let catcher: MailCatcher;
  let test: TestApp;
  let companyId: string;
  let owner: TestPerson;
  let proposal: TestProposal;

  beforeAll(async () => {
    dir = await mkdtemp(join(tmpdir(), 'lampwright-payments-'));
    const key = { accessKeyId: 'test', secretAccessKey: 'test' };
    storage = await startFakeS3({ port: 0, dir: join(dir, 'objects'), bucket: 'lampwright', ...key });
    catcher = await startMailCatcher({ smtpPort: 0, httpPort: 0, dir: join(dir, 'mail') });
    test = await startTestApp({
      S3_ENDPOINT: storage.endpoint,
      SMTP_URL: catcher.smtpUrl,
      MAIL_VIEWER_URL: catcher.httpUrl,
    });
  });
  afterAll(async () => {
    await test.close();
    await Promise.all([storage.close(), catcher.close()]);
    await rm(dir, { recursive: true, force: true });
  });
  beforeEach(async () => {
    companyId = await addCompany(test);
    owner = await addPerson(test, companyId, 'owner');
    proposal = await addProposal(test, companyId);
  });

  const books = async (): Promise<JobPayments> =>
    (await owner.agent.get(`/api/jobs/${proposal.jobId}/payments`).expect(200)).body;
  const post = (path: string, body: object = {}, person = owner) =>
    person.agent.post(`/api/jobs/${proposal.jobId}/${path}`).set('Idempotency-Key', randomUUID()).send(body);
  const cash = (amountMinor: number, overrides: object = {}) => ({
    method: 'cash',
    amountMinor,
    receivedOn: '2026-05-31',
    note: '',
    ...overrides,
  });
  const pay = async (i: number, amountMinor: number, overrides: object = {}) =>
    post(`dues/${(await books()).dues[i]!.id}/payments`, cash(amountMinor, overrides));
  const inbox = async (address: string) => {
    const { body } = await test.agent().get('/dev/mail/messages.json').expect(200);
    return caughtMailListSchema.parse(body).items.filter(({ to }) => to.includes(address));
  };
  const events = async () => {
    const { rows } = await test.database.executeSql(
      'SELECT kind, actor_name FROM job_events WHERE job_id = $1 ORDER BY created_at, kind',
      [proposal.jobId],
    );
    return rows as { kind: string; actor_name: string }[];
  };

  it('are nothing before anything is agreed', async () => {
    expect(await books()).toMatchObject({ currency: 'USD', agreedMinor: 0, dues: [], documents: [] });
    await owner.agent.get(`/api/jobs/${randomUUID()}/payments`).expect(404);
  });

  it('begin with the dues of the approval, the first asked for at once; stages of nothing are left out', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_001, shares: [33, 0] });
    const { dues, agreedMinor, documents } = await books();
    expect(agreedMinor).toBe(100_001);
    expect(dues.map(({ name, due, amountMinor }) => [name, due, amountMinor])).toEqual([
      ['Deposit', 'approval', 33_000],
      ['When finished', 'finish', 67_001],
    ]);
    expect(dues.map(({ requestedAt }) => requestedAt !== null)).toEqual([true, false]);
    expect(documents).toMatchObject([{ kind: 'invoice', number: 1001, amountMinor: 33_000, pdfUrl: null }]);
  });

  it('are not offered by card, and words of a card service are heard by nobody', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
    const dues = test.app.get(Dues, { strict: false });
    const [first] = await dues.shared(companyId, proposal.proposalId);
    expect(first).toMatchObject({ requested: true, payable: false, outstandingMinor: 30_000 });
    await expect(
      dues.checkout({ ...proposal, email: proposal.email }, first!.id, 'http://127.0.0.1/p/x'),
    ).rejects.toMatchObject({ status: 409, code: 'no-card-payment' });
    await test.agent().post('/api/webhooks/stripe').send({}).expect(404);
  });

  it('are recorded up to what is owed, in parts, and never ahead of time', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
    const tooMuch = await pay(0, 30_001);
    expect(tooMuch.status).toBe(409);
    expect(tooMuch.body).toMatchObject({ code: 'more-than-owed', outstandingMinor: 30_000 });
    expect(tooMuch.body.detail).toContain('$300.00');
    expect((await pay(0, 100, { receivedOn: '2199-01-01' })).status).toBe(400);
    expect((await pay(0, 10_000, { method: 'cheque', note: 'No. 7' })).status).toBe(201);
    expect((await pay(0, 20_001)).status).toBe(409);
    // Of two at once only one fits.
    const both = await Promise.all([pay(0, 15_000), pay(0, 15_000)]);
    expect(both.map(({ status }) => status).sort()).toEqual([201, 409]);
    const { paidMinor, payments } = await books();
    expect(paidMinor).toBe(25_000);
    expect(payments[0]).toMatchObject({ method: 'cheque', note: 'No. 7', status: 'succeeded' });
    expect(payments[0]?.recordedBy).toMatch(/^Someone/);
  });

  it('are asked for once, by an invoice', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
    const [, start] = (await books()).dues;
    await post(`dues/${start!.id}/request`).expect(200);
    expect((await post(`dues/${start!.id}/request`)).body.code).toBe('already-requested');
    const { documents } = await books();
    expect(documents.map(({ number, amountMinor }) => [number, amountMinor])).toEqual([
      [1001, 30_000],
      [1002, 40_000],
    ]);
    const asked = (await events()).filter(({ kind }) => kind === 'payment-requested');
    expect(asked.map(({ actor_name }) => actor_name)).toEqual(['', expect.stringMatching(/^Someone/)]);
    await pay(2, 30_000);
    const finish = (await books()).dues[2]!;
    expect((await post(`dues/${finish.id}/request`)).body.code).toBe('nothing-owed');
  });

  it('go back by hand where they came by hand, by the owner alone', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
    await pay(0, 30_000);
    const [payment] = (await books()).payments;
    const back = { amountMinor: 12_000, reason: 'Fewer lights' };
    const designer = await addPerson(test, companyId, 'designer');
    await post(`payments/${payment!.id}/refunds`, back, designer).expect(403);
    await post(`payments/${payment!.id}/refunds`, back).expect(201);
    expect(
      (await post(`payments/${payment!.id}/refunds`, { ...back, amountMinor: 18_001 })).body,
    ).toMatchObject({ code: 'more-than-paid', leftMinor: 18_000 });
    const { refunds, payments, paidMinor, outstandingMinor, documents } = await books();
    expect(refunds).toMatchObject([{ status: 'succeeded', amountMinor: 12_000 }]);
    expect(payments[0]?.refundedMinor).toBe(12_000);
    expect({ paidMinor, outstandingMinor }).toEqual({ paidMinor: 18_000, outstandingMinor: 82_000 });
    expect(documents.map(({ kind }) => kind)).toEqual(['invoice', 'receipt', 'refund']);
  });

  describe('after a change order', () => {
    const change = (totalMinor: number, before: number, revision = 2) =>
      approve(test, proposal, { revision, totalMinor, before: { totalMinor: before, revision: 1 } });

    it('that costs more have a due more', async () => {
      await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
      await change(120_000, 100_000);
      const { dues, agreedMinor } = await books();
      expect(agreedMinor).toBe(120_000);
      expect(dues.at(-1)).toMatchObject({
        name: 'Change order, revision 2',
        due: 'finish',
        amountMinor: 20_000,
        requestedAt: null,
      });
    });

    it('that costs less are less from behind; an invoice that is out is replaced', async () => {
      await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
      await change(20_000, 100_000);
      const { dues, documents } = await books();
      expect(dues.map(({ reducedMinor, outstandingMinor }) => [reducedMinor, outstandingMinor])).toEqual([
        [10_000, 20_000],
        [40_000, 0],
        [30_000, 0],
      ]);
      expect(documents.map(({ kind, amountMinor }) => [kind, amountMinor])).toEqual([
        ['invoice', 30_000],
        ['invoice', 20_000],
      ]);
    });

    it('that costs less than what is paid leave credit, which can go back', async () => {
      await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
      await pay(0, 30_000);
      await change(25_000, 100_000);
      expect(await books()).toMatchObject({ agreedMinor: 25_000, outstandingMinor: 0, creditMinor: 5_000 });
      const [payment] = (await books()).payments;
      await post(`payments/${payment!.id}/refunds`, { amountMinor: 5_000, reason: 'Credit' }).expect(201);
      expect(await books()).toMatchObject({ paidMinor: 25_000, outstandingMinor: 0, creditMinor: 0 });
    });

    it('are not changed when another sum was agreed before than the dues come to', async () => {
      await approve(test, proposal, { revision: 1, totalMinor: 100_000 });
      await expect(change(90_000, 99_999)).rejects.toThrow('99999');
      expect((await books()).agreedMinor).toBe(100_000);
    });
  });

  it('are put on paper and mailed once: invoices to the homeowner, receipts to both', async () => {
    const office = `office-${companyId}@fernhollow.example`;
    // What other tests have left to be made.
    await test.database.executeSql('DELETE FROM pgboss.job');
    await approve(test, proposal, {
      revision: 1,
      totalMinor: 100_000,
      taxMinor: 7_622,
      companyEmail: office,
    });
    await pay(0, 30_000);
    const worker = await test.startWorker();
    await vi.waitFor(async () => expect(await inbox(proposal.email)).toHaveLength(2), 30_000);
    await vi.waitFor(async () => expect(await inbox(office)).toHaveLength(1), 30_000);
    const letters = await inbox(proposal.email);
    expect(letters.map(({ subject }) => subject).sort()).toEqual([
      'Invoice 1001 from Fernhollow Lights',
      'Receipt 1001 from Fernhollow Lights',
    ]);
    for (const { attachments } of letters) expect(attachments).toHaveLength(1);
    const { documents } = await books();
    const pdf = await owner.agent.get(documents[0]?.pdfUrl ?? '').expect(200);
    expect(pdf.headers['content-type']).toBe('application/pdf');
    expect((pdf.body as Buffer).subarray(0, 5).toString()).toBe('%PDF-');
    const shared = test.app.get(Dues, { strict: false });
    const papers = await shared.papers(companyId, proposal.proposalId, (id) => `/papers/${id}`);
    expect(papers.map(({ name, url }) => [name, url])).toEqual([
      ['Invoice 1001', `/papers/${papers[0]?.id}`],
      ['Receipt 1001', `/papers/${papers[1]?.id}`],
    ]);
    expect(await shared.paper(companyId, proposal.proposalId, papers[0]!.id)).not.toBeNull();
    const other = await addProposal(test, companyId);
    expect(await shared.paper(companyId, other.proposalId, papers[0]!.id)).toBeNull();
    // Asked for again, by a queue that is not sure: nothing more is mailed.
    const handler = worker.get(MakeMoneyDocument, { strict: false });
    for (const { id } of documents) await handler.handle({ companyId, documentId: id });
    const { rows } = await test.database.executeSql('SELECT 1 FROM mail_messages WHERE "to" = ANY($1)', [
      [proposal.email, office],
    ]);
    expect(rows).toHaveLength(3);
  }, 90_000);

  it('go to the books as CSV that no spreadsheet can be tricked by, tax to the cent', async () => {
    await approve(test, proposal, {
      revision: 1,
      totalMinor: 100_000,
      taxMinor: 7_622,
      clientName: '=HYPERLINK("http://x.example"), "quoted"',
    });
    for (const [i, amounts] of [[9_999, 20_001], [40_000], [1, 29_999]].entries())
      for (const amount of amounts) await pay(i, amount, { note: '@SUM(1)' });
    const [payment] = (await books()).payments;
    await post(`payments/${payment!.id}/refunds`, { amountMinor: 9_999, reason: 'Wrong sum' }).expect(201);
    await pay(0, 9_999);
    const answer = await owner.agent.get('/api/payments/export').expect(200);
    expect(answer.headers['content-type']).toContain('text/csv');
    expect(answer.text.split('\r\n')[0]).toBe(
      'date,kind,number,job,client,method,amount,tax,currency,reference',
    );
    const { data, errors } = Papa.parse<Record<string, string>>(answer.text, {
      header: true,
      skipEmptyLines: true,
    });
    expect(errors).toEqual([]);
    expect(data[0]).toMatchObject({
      kind: 'invoice',
      number: '1001',
      client: `'=HYPERLINK("http://x.example"), "quoted"`,
      amount: '300.00',
      method: '',
      currency: 'USD',
    });
    expect(data[1]).toMatchObject({
      kind: 'receipt',
      method: 'cash',
      amount: '99.99',
      reference: `'@SUM(1)`,
    });
    expect(data.find(({ kind }) => kind === 'refund')?.amount).toBe('-99.99');
    const cents = (name: 'amount' | 'tax') =>
      data
        .filter(({ kind }) => kind !== 'invoice')
        .reduce((sum, row) => sum + Math.round(Number(row[name]) * 100), 0);
    expect(cents('amount')).toBe(100_000);
    expect(cents('tax')).toBe(7_622);
    const today = new Date().toISOString().slice(0, 10);
    const lines = async (query: object) =>
      (await owner.agent.get('/api/payments/export').query(query).expect(200)).text.trim().split('\r\n')
        .length;
    expect(await lines({ from: today, to: today })).toBe(data.length + 1);
    expect(await lines({ to: '2020-01-01' })).toBe(1);
    await owner.agent.get('/api/payments/export').query({ from: '2026-02-02', to: '2026-02-01' }).expect(400);
    const designer = await addPerson(test, companyId, 'designer');
    await designer.agent.get('/api/payments/export').expect(403);
  });

  it('write the amounts of a currency without minor units as they are', async () => {
    await approve(test, proposal, { revision: 1, totalMinor: 100_000, currency: 'JPY' });
    const { text } = await owner.agent.get('/api/payments/export').expect(200);
    expect(text).toContain(',30000,0,JPY,');
    const documents = test.app.get(MoneyDocumentsRepository, { strict: false });
    expect((await documents.ofProposal(proposal))[0]?.content.paper.totalMinor).toBe(30_000);
  });
});
