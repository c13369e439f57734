import { Inject, Injectable } from '@nestjs/common';
import { and, asc, count, eq, inArray, isNull } from 'drizzle-orm';
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

  /** How many sheets of a job are ready, put away ones included. */
  async readyOfJob(companyId: string, jobId: string): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: count() })
      .from(sheets)
      .where(and(eq(sheets.companyId, companyId), eq(sheets.jobId, jobId), eq(sheets.status, 'ready')));
    return row?.n ?? 0;
  }

  /**
   * Runs `work` unless another worker is at the same sheet. The lock belongs to a connection held meanwhile,
   * so that it ends with a worker that is killed.
   */
  async alone(sheetId: string, work: () => Promise<void>): Promise<void> {
    const client = await this.database.pool.connect();
    let broken = false;
    const onError = () => {
      broken = true;
    };
    client.on('error', onError);
    try {
      const key = [`sheet ${sheetId}`];
      const tried = await client.query<{ got: boolean }>(
        'SELECT pg_try_advisory_lock(hashtextextended($1, 0)) AS got',
        key,
      );
      if (!tried.rows[0]?.got) return;
      try {
        await work();
      } finally {
        if (!broken) await client.query('SELECT pg_advisory_unlock(hashtextextended($1, 0))', key);
      }
    } finally {
      client.off('error', onError);
      client.release(broken);
    }
  }
}
