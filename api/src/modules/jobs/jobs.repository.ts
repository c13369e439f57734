import { Inject, Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { jobs, plans } from '../../database/schema/index.js';
import type { SiteWalk } from './site-walk.dto.js';

export type JobRow = typeof jobs.$inferSelect;
type Editable = Pick<JobRow, 'name' | 'stage' | 'notes' | 'siteWalkOn' | 'installOn' | 'existingSystem'>;

/** The later of the job's last edit and its plan's; a plan's first version is only its beginning. */
export const lastEdit = sql<Date>`greatest(${jobs.updatedAt}, case when ${plans.version} > 1 then ${plans.updatedAt} end)`;

@Injectable()
export class JobsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async find(companyId: string, id: string): Promise<JobRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, id)));
    return row ?? null;
  }

  /** The same, kept from changing until the running transaction ends. */
  async lock(companyId: string, id: string): Promise<JobRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, id)))
      .for('no key update');
    return row ?? null;
  }

  /** When the job or its plan was last edited. */
  async editedAt(companyId: string, id: string): Promise<Date | null> {
    const [row] = await this.database.queries
      .select({ at: lastEdit.mapWith(jobs.updatedAt) })
      .from(jobs)
      .leftJoin(plans, and(eq(plans.companyId, jobs.companyId), eq(plans.jobId, jobs.id)))
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, id)));
    return row?.at ?? null;
  }

  async insert(
    companyId: string,
    values: { name: string; propertyId: string; existingSystem: boolean; notes: string },
  ): Promise<JobRow> {
    const [row] = await this.database.queries
      .insert(jobs)
      .values({ ...values, companyId })
      .returning();
    return row!;
  }

  async update(
    companyId: string,
    id: string,
    values: Partial<Editable & { archivedAt: Date | null; siteWalk: SiteWalk }>,
  ): Promise<JobRow | null> {
    const [row] = await this.database.queries
      .update(jobs)
      .set({ ...values, updatedAt: sql`now()` })
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, id)))
      .returning();
    return row ?? null;
  }
}
