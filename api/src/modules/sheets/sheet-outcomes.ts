import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import type { DecodeRefusal } from '../../media/task.js';
import { Queue } from '../../ports/queue/queue.js';
import { PlanSheets } from './plan-sheets.js';
import { pagesPrefix, sheetPrefix } from './sheet-keys.js';
import { type SheetRow, SheetsRepository } from './sheets.repository.js';

type Made = Pick<
  SheetRow,
  'imageKey' | 'thumbnailKey' | 'imageType' | 'pageCount' | 'page' | 'pixelsPerPaperMeter'
> & {
  readonly widthPx: number;
  readonly heightPx: number;
};

/**
 * What the worker writes about a sheet. Each step looks at the locked row first: a sheet that was cancelled
 * meanwhile stays cancelled, and a step told twice is done once.
 */
@Injectable()
export class SheetOutcomes {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(SheetsRepository) private readonly repository: SheetsRepository,
    @Inject(Queue) private readonly queue: Queue,
    @Inject(PlanSheets) private readonly plan: PlanSheets,
  ) {}

  /** The sheet to work at, or null when there is nothing to do for it. */
  async begin(companyId: string, id: string): Promise<SheetRow | null> {
    return this.database.transaction(async () => {
      if (!(await this.working(companyId, id))) return null;
      return this.repository.update(companyId, id, { status: 'processing', failure: null });
    });
  }

  async ready(companyId: string, id: string, made: Made): Promise<void> {
    await this.database.transaction(async () => {
      const row = await this.working(companyId, id);
      if (!row) {
        await this.discard(companyId, id);
        return;
      }
      const { widthPx, heightPx, pixelsPerPaperMeter } = made;
      const order = await this.repository.readyOfJob(companyId, row.jobId);
      await this.repository.update(companyId, id, {
        ...made,
        status: 'ready',
        failure: null,
        originalKey: null,
        readyAt: new Date(),
      });
      await this.plan.place(companyId, row.jobId, {
        kind: 'sheet',
        id,
        name: row.name,
        order,
        widthPx,
        heightPx,
        view: row.view,
        pixelsPerPaperMeter,
        references: [],
        groundMetersPerPaperMeter: null,
        whiteLux: null,
      });
      if (row.originalKey) await this.queue.send('storage.delete', { prefix: row.originalKey });
      if (row.pageCount) await this.queue.send('storage.delete', { prefix: pagesPrefix(companyId, id) });
    });
  }

  async choosePage(companyId: string, id: string, pageCount: number): Promise<void> {
    await this.database.transaction(async () => {
      if (await this.working(companyId, id))
        await this.repository.update(companyId, id, { status: 'choose-page', pageCount });
      else await this.discard(companyId, id);
    });
  }

  /** A page that can't be used leaves the others to choose from; a file that can't be used is deleted. */
  async failed(companyId: string, id: string, { message, passing }: DecodeRefusal): Promise<void> {
    await this.database.transaction(async () => {
      const row = await this.working(companyId, id);
      if (!row) return;
      if (!passing && row.pageCount !== null) {
        await this.repository.update(companyId, id, { status: 'choose-page', page: null, failure: message });
        return;
      }
      const originalKey = passing ? row.originalKey : null;
      await this.repository.update(companyId, id, { status: 'failed', failure: message, originalKey });
      if (row.originalKey && !passing) await this.queue.send('storage.delete', { prefix: row.originalKey });
    });
  }

  private async working(companyId: string, id: string): Promise<SheetRow | null> {
    const row = await this.repository.lock(companyId, id);
    const waiting = row?.status === 'uploaded' || row?.status === 'processing';
    return row && row.archivedAt === null && waiting ? row : null;
  }

  /** Deletes what was stored for a sheet that is no longer wanted. One that was ready keeps its image. */
  private async discard(companyId: string, id: string): Promise<void> {
    const row = await this.repository.find(companyId, id);
    if (row === null || (row.archivedAt !== null && row.status !== 'ready'))
      await this.queue.send('storage.delete', { prefix: sheetPrefix(companyId, id) });
  }
}
