import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { faultAcceptances } from '../../database/schema/index.js';
import type { PlanKey } from '../plans/plans.repository.js';

export type AcceptanceRow = typeof faultAcceptances.$inferSelect;
type NewAcceptance = Pick<AcceptanceRow, 'faultKey' | 'message' | 'reason' | 'acceptedBy' | 'acceptedByName'>;

/** Faults of plans that somebody answers for in writing. Rows are withdrawn, never deleted. */
@Injectable()
export class FaultAcceptancesRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Those that nobody withdrew, oldest first. */
  async standing(key: PlanKey): Promise<AcceptanceRow[]> {
    return this.database.queries
      .select()
      .from(faultAcceptances)
      .where(this.isStanding(key))
      .orderBy(asc(faultAcceptances.createdAt), asc(faultAcceptances.id));
  }

  async insert(key: PlanKey, values: NewAcceptance): Promise<AcceptanceRow> {
    const [row] = await this.database.queries
      .insert(faultAcceptances)
      .values({ ...key, ...values })
      .returning();
    return row!;
  }

  /** False where there is no such acceptance that stands. */
  async withdraw(key: PlanKey, id: string): Promise<boolean> {
    const rows = await this.database.queries
      .update(faultAcceptances)
      .set({ withdrawnAt: sql`now()` })
      .where(and(this.isStanding(key), eq(faultAcceptances.id, id)))
      .returning({ id: faultAcceptances.id });
    return rows.length > 0;
  }

  /** Those of one fault, whatever words it had. */
  async withdrawOf(key: PlanKey, faultKey: string): Promise<void> {
    await this.database.queries
      .update(faultAcceptances)
      .set({ withdrawnAt: sql`now()` })
      .where(and(this.isStanding(key), eq(faultAcceptances.faultKey, faultKey)));
  }

  private isStanding({ companyId, jobId }: PlanKey) {
    return and(
      eq(faultAcceptances.companyId, companyId),
      eq(faultAcceptances.jobId, jobId),
      isNull(faultAcceptances.withdrawnAt),
    );
  }
}
