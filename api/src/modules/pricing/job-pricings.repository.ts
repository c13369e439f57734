import { Inject, Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { jobPricings } from '../../database/schema/index.js';
import type { PlanKey } from '../plans/plans.repository.js';

export type JobPricingRow = typeof jobPricings.$inferSelect;

/** What people decided about the price of each job; a job that nobody priced has no row. */
@Injectable()
export class JobPricingsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async find(key: PlanKey): Promise<JobPricingRow | null> {
    const [row] = await this.database.queries.select().from(jobPricings).where(this.isOf(key));
    return row ?? null;
  }

  /** Saves on top of a version, 0 for the first time; null when the pricing is at another one. */
  async save(
    key: PlanKey,
    baseVersion: number,
    pricing: unknown,
    updatedBy: string | null,
  ): Promise<JobPricingRow | null> {
    const { queries } = this.database;
    const saved =
      baseVersion === 0
        ? queries
            .insert(jobPricings)
            .values({ ...key, pricing, updatedBy })
            .onConflictDoNothing()
        : queries
            .update(jobPricings)
            .set({ pricing, updatedBy, version: baseVersion + 1, updatedAt: sql`now()` })
            .where(and(this.isOf(key), eq(jobPricings.version, baseVersion)));
    const [row] = await saved.returning();
    return row ?? null;
  }

  private isOf({ companyId, jobId }: PlanKey) {
    return and(eq(jobPricings.companyId, companyId), eq(jobPricings.jobId, jobId));
  }
}
