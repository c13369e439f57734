import { emptyPricing, type JobPricing, type ManualLine } from '@lampwright/geometry/price';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestApp, type TestApp } from '../../../test/harness.js';
import { addJob } from '../plans/plans.testkit.js';
import { addPricedCompany, editBook, group, type PricedCompany, savePricing } from './pricing.testkit.js';

/** Found nowhere by chance. */
const COST = 617_283;

const line = (edit: Partial<ManualLine> = {}): ManualLine => ({
  id: 'm1',
  groupId: null,
  kind: 'material',
  name: 'Boulder with a cut for the cable',
  quantity: 2,
  unit: 'each',
  costMinor: COST,
  priceMinor: 800_000,
  taxable: true,
  ...edit,
});

describe('the pricing of a job', () => {
  let test: TestApp;
  let company: PricedCompany;
  let jobId: string;
  beforeAll(async () => {
    test = await startTestApp();
    company = await addPricedCompany(test);
  });
  afterAll(() => test?.close());

  const path = () => `/api/jobs/${jobId}/pricing`;
  const put = (person: 'owner' | 'designer' | 'crew', baseVersion: number, pricing: JobPricing) =>
    company[person].agent.put(path()).send({ baseVersion, pricing });
  const get = async (person: 'owner' | 'designer' = 'owner') =>
    (await company[person].agent.get(path()).expect(200)).body as { version: number; pricing: JobPricing };
  const withLines = (...manualLines: ManualLine[]): JobPricing => ({ ...emptyPricing, manualLines });

  it('begins empty at version 0, and reading it writes nothing', async () => {
    jobId = await addJob(company.designer);
    expect(await get()).toEqual({ version: 0, pricing: emptyPricing });
    expect(await get('designer')).toEqual({ version: 0, pricing: emptyPricing });
    const { rows } = await test.database.executeSql('SELECT 1 FROM job_pricings');
    expect(rows).toEqual([]);
  });

  it('is saved on top of the version it was made from, and told where it is at another', async () => {
    jobId = await addJob(company.designer);
    const mine = { ...emptyPricing, groups: [group('a')], aimingVisits: 2 };
    expect((await put('designer', 0, mine).expect(200)).body).toEqual({ version: 1, pricing: mine });
    for (const baseVersion of [0, 2]) {
      const late = await put('owner', baseVersion, emptyPricing).expect(409);
      expect(late.body).toMatchObject({ code: 'pricing-conflict', version: 1, pricing: mine });
    }
    expect((await put('owner', 1, emptyPricing).expect(200)).body.version).toBe(2);
    const both = await Promise.all([put('owner', 2, mine), put('designer', 2, mine)]);
    expect(both.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect((await get()).version).toBe(3);
  });

  it('shows designers no cost of a manual line, and leaves it as it is when they save', async () => {
    jobId = await addJob(company.designer);
    await savePricing(company.owner.agent, jobId, withLines(line(), line({ id: 'm2', costMinor: COST + 1 })));
    const seen = await company.designer.agent.get(path()).expect(200);
    expect(seen.text).not.toContain(`${COST}`);
    expect(seen.text).not.toContain(`${COST + 1}`);
    const [first, second] = (seen.body.pricing as JobPricing).manualLines;
    const edited = withLines(
      { ...second!, quantity: 5 },
      { ...first!, name: 'Boulder' },
      line({ id: 'm3', costMinor: null }),
    );
    const saved = await put('designer', 1, edited).expect(200);
    expect(saved.body.pricing).toEqual(edited);
    expect((await get()).pricing.manualLines).toEqual([
      line({ id: 'm2', costMinor: COST + 1, quantity: 5 }),
      line({ name: 'Boulder' }),
      line({ id: 'm3', costMinor: null }),
    ]);
    const late = await put('designer', 1, edited).expect(409);
    expect(JSON.stringify(late.body)).not.toContain(`${COST}`);
    expect(late.body).toMatchObject({ version: 2, pricing: edited });
  });

  it('takes no cost from those who could not read it again', async () => {
    jobId = await addJob(company.designer);
    const answer = await put('designer', 0, withLines(line({ costMinor: null }), line({ id: 'm2' }))).expect(
      400,
    );
    expect(answer.body.errors).toMatchObject([{ pointer: '/pricing/manualLines/1/costMinor' }]);
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: true }));
    await put('designer', 0, withLines(line())).expect(200);
    expect((await get('designer')).pricing.manualLines).toEqual([line()]);
    await editBook(company.owner.agent, (b) => ({ ...b, designersSeeCosts: false }));
  });

  it('stays as it is while the job is archived', async () => {
    jobId = await addJob(company.designer);
    await company.owner.agent.post(`/api/jobs/${jobId}/archive`).expect(200);
    const refused = await put('owner', 0, emptyPricing).expect(409);
    expect(refused.body.code).toBe('job-archived');
    expect((await get()).version).toBe(0);
    await company.owner.agent.post(`/api/jobs/${jobId}/restore`).expect(200);
    await put('owner', 0, emptyPricing).expect(200);
  });

  it('is nothing to the crew, and to nobody elsewhere', async () => {
    jobId = await addJob(company.designer);
    await company.crew.agent.get(path()).expect(403);
    await put('crew', 0, emptyPricing).expect(403);
    const other = await addPricedCompany(test);
    await other.owner.agent.get(path()).expect(404);
    await other.owner.agent.put(path()).send({ baseVersion: 0, pricing: emptyPricing }).expect(404);
    expect((await get()).version).toBe(0);
  });
});
