import { recordsOf } from '@lampwright/geometry/plan';
import { emptyPricing, type ItemPrice, type JobPricing, type PriceBook } from '@lampwright/geometry/price';
import { sheet } from '../../../../geometry/src/plan/plan.testkit.js';
import type { Agent, TestApp } from '../../../test/harness.js';
import { addCompany, addPerson, type TestPerson } from '../../../test/people.js';
import { PlanBuilder } from '../../demo/plan-builder.js';
import { CatalogueService } from '../catalogue/catalogue.service.js';
import { PlacedSheets } from '../plans/placed-sheets.js';
import { PlanWriter } from '../plans/plan-writer.js';
import { addJob } from '../plans/plans.testkit.js';
import type { PriceBookAnswer, QuoteAnswer } from './pricing.dto.js';

export interface PricedCompany {
  readonly companyId: string;
  readonly owner: TestPerson;
  readonly designer: TestPerson;
  readonly crew: TestPerson;
  /** Ids of catalogue items by name. */
  readonly items: ReadonlyMap<string, string>;
}

/** A company with the starter catalogue and a person of each role. */
export async function addPricedCompany(test: TestApp): Promise<PricedCompany> {
  const companyId = await addCompany(test);
  const catalogue = test.app.get(CatalogueService, { strict: false });
  await catalogue.seed(companyId);
  const items = new Map(
    [...(await catalogue.byName(companyId))].map(([name, { sourceId }]) => [name, sourceId]),
  );
  return {
    companyId,
    owner: await addPerson(test, companyId, 'owner'),
    designer: await addPerson(test, companyId, 'designer'),
    crew: await addPerson(test, companyId, 'crew'),
    items,
  };
}

/** Draws on the plan of a job, on a sheet of 100 pixels to the metre. */
export async function draw(
  test: TestApp,
  { companyId }: PricedCompany,
  jobId: string,
  drawing: (plan: PlanBuilder) => void,
): Promise<void> {
  const get = <T>(type: abstract new (...args: never[]) => T) =>
    test.app.get<T>(type as never, { strict: false });
  await get(PlacedSheets).place(companyId, jobId, sheet());
  const items = await get(CatalogueService).byName(companyId);
  await get(PlanWriter).write(
    { companyId, jobId },
    { userId: null, session: '' },
    async ({ plan, version }) => {
      const builder = new PlanBuilder(
        plan,
        'sheet1',
        (name) => {
          const item = items.get(name);
          if (!item) throw new Error(`no item ${name}`);
          return item;
        },
        `v${version}`,
      );
      drawing(builder);
      return builder.changes.map((change) => ({ change }));
    },
  );
}

/** What a job was drawn with, by what it is for in a test. */
export interface TwoRuns {
  readonly jobId: string;
  readonly transformer: string;
  readonly near: string;
  readonly far: readonly string[];
  readonly alone: string;
  readonly more: readonly string[];
}

const HALOGEN = 'Halogen lamp G4, 20 W';
const LIGHT = 'Copper path light, G4 lamp';
const CABLE = '12 AWG landscape cable, 2-core';

/**
 * Two runs. On the 13 V tap `near` gets too much unless the `far` lights draw it down; on the 12 V tap `alone`
 * is well until `more` lights hang on behind it, which leaves all of them dim.
 */
export async function addTwoRuns(test: TestApp, company: PricedCompany): Promise<TwoRuns> {
  const jobId = await addJob(company.designer);
  const made = { jobId, transformer: '', near: '', far: [] as string[], alone: '', more: [] as string[] };
  await draw(test, company, jobId, (plan) => {
    made.transformer = plan.transformer('Multi-tap transformer, 300 VA', [100, 100], 'Shed wall');
    made.near = plan.fixture(LIGHT, [1100, 100], HALOGEN);
    made.far = plan.fixtures(
      LIGHT,
      [
        [1300, 100],
        [1400, 100],
        [1500, 100],
      ],
      HALOGEN,
    );
    const [first] = plan.cable(CABLE, [made.transformer, made.near, ...made.far]);
    plan.land(first ?? '', 'Walk', '13V', 'C1');
    made.alone = plan.fixture(LIGHT, [100, 1600], HALOGEN);
    made.more = plan.fixtures(
      LIGHT,
      [
        [100, 1700],
        [100, 1800],
        [100, 1900],
        [100, 2000],
        [100, 2100],
      ],
      HALOGEN,
    );
    const [second] = plan.cable(CABLE, [made.transformer, made.alone, ...made.more]);
    plan.land(second ?? '', 'Drive', '12V', 'C2');
  });
  return made;
}

export const group = (id: string, on = true) => ({ id, name: `Group ${id}`, description: '', on });

/** The groups of a job drawn by `addTwoRuns`. */
export const twoGroups = ({ far, more }: TwoRuns, on: { far: boolean; more: boolean }): JobPricing => ({
  ...emptyPricing,
  groups: [group('far', on.far), group('more', on.more)],
  members: Object.fromEntries([...far.map((id) => [id, 'far']), ...more.map((id) => [id, 'more'])]),
});

export const itemPrice = (edit: Partial<ItemPrice> = {}): ItemPrice => ({
  costMinor: 1000,
  priceMinor: null,
  per: 1,
  unit: 'each',
  increment: 1,
  taxable: true,
  supplier: '',
  orderNumber: '',
  ...edit,
});

export async function editBook(owner: Agent, edit: (book: PriceBook) => PriceBook): Promise<PriceBookAnswer> {
  const { body } = await owner.get('/api/price-book').expect(200);
  const { version, book } = body as PriceBookAnswer;
  const saved = await owner
    .put('/api/price-book')
    .send({ baseVersion: version, book: edit(book) })
    .expect(200);
  return saved.body as PriceBookAnswer;
}

/** Prices everything that the job's plan asks for. */
export async function priceAll(
  company: PricedCompany,
  jobId: string,
  edit: Partial<ItemPrice> = {},
): Promise<void> {
  const { quote } = await quoteFor(company.owner.agent, jobId);
  for (const { itemId, unit } of quote.lines)
    if (itemId !== null && unit !== 'visit')
      await company.owner.agent
        .put(`/api/catalogue/${itemId}/price`)
        .send({ price: itemPrice({ unit, ...edit }) })
        .expect(200);
}

export async function quoteFor(agent: Agent, jobId: string): Promise<QuoteAnswer> {
  const { body } = await agent.get(`/api/jobs/${jobId}/quote`).expect(200);
  return body as QuoteAnswer;
}

export async function savePricing(agent: Agent, jobId: string, pricing: JobPricing): Promise<number> {
  const { body: present } = await agent.get(`/api/jobs/${jobId}/pricing`).expect(200);
  const { body } = await agent
    .put(`/api/jobs/${jobId}/pricing`)
    .send({ baseVersion: present.version, pricing })
    .expect(200);
  return body.version;
}

export const fixtureIds = (plan: Parameters<typeof recordsOf>[0]): string[] =>
  [...recordsOf(plan, 'fixture')].map(({ id }) => id);
