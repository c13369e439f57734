import {
  apply,
  type Change,
  defaultSettings,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  SETTINGS_ID,
  type SettingsRecord,
} from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { notFound } from '../../http/app-error.js';
import { Queue } from '../../ports/queue/queue.js';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { regionOf, settingsInForce } from '../companies/settings.js';
import { describeChange } from './describe-change.js';
import { PlanDocuments } from './plan-documents.js';
import { type PlanKey, PlansRepository } from './plans.repository.js';

/** A snapshot is kept each time that so many versions have gone by: the most that is ever replayed. */
const VERSIONS_PER_SNAPSHOT = 200;

export interface Author {
  /** Null for the system itself. */
  readonly userId: string | null;
  readonly session: string;
}

export const theSystem: Author = { userId: null, session: '' };

/** A plan held for writing, at its present version. */
export interface HeldPlan {
  readonly version: number;
  readonly plan: PlanDocument;
}

/** The only way into a plan: one writer at a time, each change a version. */
@Injectable()
export class PlanWriter {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(PlansRepository) private readonly repository: PlansRepository,
    @Inject(PlanDocuments) private readonly documents: PlanDocuments,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /**
   * Holds the plan, makes the changes that `work` answers (each sound on the plan as left by the one before),
   * tells other processes and asks for a new summary: all in one transaction, which the caller may have begun.
   */
  async write(
    key: PlanKey,
    author: Author,
    work: (held: HeldPlan) => Promise<readonly { readonly change: Change; readonly label?: string }[]>,
  ): Promise<HeldPlan> {
    return this.database.transaction(async () => {
      const held = await this.hold(key);
      return this.make(key, author, held, await work(held));
    });
  }

  /** Makes sure that the job has a plan: an empty one begins with the company's settings. */
  async ensure(key: PlanKey): Promise<void> {
    if (await this.repository.find(key)) return;
    await this.database.transaction(() => this.hold(key));
  }

  private async hold(key: PlanKey): Promise<HeldPlan> {
    const isNew = await this.repository.create(key, PLAN_SCHEMA_VERSION);
    const row = await this.repository.lock(key, 'update');
    if (!row) throw notFound('This plan');
    const plan = await this.documents.present(key, row.version);
    if (isNew) return this.make(key, theSystem, { version: row.version, plan }, [await this.beginning(key)]);
    if (row.schemaVersion !== PLAN_SCHEMA_VERSION) {
      await this.repository.replaceRecords(key, row.version, Object.fromEntries(plan));
      await this.repository.setVersion(key, row.version, PLAN_SCHEMA_VERSION);
    }
    return { version: row.version, plan };
  }

  private async beginning({ companyId }: PlanKey): Promise<{ change: Change; label: string }> {
    const company = await this.companies.find(companyId);
    if (!company) throw notFound('This company');
    const region = regionOf(company.region);
    const usual = settingsInForce(region, company.settings);
    const settings: SettingsRecord = {
      ...defaultSettings(region === 'us' ? 'us' : 'iec'),
      lineVolts: usual.lineVolts,
      conductorTemperatureC: usual.conductorTemperatureC,
      slackAtFixtureMeters: usual.slackAtFixtureMeters,
      slackAtTransformerMeters: usual.slackAtTransformerMeters,
      slackAtJunctionMeters: usual.slackAtJunctionMeters,
      schedule: usual.schedule,
      waterClearanceMeters: usual.waterClearanceMeters,
    };
    const put = { [SETTINGS_ID]: settings };
    return {
      change: { id: 'beginning', schema: PLAN_SCHEMA_VERSION, put, remove: [] },
      label: 'Began the plan with the company’s settings',
    };
  }

  private async make(
    key: PlanKey,
    author: Author,
    held: HeldPlan,
    changes: readonly { readonly change: Change; readonly label?: string }[],
  ): Promise<HeldPlan> {
    let { version, plan } = held;
    for (const { change, label } of changes) {
      version += 1;
      await this.repository.insertChange(key, {
        change,
        version,
        authorId: author.userId,
        session: author.session,
        label: label ?? describeChange(plan, change),
      });
      await this.repository.putRecords(key, version, change);
      plan = apply(plan, change);
    }
    if (version === held.version) return held;
    await this.repository.setVersion(key, version, PLAN_SCHEMA_VERSION);
    const due =
      Math.floor(version / VERSIONS_PER_SNAPSHOT) > Math.floor(held.version / VERSIONS_PER_SNAPSHOT);
    if (due) await this.repository.insertSnapshot(key, version, PLAN_SCHEMA_VERSION, [...plan.values()]);
    await this.repository.notify(key, version);
    const { companyId, jobId } = key;
    await this.queue.send('plan.summarise', { companyId, jobId }, { singletonKey: `${companyId}/${jobId}` });
    return { version, plan };
  }
}
