import { PLAN_SCHEMA_VERSION, SETTINGS_ID } from '@lampwright/geometry/plan';
import { emptyPricing, type Quote } from '@lampwright/geometry/price';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Agent, startTestApp, type TestApp } from '../../../test/harness.js';
import { addJob, getPlan, save } from '../plans/plans.testkit.js';
import type { QuoteAnswer } from './pricing.dto.js';
import {
  addPricedCompany,
  addTwoRuns,
  draw,
  editBook,
  group,
  itemPrice,
  type PricedCompany,
  priceAll,
  quoteFor,
  savePricing,
  type TwoRuns,
  twoGroups,
} from './pricing.testkit.js';

let test: TestApp;
beforeAll(async () => {
  test = await startTestApp();
});
afterAll(() => test?.close());

const checkOf = ({ checks }: QuoteAnswer, ...groups: string[]) => {
  const found = checks.find((check) => JSON.stringify(check.groups) === JSON.stringify(groups));
  if (!found) throw new Error(`no check of ${groups.join(', ')}`);
  return found;
};

const accept = (
  agent: Agent,
  jobId: string,
  fault: { key: string; message: string },
  reason = 'Known to us.',
) =>
  agent
    .post(`/api/jobs/${jobId}/fault-acceptances`)
    .send({ faultKey: fault.key, message: fault.message, reason });

async function acceptAll(agent: Agent, jobId: string): Promise<void> {
  const { faults } = await quoteFor(agent, jobId);
  for (const fault of faults) if (!fault.acceptance) await accept(agent, jobId, fault).expect(201);
}

/** Sets the line volts of the plan: all volts change with them. */
async function setLineVolts(agent: Agent, jobId: string, lineVolts: number): Promise<void> {
  const { version, plan } = await getPlan(agent, jobId);
  const put = { [SETTINGS_ID]: { ...plan.get(SETTINGS_ID), lineVolts } };
  await save(agent, jobId, {
    baseVersion: version,
    changes: [{ id: crypto.randomUUID(), schema: PLAN_SCHEMA_VERSION, put, remove: [] }],
  });
}

describe('a quote', () => {
  let company: PricedCompany;
  let job: TwoRuns;
  beforeAll(async () => {
    company = await addPricedCompany(test);
    job = await addTwoRuns(test, company);
  });

  it('is made of the plan, the newest prices and what people decided, also of items archived since', async () => {
    const { agent } = company.owner;
    const light = company.items.get('Copper path light, G4 lamp') ?? '';
    const price = (priceMinor: number) =>
      agent.put(`/api/catalogue/${light}/price`).send({ price: itemPrice({ priceMinor }) });
    await price(5000).expect(200);
    await price(7000).expect(200);
    await agent.post(`/api/catalogue/${light}/archive`).expect(200);
    const version = await savePricing(agent, job.jobId, twoGroups(job, { far: true, more: false }));
    const answer = await quoteFor(agent, job.jobId);
    expect(answer.pricingVersion).toBe(version);
    expect(answer.planVersion).toBe((await getPlan(agent, job.jobId)).version);
    const lights = answer.quote.lines.filter(({ itemId }) => itemId === light);
    expect(lights.map(({ groupId, quantity, priceMinor }) => [groupId, quantity, priceMinor])).toEqual([
      [null, 2, 14_000],
      ['far', 3, 21_000],
      ['more', 5, 35_000],
    ]);
    expect(answer.quote.combinations.map(({ groups }) => groups)).toEqual(
      answer.checks.map(({ groups }) => groups),
    );
    expect(answer.checks.map(({ groups }) => groups)).toEqual([['far'], [], ['more'], ['far', 'more']]);
    await agent.post(`/api/catalogue/${light}/restore`).expect(200);
  });

  it('takes no archived part from the catalogue that nobody chose', async () => {
    const own = await addPricedCompany(test);
    const { jobId } = await addTwoRuns(test, own);
    const { agent } = own.owner;
    const stakes = ['Ground stake, 10 in', 'Ground stake, 18 in, for soft ground'].map(
      (n) => own.items.get(n) ?? '',
    );
    const mounts = async () =>
      (await quoteFor(agent, jobId)).quote.lines
        .filter(({ section }) => section === 'mounting')
        .map(({ itemId }) => itemId);
    expect(await mounts()).toContain(stakes[0]);
    await agent.post(`/api/catalogue/${stakes[0]}/archive`).expect(200);
    expect(await mounts()).toContain(stakes[1]);
    await editBook(agent, (b) => ({ ...b, parts: { ...b.parts, 'ground-stake': stakes[0] ?? null } }));
    expect(await mounts()).toContain(stakes[0]);
  });

  it('says what stands in its way, and where that is mended', async () => {
    const { agent } = company.owner;
    const bare = await addJob(company.designer);
    const mends = async (jobId: string) => (await quoteFor(agent, jobId)).obstacles.map(({ mend }) => mend);
    expect((await quoteFor(agent, bare)).obstacles).toEqual([
      { message: 'The plan has no fixtures yet.', mend: 'plan' },
    ]);
    expect(await mends(job.jobId)).toEqual(['faults', 'lines']);
    await priceAll(company, job.jobId);
    expect(await mends(job.jobId)).toEqual(['faults']);
    await acceptAll(agent, job.jobId);
    expect(await mends(job.jobId)).toEqual([]);
    // Without the far lights, the near one gets too much; the whole plan does not tell.
    await savePricing(agent, job.jobId, twoGroups(job, { far: false, more: false }));
    const { obstacles } = await quoteFor(agent, job.jobId);
    expect(obstacles).toEqual([
      {
        message: expect.stringMatching(/^The base alone can’t be offered\. P1 gets 12\.\d+ V/),
        mend: 'groups',
      },
    ]);
  });

  it('tells that lengths are not known while the sheet has no scale', async () => {
    const jobId = await addJob(company.designer);
    await draw(test, company, jobId, (plan) => {
      plan.calibrate([]);
      const box = plan.transformer('Multi-tap transformer, 300 VA', [100, 100], 'Shed wall');
      const light = plan.fixture('Brass path light, 3 W', [300, 100]);
      plan.cable('12 AWG landscape cable, 2-core', [box, light]);
    });
    const { obstacles } = await quoteFor(company.owner.agent, jobId);
    expect(obstacles[0]).toEqual({
      message: expect.stringContaining('length of one cable is not known'),
      mend: 'plan',
    });
  });

  it('is nothing that another company can read', async () => {
    const other = await addPricedCompany(test);
    for (const what of ['quote', 'materials'])
      await other.owner.agent.get(`/api/jobs/${job.jobId}/${what}`).expect(404);
    const fault = { key: 'dim:x', message: 'x' };
    await accept(other.owner.agent, job.jobId, fault).expect(404);
  });
});

describe('the combinations of groups', () => {
  let company: PricedCompany;
  let job: TwoRuns;
  beforeAll(async () => {
    company = await addPricedCompany(test);
    job = await addTwoRuns(test, company);
    await savePricing(company.owner.agent, job.jobId, twoGroups(job, { far: true, more: false }));
  });

  it('are each solved: a group that is missing makes a fault, and so does one that is there', async () => {
    const answer = await quoteFor(company.designer.agent, job.jobId);
    expect(checkOf(answer, 'far')).toEqual({ groups: ['far'], offerable: true, faults: [] });
    expect(checkOf(answer)).toMatchObject({
      offerable: false,
      faults: [expect.stringMatching(/^P1 gets 12\.\d+ V; more than 12\.6 V/)],
    });
    expect(checkOf(answer, 'far', 'more')).toMatchObject({ offerable: false });
    expect(checkOf(answer, 'far', 'more').faults).toEqual(answer.faults.map(({ message }) => message));
  });

  it('may be offered with faults that somebody answers for, whatever volts the smaller set has', async () => {
    await acceptAll(company.designer.agent, job.jobId);
    const answer = await quoteFor(company.owner.agent, job.jobId);
    expect(checkOf(answer, 'far', 'more')).toMatchObject({ offerable: true, faults: [] });
    // The volts of this set are others; the lights that are dim are the same.
    expect(checkOf(answer, 'more')).toMatchObject({ offerable: true, faults: [] });
    // Nobody could answer for a fault that the whole plan does not have.
    expect(checkOf(answer).offerable).toBe(false);
  });

  it('need a light', async () => {
    const members = Object.fromEntries(
      [job.near, ...job.far, job.alone, ...job.more].map((id) => [id, 'all']),
    );
    await savePricing(company.owner.agent, job.jobId, { ...emptyPricing, groups: [group('all')], members });
    const answer = await quoteFor(company.owner.agent, job.jobId);
    expect(checkOf(answer)).toEqual({ groups: [], offerable: false, faults: ['There is no light in it.'] });
    expect(checkOf(answer, 'all').offerable).toBe(true);
  });

  it('are checked anew when the plan or the groups change', async () => {
    const { agent } = company.owner;
    await savePricing(agent, job.jobId, twoGroups(job, { far: true, more: true }));
    expect(checkOf(await quoteFor(agent, job.jobId), 'far').offerable).toBe(true);
    await setLineVolts(agent, job.jobId, 150);
    expect(checkOf(await quoteFor(agent, job.jobId), 'far').offerable).toBe(false);
    await setLineVolts(agent, job.jobId, 120);
    expect(checkOf(await quoteFor(agent, job.jobId), 'far').offerable).toBe(true);
  });
});

describe('a fault that somebody answers for', () => {
  let company: PricedCompany;
  let job: TwoRuns;
  beforeAll(async () => {
    company = await addPricedCompany(test);
    job = await addTwoRuns(test, company);
  });
  const firstFault = async () => (await quoteFor(company.owner.agent, job.jobId)).faults[0]!;

  it('is told with who, when and why, once on the timeline', async () => {
    const fault = await firstFault();
    const { body } = await accept(
      company.designer.agent,
      job.jobId,
      fault,
      'Lamps are changed in May.',
    ).expect(201);
    expect(body).toMatchObject({
      reason: 'Lamps are changed in May.',
      by: expect.stringMatching(/^Someone/),
    });
    expect((await firstFault()).acceptance).toEqual(body);
    const again = await accept(company.designer.agent, job.jobId, fault, 'Lamps are changed in May.').expect(
      201,
    );
    expect(again.body).toEqual(body);
    const { rows } = await test.database.executeSql(
      `SELECT kind, actor_id, data FROM job_events WHERE job_id = $1 AND kind = 'fault-accepted'`,
      [job.jobId],
    );
    expect(rows).toEqual([
      {
        kind: 'fault-accepted',
        actor_id: company.designer.actor.userId,
        data: { message: fault.message, reason: 'Lamps are changed in May.' },
      },
    ]);
  });

  it('has to be accepted anew when its words change, and counts again when they are back', async () => {
    const fault = await firstFault();
    expect(fault.acceptance).not.toBeNull();
    await setLineVolts(company.owner.agent, job.jobId, 117);
    const now = await firstFault();
    expect(now.key).toBe(fault.key);
    expect(now.message).not.toBe(fault.message);
    expect(now.acceptance).toBeNull();
    const stale = await accept(company.owner.agent, job.jobId, fault).expect(409);
    expect(stale.body).toMatchObject({ code: 'fault-changed', detail: expect.stringContaining(now.message) });
    await setLineVolts(company.owner.agent, job.jobId, 120);
    expect((await firstFault()).acceptance).toEqual(fault.acceptance);
  });

  it('can be left to nobody again', async () => {
    const { acceptance } = await firstFault();
    const path = `/api/jobs/${job.jobId}/fault-acceptances/${acceptance?.id}`;
    const other = await addPricedCompany(test);
    await other.owner.agent.delete(path).expect(404);
    await company.crew.agent.delete(path).expect(403);
    await company.owner.agent.delete(path).expect(204);
    expect((await firstFault()).acceptance).toBeNull();
    await company.owner.agent.delete(path).expect(404);
  });

  it('must be one of the plan, of a job that is at work', async () => {
    const { agent } = company.owner;
    const gone = await accept(agent, job.jobId, { key: 'dim:nobody', message: 'x' }).expect(409);
    expect(gone.body.code).toBe('fault-changed');
    const fault = await firstFault();
    await accept(agent, job.jobId, fault, ' ').expect(400);
    await accept(company.crew.agent, job.jobId, fault).expect(403);
    await agent.post(`/api/jobs/${job.jobId}/archive`).expect(200);
    expect((await accept(agent, job.jobId, fault).expect(409)).body.code).toBe('job-archived');
    await agent.post(`/api/jobs/${job.jobId}/restore`).expect(200);
  });
});

describe('who sees what of a price', () => {
  let company: PricedCompany;
  let jobId: string;
  let whole: Quote;
  /** Every sum of costs and margin that the owner is told. */
  let secrets: number[];

  beforeAll(async () => {
    company = await addPricedCompany(test);
    const job = await addTwoRuns(test, company);
    jobId = job.jobId;
    const { agent } = company.owner;
    await editBook(agent, (b) => ({
      ...b,
      overheadPercent: 13,
      materials: { by: 'markup', percent: 37 },
      labour: { by: 'margin', percent: 41 },
      rates: { ...b.rates, perTransformer: 7_654_321, perTrenched: 4_321 },
    }));
    await priceAll(company, jobId, { costMinor: 1_357_911, supplier: 'Marlow Wholesale' });
    const pricing = twoGroups(job, { far: true, more: false });
    const line = {
      id: 'm',
      groupId: null,
      kind: 'material',
      name: 'Boulder',
      quantity: 3,
      unit: 'each',
    } as const;
    const manualLines = [{ ...line, costMinor: 2_468_013, priceMinor: null, taxable: true }];
    await savePricing(agent, jobId, { ...pricing, manualLines });
    const answer = await quoteFor(agent, jobId);
    expect(answer.seesCosts).toBe(true);
    whole = answer.quote;
    const { margin } = whole;
    if (!margin) throw new Error('the owner is told no margin');
    secrets = [
      1_357_911,
      2_468_013,
      7_654_321,
      4_321,
      margin.costMinor,
      margin.overheadMinor,
      margin.profitMinor,
    ];
    secrets.push(margin.profitPercent ?? 0, ...whole.lines.map(({ costMinor }) => costMinor ?? 0));
    expect(secrets.every((sum) => sum > 0)).toBe(true);
  });

  const uuids = /[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}/g;
  const tokens = (text: string) =>
    new Set(
      text
        .replace(uuids, '')
        .match(/\d+(\.\d+)?/g)
        ?.map(Number),
    );

  it('the designer: prices, but no cost, no margin and no cost of a manual line', async () => {
    const { text, body } = await company.designer.agent.get(`/api/jobs/${jobId}/quote`).expect(200);
    expect(body.seesCosts).toBe(false);
    const told = tokens(text);
    expect(secrets.filter((sum) => told.has(sum))).toEqual([]);
    expect(text).not.toContain('Marlow Wholesale');
    expect(body.quote.margin).toBeNull();
    expect(body.quote.combinations).toEqual(whole.combinations);
    expect(body.quote.lines).toEqual(whole.lines.map((line) => ({ ...line, costMinor: null })));
  });

  it('the designer, where the owner lets them: all of it', async () => {
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: true }));
    const answer = await quoteFor(company.designer.agent, jobId);
    expect(answer.seesCosts).toBe(true);
    expect(answer.quote).toEqual(whole);
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: false }));
  });

  it('the crew: what to bring, and no money at all', async () => {
    await company.crew.agent.get(`/api/jobs/${jobId}/quote`).expect(403);
    const { text, body } = await company.crew.agent.get(`/api/jobs/${jobId}/materials`).expect(200);
    expect(text).not.toMatch(/minor|cost|price|margin|tax/i);
    const told = tokens(text);
    const prices = whole.lines.map(({ priceMinor }) => priceMinor ?? 0).filter((sum) => sum > 0);
    expect([...secrets, ...prices].filter((sum) => told.has(sum))).toEqual([]);
    const material = whole.lines.filter(({ kind }) => kind === 'material');
    expect(body.lines.map(({ key, quantity }: { key: string; quantity: number }) => [key, quantity])).toEqual(
      material.map(({ key, quantity }) => [key, quantity]),
    );
    expect(text).not.toContain('Mounting and connecting');
  });
});
