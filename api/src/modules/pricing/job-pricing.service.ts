import { type JobPricing, type PriceBook, withoutCosts } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { UsersRepository } from '../../access/users.repository.js';
import { Database } from '../../database/database.js';
import { badInput, conflict, notFound } from '../../http/app-error.js';
import { type PlanKey, PlansRepository } from '../plans/plans.repository.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { pricingWithCostsOf, pricingWithoutCosts, seesCosts } from './cost-sight.js';
import { FaultAcceptancesRepository } from './fault-acceptances.repository.js';
import { acceptanceOf } from './fault-keys.js';
import { JobPricingsRepository } from './job-pricings.repository.js';
import { PriceBooks } from './price-books.js';
import type {
  Acceptance,
  AcceptFault,
  JobPricingAnswer,
  JobPricingEdit,
  Materials,
  QuoteAnswer,
  QuoteTerms,
} from './pricing.dto.js';
import { Quotes } from './quotes.js';

/** What whoever prices a job may know of the book, costs or not. */
const termsOf = ({
  taxes,
  defaultTaxId,
  stages,
  depositCap,
  controlItemId,
  rates,
}: PriceBook): QuoteTerms => ({
  taxes,
  defaultTaxId,
  stages,
  depositCap,
  controlItemId,
  aimingVisits: rates.aimingVisits,
});

@Injectable()
export class JobPricingService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PlansRepository) private readonly plans: PlansRepository,
    @Inject(PriceBooks) private readonly books: PriceBooks,
    @Inject(JobPricingsRepository) private readonly pricings: JobPricingsRepository,
    @Inject(FaultAcceptancesRepository) private readonly acceptances: FaultAcceptancesRepository,
    @Inject(Quotes) private readonly quotes: Quotes,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  async get(actor: Actor, jobId: string): Promise<JobPricingAnswer> {
    demand(actor, 'prices.read');
    const key = { companyId: actor.companyId, jobId };
    if (!(await this.plans.jobState(key))) throw notFound('This job');
    return this.present(key, seesCosts(actor, await this.book(actor)));
  }

  /**
   * Whoever does not see costs leaves those of the manual lines as they are.
   * @throws AppError 409 `pricing-conflict` with the present pricing, when it is not at the version edited
   */
  async replace(
    actor: Actor,
    jobId: string,
    { baseVersion, pricing }: JobPricingEdit,
  ): Promise<JobPricingAnswer> {
    demand(actor, 'prices.edit');
    const sees = seesCosts(actor, await this.book(actor));
    return this.database.transaction(async () => {
      const key = await this.editable(actor, jobId);
      if (!sees) refuseCosts(pricing);
      const stored = await this.quotes.pricing(key);
      const whole = sees ? pricing : pricingWithCostsOf(pricing, stored.pricing);
      // A stored pricing that changed since it was read is at another version, and nothing is saved.
      const saved =
        stored.version === baseVersion &&
        (await this.pricings.save(key, baseVersion, whole, actor.userId)) !== null;
      const answer = await this.present(key, sees);
      if (saved) return answer;
      throw conflict(
        'pricing-conflict',
        'Somebody changed the price of this job since you opened it. Look at theirs, then save yours again.',
        { ...answer },
      );
    });
  }

  async quote(actor: Actor, jobId: string): Promise<QuoteAnswer> {
    demand(actor, 'prices.read');
    const worked = await this.quotes.work(actor.companyId, jobId);
    if (!worked) throw notFound('This job');
    const { planVersion, pricingVersion, book, quote, faults, checks, obstacles } = worked;
    const sees = seesCosts(actor, book);
    return {
      planVersion,
      pricingVersion,
      seesCosts: sees,
      quote: sees ? quote : withoutCosts(quote),
      terms: termsOf(book),
      faults: [...faults],
      checks: [...checks],
      obstacles: [...obstacles],
    };
  }

  /** What is to be bought and brought, for everybody: no money at all, and no labour. */
  async materials(actor: Actor, jobId: string): Promise<Materials> {
    demand(actor, 'jobs.read');
    const priced = await this.quotes.bill(actor.companyId, jobId);
    if (!priced) throw notFound('This job');
    return {
      planVersion: priced.planVersion,
      lines: priced.quote.lines
        .filter(({ kind }) => kind === 'material')
        .map(({ key, groupId, section, name, quantity, unit, source, recordIds }) => ({
          key,
          groupId,
          section,
          name,
          quantity,
          unit,
          source,
          recordIds,
        })),
    };
  }

  /**
   * Takes it on oneself that a fault is acceptable, in writing.
   * @throws AppError 409 `fault-changed` when the fault is gone, or has other words than those that were read
   */
  async accept(actor: Actor, jobId: string, { faultKey, message, reason }: AcceptFault): Promise<Acceptance> {
    demand(actor, 'prices.edit');
    return this.database.transaction(async () => {
      const key = await this.editable(actor, jobId);
      // The plan stays as it is meanwhile, and two acceptances of one fault come one after the other.
      await this.plans.lock(key, 'update');
      const faults = (await this.quotes.faults(actor.companyId, jobId)) ?? [];
      const fault = faults.find((one) => one.key === faultKey && one.message === message);
      if (!fault) {
        const now = faults.find((one) => one.key === faultKey);
        throw conflict(
          'fault-changed',
          now
            ? `The plan has changed since. It says now: ${now.message}`
            : 'The plan does not have this fault any more.',
        );
      }
      if (fault.acceptance?.reason === reason) return fault.acceptance;
      await this.acceptances.withdrawOf(key, faultKey);
      const user = await this.users.find(actor.userId);
      const name = user?.name ?? '';
      const row = await this.acceptances.insert(key, {
        faultKey,
        message,
        reason,
        acceptedBy: actor.userId,
        acceptedByName: name,
      });
      await this.events.note(key, 'fault-accepted', { message, reason }, { id: actor.userId, name });
      return acceptanceOf(row);
    });
  }

  async withdrawAcceptance(actor: Actor, jobId: string, acceptanceId: string): Promise<void> {
    demand(actor, 'prices.edit');
    await this.database.transaction(async () => {
      const key = await this.editable(actor, jobId);
      if (!(await this.acceptances.withdraw(key, acceptanceId))) throw notFound('This acceptance');
    });
  }

  private async present(key: PlanKey, sees: boolean): Promise<JobPricingAnswer> {
    const { version, pricing } = await this.quotes.pricing(key);
    return { version, pricing: sees ? pricing : pricingWithoutCosts(pricing) };
  }

  private async book(actor: Actor): Promise<PriceBook> {
    const held = await this.books.inForce(actor.companyId);
    if (!held) throw notFound('This company');
    return held.book;
  }

  private async editable(actor: Actor, jobId: string): Promise<PlanKey> {
    const key = { companyId: actor.companyId, jobId };
    const state = await this.plans.jobState(key);
    if (!state) throw notFound('This job');
    if (state === 'archived')
      throw conflict('job-archived', 'This job is archived. Restore it before changing its price.');
    return key;
  }
}

/** A cost that could not be read again by whoever wrote it is not taken. */
function refuseCosts({ manualLines }: JobPricing): void {
  const faults = manualLines.flatMap(({ costMinor }, i) =>
    costMinor === null
      ? []
      : [
          {
            pointer: `/pricing/manualLines/${i}/costMinor`,
            detail: 'Costs are for the owner’s eyes in this company; leave this empty.',
          },
        ],
  );
  if (faults.length > 0) throw badInput(faults);
}
