import { type CatalogueItem, catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { type PlanDocument, planOf, recordsOf } from '@lampwright/geometry/plan';
import {
  emptyPricing,
  type ItemPrice,
  itemPriceSchema,
  type JobPricing,
  jobPricingSchema,
  type PriceBook,
  type Quote,
  type QuoteInput,
  quoteOf,
} from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { type PlanAt, PlanDocuments } from '../plans/plan-documents.js';
import { type PlanKey, PlansRepository } from '../plans/plans.repository.js';
import { solvePlan } from '../plans/solve-plan.js';
import { CataloguePricesRepository } from './catalogue-prices.repository.js';
import { FaultAcceptancesRepository } from './fault-acceptances.repository.js';
import { keyOf, type OpenFault, seriousOf, withAcceptances } from './fault-keys.js';
import { JobPricingsRepository } from './job-pricings.repository.js';
import { obstaclesOf } from './obstacles.js';
import { type JudgedPlan, PlanJudge } from './plan-judge.js';
import { type BookInForce, PriceBooks } from './price-books.js';
import type { CombinationCheck, Obstacle, QuoteAnswer } from './pricing.dto.js';

/** A price as the plan and the company's prices make it, before anybody asks whether it may be offered. */
export interface PricedPlan {
  readonly plan: PlanDocument;
  readonly planVersion: number;
  readonly pricing: JobPricing;
  readonly pricingVersion: number;
  readonly book: PriceBook;
  /** With costs. */
  readonly quote: Quote;
}

/** The price of a job as it is now, with all that the company itself may know. */
export interface WorkedQuote extends PricedPlan {
  readonly faults: QuoteAnswer['faults'];
  readonly checks: readonly CombinationCheck[];
  readonly obstacles: readonly Obstacle[];
  /** Volts of each fixture in the whole plan, by record; none where there is no answer. */
  readonly volts: ReadonlyMap<string, number>;
}

/** What people decided about the price of a job; version 0 before anybody saved anything. */
export interface PricingAt {
  readonly version: number;
  readonly pricing: JobPricing;
}

const noPlan: PlanAt = { version: 0, plan: planOf([]) };

/** Works out the price of a job from its plan, the company's prices and what people decided. */
@Injectable()
export class Quotes {
  constructor(
    @Inject(PlansRepository) private readonly plans: PlansRepository,
    @Inject(PlanDocuments) private readonly documents: PlanDocuments,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(CataloguePricesRepository) private readonly prices: CataloguePricesRepository,
    @Inject(JobPricingsRepository) private readonly pricings: JobPricingsRepository,
    @Inject(FaultAcceptancesRepository) private readonly acceptances: FaultAcceptancesRepository,
    @Inject(PlanJudge) private readonly judge: PlanJudge,
  ) {}

  /** Null where the job is not the company's. */
  async work(companyId: string, jobId: string): Promise<WorkedQuote | null> {
    const key = { companyId, jobId };
    const read = await this.read(key);
    if (!read) return null;
    const { at, held, pricing } = read;
    const [quote, acceptances] = [await this.price(key, read), await this.acceptances.standing(key)];
    const judged = await this.judge.judge(key, at, pricing.pricing, held.system);
    const faults = withAcceptances(judged.faults, acceptances);
    const checks = checksOf(judged, faults);
    const findings = { plan: at.plan, pricing: pricing.pricing, quote, judged, faults };
    return { ...told(read, quote), faults, checks, obstacles: obstaclesOf(findings), volts: judged.volts };
  }

  /** The price alone, without solving anything. Null where the job is not the company's. */
  async bill(companyId: string, jobId: string): Promise<PricedPlan | null> {
    const key = { companyId, jobId };
    const read = await this.read(key);
    return read && told(read, await this.price(key, read));
  }

  /** The faults of the whole plan, and who answers for them. Null where the job is not the company's. */
  async faults(companyId: string, jobId: string): Promise<readonly OpenFault[] | null> {
    const key = { companyId, jobId };
    const read = await this.read(key);
    if (!read) return null;
    const { faults } = solvePlan(read.at.plan, read.held.system);
    return withAcceptances(seriousOf(faults), await this.acceptances.standing(key));
  }

  async pricing(key: PlanKey): Promise<PricingAt> {
    const row = await this.pricings.find(key);
    if (!row) return { version: 0, pricing: emptyPricing };
    return { version: row.version, pricing: jobPricingSchema.parse(row.pricing) };
  }

  private async read(key: PlanKey): Promise<ReadQuote | null> {
    if (!(await this.plans.jobState(key))) return null;
    const held = await this.books.inForce(key.companyId);
    if (!held) return null;
    return {
      held,
      pricing: await this.pricing(key),
      // A job whose plan nobody opened yet has none.
      at: (await this.documents.read(key)) ?? noPlan,
    };
  }

  private async price({ companyId }: PlanKey, read: ReadQuote): Promise<Quote> {
    const { at, held, pricing } = read;
    return quoteOf(at.plan, {
      catalogue: await this.catalogue(companyId, read),
      prices: await this.newestPrices(companyId),
      book: held.book,
      pricing: pricing.pricing,
      currency: held.currency,
      system: held.system,
    });
  }

  /** The company's items in the order of its catalogue; of the archived ones those that the job still names. */
  private async catalogue(
    companyId: string,
    { at, held, pricing }: ReadQuote,
  ): Promise<QuoteInput['catalogue']> {
    const named = new Set<string | null>([
      ...[...recordsOf(at.plan, 'item')].map(({ sourceId }) => sourceId),
      ...Object.values(pricing.pricing.controls),
      ...Object.values(held.book.parts),
      held.book.controlItemId,
    ]);
    const items = new Map<string, CatalogueItem>();
    for (const { id, item, archivedAt } of await this.prices.items(companyId))
      if (archivedAt === null || named.has(id)) items.set(id, catalogueItemSchema.parse(item));
    return items;
  }

  private async newestPrices(companyId: string): Promise<ReadonlyMap<string, ItemPrice>> {
    const rows = await this.prices.newest(companyId);
    return new Map(rows.map(({ itemId, price }) => [itemId, itemPriceSchema.parse(price)]));
  }
}

interface ReadQuote {
  readonly at: PlanAt;
  readonly held: BookInForce;
  readonly pricing: PricingAt;
}

const told = ({ at, held, pricing }: ReadQuote, quote: Quote): PricedPlan => ({
  plan: at.plan,
  planVersion: at.version,
  pricing: pricing.pricing,
  pricingVersion: pricing.version,
  book: held.book,
  quote,
});

/**
 * A combination may be offered when somebody answers for each of its faults: for the fault, not for its words,
 * since the volts of a smaller set are others by nature.
 */
function checksOf({ combinations }: JudgedPlan, faults: readonly OpenFault[]): CombinationCheck[] {
  const accepted = new Set(faults.filter(({ acceptance }) => acceptance !== null).map(({ key }) => key));
  return combinations.map(({ groups, faults: own, refusal }) => {
    const inTheWay = own.filter((fault) => !accepted.has(keyOf(fault))).map(({ message }) => message);
    const sentences = refusal === null ? inTheWay : [refusal, ...inTheWay];
    return { groups: [...groups], offerable: sentences.length === 0, faults: sentences };
  });
}
