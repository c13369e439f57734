import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { jobs, sheets } from '../../database/schema/index.js';

export type SheetRow = typeof sheets.$inferSelect;
export type NewSheetRow = Pick<
  typeof sheets.$inferInsert,
  'id' | 'jobId' | 'name' | 'view' | 'originalKey' | 'uploadedBy'
>;
type Settable = Omit<SheetRow, 'id' | 'companyId' | 'jobId' | 'createdAt' | 'uploadedBy' | 'view'>;

@Injectable()
export class SheetsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Whether the company has this job: 'archived' when it is put away. */
  async jobState(companyId: string, jobId: string): Promise<'live' | 'archived' | null> {
    const [row] = await this.database.queries
      .select({ archivedAt: jobs.archivedAt })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    if (!row) return null;
    return row.archivedAt === null ? 'live' : 'archived';
  }

  async listOfJob(companyId: string, jobId: string): Promise<SheetRow[]> {
    return this.database.queries
      .select()
      .from(sheets)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.jobId, jobId), isNull(sheets.archivedAt)))
      .orderBy(asc(sheets.createdAt), asc(sheets.id));
  }

  async find(companyId: string, id: string): Promise<SheetRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(sheets)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.id, id)));
    return row ?? null;
  }

  /** As `find`, holding the row until the transaction ends. */
  async lock(companyId: string, id: string): Promise<SheetRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(sheets)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.id, id)))
      .for('update');
    return row ?? null;
  }

  async insert(companyId: string, values: NewSheetRow): Promise<SheetRow> {
    const [row] = await this.database.queries
      .insert(sheets)
      .values({ ...values, companyId })
      .returning();
    return row!;
  }

  async update(companyId: string, id: string, values: Partial<Settable>): Promise<SheetRow | null> {
    const [row] = await this.database.queries
      .update(sheets)
      .set(values)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.id, id)))
      .returning();
    return row ?? null;
  }

  /** Every sheet, of whatever company, that waits for a worker; for the worker's own use. */
  async unfinishedOfAllCompanies(): Promise<{ companyId: string; sheetId: string }[]> {
    return this.database.queries
      .select({ companyId: sheets.companyId, sheetId: sheets.id })
      .from(sheets)
      .where(and(inArray(sheets.status, ['uploaded', 'processing']), isNull(sheets.archivedAt)))
      .orderBy(asc(sheets.createdAt));
  }

  /** The place of a new sheet among those of its job. */
  async countOfJob(companyId: string, jobId: string): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: sql<number>`count(*)::int` })
      .from(sheets)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.jobId, jobId)));
    return row?.n ?? 0;
  }
}
