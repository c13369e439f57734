import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../database/database.js';
import { CompaniesRepository } from '../modules/companies/companies.repository.js';
import { regionOf, settingsInForce } from '../modules/companies/settings.js';
import { PlanDocuments } from '../modules/plans/plan-documents.js';
import { PlansRepository } from '../modules/plans/plans.repository.js';
import { summarise } from '../modules/plans/summarise.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import type { JobHandler } from './job-handler.js';

/** Versions whose summary is kept. */
const SUMMARIES_KEPT = 20;

/** Computes the summary of a plan after saves; several saves may share one. */
@Injectable()
export class SummarisePlan implements JobHandler<'plan.summarise'> {
  readonly queue = 'plan.summarise';

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PlansRepository) private readonly plans: PlansRepository,
    @Inject(PlanDocuments) private readonly documents: PlanDocuments,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
  ) {}

  async handle(key: QueuePayloads['plan.summarise']): Promise<void> {
    const found = await this.database.transaction(async () => {
      // Waits for a writer whose own request for a summary was dropped because this one was waiting.
      const held = await this.plans.lock(key, 'share');
      return (
        held && { read: await this.documents.read(key), company: await this.companies.find(key.companyId) }
      );
    });
    // The job or the company may be gone by now.
    if (!found?.read || !found.company) return;
    const { version, plan } = found.read;
    const { units } = settingsInForce(regionOf(found.company.region), found.company.settings);
    const summary = summarise(plan, version, units);
    await this.plans.putSummary(
      key,
      {
        planVersion: version,
        solverVersion: summary.solverVersion,
        faults: summary.counts.fault,
        cautions: summary.counts.caution,
        fixtures: summary.fixtures,
        summary,
      },
      SUMMARIES_KEPT,
    );
  }
}
