import type { Change } from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { and, asc, desc, eq, gt, inArray, lt, lte, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import {
  jobs,
  planChanges,
  planRecords,
  planSnapshots,
  planSummaries,
  plans,
  users,
} from '../../database/schema/index.js';

/** Which plan: that of a job of a company. */
export interface PlanKey {
  readonly companyId: string;
  readonly jobId: string;
}

export type ChangeRow = typeof planChanges.$inferSelect;
export type SummaryRow = typeof planSummaries.$inferSelect;

/** Records as they lie in the database, perhaps in an older form. */
export interface StoredRecords {
  readonly version: number;
  readonly schemaVersion: number;
  readonly records: readonly unknown[];
}

@Injectable()
export class PlansRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  /** Null when the company has no such job. */
  async jobState({ companyId, jobId }: PlanKey): Promise<'live' | 'archived' | null> {
    const [row] = await this.queries
      .select({ archivedAt: jobs.archivedAt })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    if (!row) return null;
    return row.archivedAt === null ? 'live' : 'archived';
  }

  async find(key: PlanKey): Promise<{ version: number; schemaVersion: number } | null> {
    const [row] = await this.queries
      .select({ version: plans.version, schemaVersion: plans.schemaVersion })
      .from(plans)
      .where(this.isPlan(key));
    return row ?? null;
  }

  /** True when it was made just now. */
  async create(key: PlanKey, schemaVersion: number): Promise<boolean> {
    const made = await this.queries
      .insert(plans)
      .values({ ...key, schemaVersion })
      .onConflictDoNothing()
      .returning({ version: plans.version });
    return made.length > 0;
  }

  /**
   * Holds the plan until the transaction ends: writers one at a time, or readers that keep writers out.
   * Everything read after it is of the version that it answers.
   */
  async lock(
    key: PlanKey,
    mode: 'update' | 'share',
  ): Promise<{ version: number; schemaVersion: number } | null> {
    const [row] = await this.queries
      .select({ version: plans.version, schemaVersion: plans.schemaVersion })
      .from(plans)
      .where(this.isPlan(key))
      .for(mode);
    return row ?? null;
  }

  async setVersion(key: PlanKey, version: number, schemaVersion: number): Promise<void> {
    await this.queries
      .update(plans)
      .set({ version, schemaVersion, updatedAt: sql`now()` })
      .where(this.isPlan(key));
  }

  /** The version and the records, of one moment. */
  async present(key: PlanKey): Promise<StoredRecords | null> {
    const rows = await this.queries
      .select({
        version: plans.version,
        schemaVersion: plans.schemaVersion,
        record: planRecords.record,
      })
      .from(plans)
      .leftJoin(
        planRecords,
        and(eq(planRecords.companyId, plans.companyId), eq(planRecords.jobId, plans.jobId)),
      )
      .where(this.isPlan(key))
      .orderBy(asc(planRecords.version), asc(planRecords.recordId));
    const [first] = rows;
    if (!first) return null;
    const { version, schemaVersion } = first;
    return {
      version,
      schemaVersion,
      records: rows.flatMap(({ record }) => (record === null ? [] : [record])),
    };
  }

  /** The newest snapshot that is not after the version. */
  async snapshotBefore(key: PlanKey, version: number): Promise<StoredRecords | null> {
    const [row] = await this.queries
      .select()
      .from(planSnapshots)
      .where(
        and(
          eq(planSnapshots.companyId, key.companyId),
          eq(planSnapshots.jobId, key.jobId),
          lte(planSnapshots.version, version),
        ),
      )
      .orderBy(desc(planSnapshots.version))
      .limit(1);
    return row ? { ...row, records: row.records as unknown[] } : null;
  }

  async insertSnapshot(
    key: PlanKey,
    version: number,
    schemaVersion: number,
    records: readonly unknown[],
  ): Promise<void> {
    await this.queries
      .insert(planSnapshots)
      .values({ ...key, version, schemaVersion, records })
      .onConflictDoNothing();
  }

  /** Changes after a version and up to another, oldest first. */
  async changesBetween(key: PlanKey, after: number, upTo: number, limit?: number): Promise<ChangeRow[]> {
    const found = this.queries
      .select()
      .from(planChanges)
      .where(and(this.isChangeOf(key), gt(planChanges.version, after), lte(planChanges.version, upTo)))
      .orderBy(asc(planChanges.version));
    return limit === undefined ? found : found.limit(limit);
  }

  /** The versions that these changes made, by change id. */
  async versionsOf(key: PlanKey, changeIds: readonly string[]): Promise<Map<string, number>> {
    const rows = await this.queries
      .select({ changeId: planChanges.changeId, version: planChanges.version })
      .from(planChanges)
      .where(and(this.isChangeOf(key), inArray(planChanges.changeId, [...changeIds])));
    return new Map(rows.map(({ changeId, version }) => [changeId, version]));
  }

  async insertChange(
    key: PlanKey,
    values: { change: Change; version: number; authorId: string | null; session: string; label: string },
  ): Promise<void> {
    const { change, ...rest } = values;
    await this.queries.insert(planChanges).values({
      ...key,
      ...rest,
      changeId: change.id,
      schemaVersion: change.schema,
      put: change.put,
      remove: change.remove,
    });
  }

  /** Brings the rows of the present records to what the change left. */
  async putRecords(key: PlanKey, version: number, change: Pick<Change, 'put' | 'remove'>): Promise<void> {
    const records = Object.entries(change.put).map(([recordId, record]) => ({
      ...key,
      recordId,
      record,
      version,
    }));
    // A row has five parameters, and a statement takes 65,535.
    for (let i = 0; i < records.length; i += 5000)
      await this.queries
        .insert(planRecords)
        .values(records.slice(i, i + 5000))
        .onConflictDoUpdate({
          target: [planRecords.companyId, planRecords.jobId, planRecords.recordId],
          set: { record: sql`excluded.record`, version: sql`excluded.version` },
        });
    if (change.remove.length > 0)
      await this.queries
        .delete(planRecords)
        .where(
          and(
            eq(planRecords.companyId, key.companyId),
            eq(planRecords.jobId, key.jobId),
            inArray(planRecords.recordId, change.remove),
          ),
        );
  }

  /** Rewrites all rows, for a plan whose records were in an older form. */
  async replaceRecords(
    key: PlanKey,
    version: number,
    records: Record<string, Change['put'][string]>,
  ): Promise<void> {
    await this.queries
      .delete(planRecords)
      .where(and(eq(planRecords.companyId, key.companyId), eq(planRecords.jobId, key.jobId)));
    await this.putRecords(key, version, { put: records, remove: [] });
  }

  /** Tells every process, when the transaction commits. Ids and versions only. */
  async notify({ companyId, jobId }: PlanKey, version: number): Promise<void> {
    const payload = JSON.stringify({ companyId, jobId, version });
    await this.queries.execute(sql`SELECT pg_notify(${PLAN_CHANNEL}, ${payload})`);
  }

  /** A page of the history, newest first, before a version. */
  async history(key: PlanKey, before: number | null, limit: number) {
    return this.queries
      .select({
        version: planChanges.version,
        changeId: planChanges.changeId,
        label: planChanges.label,
        at: planChanges.createdAt,
        authorId: planChanges.authorId,
        authorName: users.name,
        put: sql<number>`(SELECT count(*)::int FROM jsonb_object_keys(${planChanges.put}))`,
        removed: sql<number>`jsonb_array_length(${planChanges.remove})`,
      })
      .from(planChanges)
      .leftJoin(users, eq(users.id, planChanges.authorId))
      .where(and(this.isChangeOf(key), before === null ? undefined : lt(planChanges.version, before)))
      .orderBy(desc(planChanges.version))
      .limit(limit);
  }

  async newestSummary(key: PlanKey): Promise<SummaryRow | null> {
    const [row] = await this.queries
      .select()
      .from(planSummaries)
      .where(and(eq(planSummaries.companyId, key.companyId), eq(planSummaries.jobId, key.jobId)))
      .orderBy(desc(planSummaries.planVersion), desc(planSummaries.createdAt))
      .limit(1);
    return row ?? null;
  }

  /** Keeps a summary, and the few before it. */
  async putSummary(
    key: PlanKey,
    values: Omit<typeof planSummaries.$inferInsert, 'companyId' | 'jobId' | 'createdAt'>,
    keepVersions: number,
  ): Promise<void> {
    const { faults, cautions, fixtures, summary } = values;
    await this.queries
      .insert(planSummaries)
      .values({ ...key, ...values })
      .onConflictDoUpdate({
        target: [
          planSummaries.companyId,
          planSummaries.jobId,
          planSummaries.planVersion,
          planSummaries.solverVersion,
        ],
        set: { faults, cautions, fixtures, summary, createdAt: sql`now()` },
      });
    await this.queries.delete(planSummaries).where(
      and(
        eq(planSummaries.companyId, key.companyId),
        eq(planSummaries.jobId, key.jobId),
        lt(
          planSummaries.planVersion,
          sql`(SELECT coalesce(min(kept), 0) FROM (SELECT plan_version AS kept FROM plan_summaries
                 WHERE company_id = ${key.companyId} AND job_id = ${key.jobId}
                 ORDER BY plan_version DESC LIMIT ${keepVersions}) newest)`,
        ),
      ),
    );
  }

  private isPlan({ companyId, jobId }: PlanKey) {
    return and(eq(plans.companyId, companyId), eq(plans.jobId, jobId));
  }

  private isChangeOf({ companyId, jobId }: PlanKey) {
    return and(eq(planChanges.companyId, companyId), eq(planChanges.jobId, jobId));
  }
}

export const PLAN_CHANNEL = 'plan_changed';
