import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { parse } from 'node:path';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { Database } from '../../database/database.js';
import { AppError, conflict, notFound } from '../../http/app-error.js';
import { judgeFile } from '../../media/file-kind.js';
import { Queue } from '../../ports/queue/queue.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { PlanSheets } from './plan-sheets.js';
import { originalKey, sheetPrefix } from './sheet-keys.js';
import { sheetOf } from './sheet-view.js';
import type { Sheet, SheetList, SheetUpload } from './sheets.dto.js';
import { type SheetRow, SheetsRepository } from './sheets.repository.js';

const NAME_LENGTH = 120;

@Injectable()
export class SheetsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(SheetsRepository) private readonly repository: SheetsRepository,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(Queue) private readonly queue: Queue,
    @Inject(PlanSheets) private readonly plan: PlanSheets,
  ) {}

  async listOfJob(actor: Actor, jobId: string): Promise<SheetList> {
    demand(actor, 'sheets.read');
    if (!(await this.repository.jobState(actor.companyId, jobId))) throw notFound('This job');
    const rows = await this.repository.listOfJob(actor.companyId, jobId);
    return { items: rows.map(sheetOf) };
  }

  async get(actor: Actor, id: string): Promise<Sheet> {
    demand(actor, 'sheets.read');
    return sheetOf(live(await this.repository.find(actor.companyId, id)));
  }

  /** Stores the file as it came and leaves the rest to the worker. */
  async upload(actor: Actor, jobId: string, { file, view, name }: SheetUpload): Promise<Sheet> {
    demand(actor, 'sheets.edit');
    const { companyId, userId } = actor;
    const state = await this.repository.jobState(companyId, jobId);
    if (!state) throw notFound('This job');
    if (state === 'archived')
      throw conflict('job-archived', 'This job is archived. Restore it before adding a sheet.');
    const kind = await judgeFile(file.path, file.size);
    if (typeof kind === 'object') throw new AppError(415, kind.code, kind.message);
    if (kind === 'pdf' && view === 'photo')
      throw new AppError(415, 'pdf-is-no-photo', 'A PDF can be a plot plan, but not a yard photo.');

    const id = randomUUID();
    const key = originalKey(companyId, id);
    // The row comes last: a worker must never find a sheet whose file is not there yet.
    await this.storage.put(key, createReadStream(file.path), 'application/octet-stream');
    try {
      return await this.database.transaction(async () => {
        const row = await this.repository.insert(companyId, {
          id,
          jobId,
          name: name ?? nameFrom(file.originalname, view),
          view,
          originalKey: key,
          uploadedBy: userId,
        });
        await this.queue.send('sheet.process', { companyId, sheetId: id });
        return sheetOf(row);
      });
    } catch (error) {
      await this.queue.send('storage.delete', { prefix: sheetPrefix(companyId, id) });
      throw error;
    }
  }

  /** Takes one page of a document with several; choosing again before it is ready is allowed. */
  async choosePage(actor: Actor, id: string, page: number): Promise<Sheet> {
    demand(actor, 'sheets.edit');
    const { companyId } = actor;
    return this.database.transaction(async () => {
      const row = live(await this.repository.lock(companyId, id));
      if (row.status !== 'choose-page')
        throw conflict('page-not-asked', 'A page can be chosen only while the sheet waits for one.');
      if (page > (row.pageCount ?? 0))
        throw conflict('no-such-page', `This document has ${row.pageCount} pages.`);
      return this.queued(companyId, id, { page });
    });
  }

  /** Has the worker try again: after a failure, or when nothing seems to happen. */
  async retry(actor: Actor, id: string): Promise<Sheet> {
    demand(actor, 'sheets.edit');
    const { companyId } = actor;
    return this.database.transaction(async () => {
      const row = live(await this.repository.lock(companyId, id));
      if (row.status === 'ready' || row.status === 'choose-page')
        throw conflict('nothing-to-retry', 'There is nothing to try again: this sheet is in order.');
      if (row.originalKey === null)
        throw conflict('file-gone', 'The file itself could not be used. Please upload another one.');
      return this.queued(companyId, id, { failure: null });
    });
  }

  async rename(actor: Actor, id: string, name: string): Promise<Sheet> {
    demand(actor, 'sheets.edit');
    const { companyId } = actor;
    return this.database.transaction(async () => {
      const row = live(await this.repository.lock(companyId, id));
      if (row.status === 'ready') await this.plan.rename(companyId, row.jobId, id, name);
      return sheetOf(live(await this.repository.update(companyId, id, { name })));
    });
  }

  /**
   * Cancels a sheet that is not ready, and deletes its files. One that is ready is taken off the plan with
   * all that is drawn on it, but keeps its image: earlier versions of the plan still show it.
   */
  async remove(actor: Actor, id: string): Promise<void> {
    demand(actor, 'sheets.edit');
    const { companyId } = actor;
    await this.database.transaction(async () => {
      const row = live(await this.repository.lock(companyId, id));
      await this.repository.update(companyId, id, { archivedAt: new Date() });
      if (row.status === 'ready') await this.plan.remove(companyId, row.jobId, id);
      else await this.queue.send('storage.delete', { prefix: sheetPrefix(companyId, id) });
    });
  }

  private async queued(companyId: string, id: string, values: Partial<SheetRow>): Promise<Sheet> {
    const row = live(await this.repository.update(companyId, id, { ...values, status: 'uploaded' }));
    await this.queue.send('sheet.process', { companyId, sheetId: id });
    return sheetOf(row);
  }
}

function live(row: SheetRow | null): SheetRow {
  if (!row || row.archivedAt !== null) throw notFound('This sheet');
  return row;
}

/** The file's own name, for want of a better one. */
function nameFrom(fileName: string, view: SheetUpload['view']): string {
  const name = parse(fileName).name.trim().slice(0, NAME_LENGTH).trim();
  return name === '' ? (view === 'photo' ? 'Yard photo' : 'Plot plan') : name;
}
