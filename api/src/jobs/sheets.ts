import { randomUUID } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdtemp, rm, stat } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import { setTimeout as sleep } from 'node:timers/promises';
import {
  Inject,
  Injectable,
  Logger,
  type OnApplicationBootstrap,
  type OnModuleDestroy,
} from '@nestjs/common';
import { DecodeAborted, Decoder } from '../media/decoder.js';
import { judgeFile } from '../media/file-kind.js';
import { type Decoded, DecodeRefusal } from '../media/task.js';
import { imageKey, originalKey, pageKey, thumbnailKey } from '../modules/sheets/sheet-keys.js';
import { SheetOutcomes } from '../modules/sheets/sheet-outcomes.js';
import { type SheetRow, SheetsRepository } from '../modules/sheets/sheets.repository.js';
import { Queue } from '../ports/queue/queue.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

interface SheetName {
  readonly companyId: string;
  readonly sheetId: string;
}

/** Waits before another attempt when something of ours fails: storage, the database, the child itself. */
const PAUSES_MS = [1000, 4000];
const LOOK_FOR_CANCEL_MS = 500;

/** Makes the stored image of an uploaded file, and puts the sheet into the plan. */
@Injectable()
export class ProcessSheet implements JobHandler<'sheet.process'>, OnApplicationBootstrap, OnModuleDestroy {
  readonly queue = 'sheet.process';
  private readonly logger = new Logger('sheets');
  private readonly shutdown = new AbortController();

  constructor(
    @Inject(Queue) private readonly jobs: Queue,
    @Inject(SheetsRepository) private readonly repository: SheetsRepository,
    @Inject(SheetOutcomes) private readonly outcomes: SheetOutcomes,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(Decoder) private readonly decoder: Decoder,
  ) {}

  /** What a worker that was killed left half done is taken up again, without waiting for its job to expire. */
  async onApplicationBootstrap(): Promise<void> {
    for (const sheet of await this.repository.unfinishedOfAllCompanies())
      await this.jobs.send('sheet.process', sheet);
  }

  onModuleDestroy(): void {
    this.shutdown.abort();
  }

  /** Does nothing for a sheet that another worker is at, or that needs no work. */
  async handle(sheet: SheetName): Promise<void> {
    await this.repository.alone(sheet.sheetId, () => this.withPatience(sheet));
  }

  private async withPatience(sheet: SheetName): Promise<void> {
    for (let attempt = 0; ; attempt += 1) {
      try {
        await this.attempt(sheet);
        return;
      } catch (error) {
        if (this.shutdown.signal.aborted) throw error;
        const { name, stack } = error instanceof Error ? error : new Error('unknown');
        // The message may hold parameters of a statement.
        const where = stack?.split('\n').filter((line) => line.trimStart().startsWith('at '));
        this.logger.warn({ sheetId: sheet.sheetId, attempt, name, where }, 'a sheet was not made');
        const pause = PAUSES_MS[attempt];
        if (pause === undefined) {
          await this.outcomes.failed(sheet.companyId, sheet.sheetId, ourFault());
          return;
        }
        await sleep(pause, undefined, { signal: this.shutdown.signal });
      }
    }
  }

  private async attempt({ companyId, sheetId }: SheetName): Promise<void> {
    const row = await this.outcomes.begin(companyId, sheetId);
    if (!row) return;
    const folder = await mkdtemp(join(tmpdir(), 'lampwright-sheet-'));
    const cancel = new AbortController();
    const signal = AbortSignal.any([cancel.signal, this.shutdown.signal]);
    const look = setInterval(async () => {
      const present = await this.repository.find(companyId, sheetId).catch(() => row);
      if (!present || present.archivedAt !== null) cancel.abort();
    }, LOOK_FOR_CANCEL_MS);
    try {
      await this.make(row, folder, signal);
    } catch (error) {
      if (error instanceof DecodeRefusal) await this.outcomes.failed(companyId, sheetId, error);
      else if (!(error instanceof DecodeAborted && cancel.signal.aborted)) throw error;
    } finally {
      clearInterval(look);
      await rm(folder, { recursive: true, force: true });
    }
  }

  private async make(row: SheetRow, folder: string, signal: AbortSignal): Promise<void> {
    const input = join(folder, 'input');
    await this.fetchOriginal(row, input);
    const kind = await judgeFile(input, (await stat(input)).size);
    if (typeof kind === 'object') throw new DecodeRefusal(kind.code, kind.message);
    if (kind === 'image') {
      const drawing = row.view === 'plan';
      await this.keep(row, await this.decoder.run({ kind: 'image', input, folder, drawing }, signal), null);
      return;
    }
    const page = row.page ?? (await this.onlyPage(row, input, folder, signal));
    if (page === null) return;
    await this.keep(row, await this.decoder.run({ kind: 'pdf-page', input, folder, page }, signal), page);
  }

  /** The page of a document that has one; otherwise offers its pages to choose from, and gives null. */
  private async onlyPage(
    row: SheetRow,
    input: string,
    folder: string,
    signal: AbortSignal,
  ): Promise<number | null> {
    const found = await this.decoder.run({ kind: 'pdf-inspect', input, folder }, signal);
    if (found.pageCount === 1) return 1;
    for (const { page, file } of found.previews)
      await this.storage.put(pageKey(row.companyId, row.id, page), createReadStream(file), 'image/jpeg');
    await this.outcomes.choosePage(row.companyId, row.id, found.pageCount);
    return null;
  }

  private async keep(
    row: SheetRow,
    made: Decoded<'image'> | Decoded<'pdf-page'>,
    page: number | null,
  ): Promise<void> {
    const attempt = randomUUID();
    const image = imageKey(row.companyId, row.id, attempt);
    const thumbnail = thumbnailKey(row.companyId, row.id, attempt);
    await this.storage.put(image, createReadStream(made.image), made.imageType);
    await this.storage.put(thumbnail, createReadStream(made.thumbnail), 'image/jpeg');
    await this.outcomes.ready(row.companyId, row.id, {
      imageKey: image,
      thumbnailKey: thumbnail,
      imageType: made.imageType,
      widthPx: made.widthPx,
      heightPx: made.heightPx,
      pageCount: page === null ? null : (row.pageCount ?? 1),
      page,
      pixelsPerPaperMeter: made.kind === 'pdf-page' ? made.pixelsPerPaperMeter : null,
    });
  }

  private async fetchOriginal(row: SheetRow, path: string): Promise<void> {
    const original = await this.storage.get(row.originalKey ?? originalKey(row.companyId, row.id));
    if (!original)
      throw new DecodeRefusal('file-gone', 'The uploaded file is no longer there. Please upload it again.');
    await pipeline(original.stream, createWriteStream(path));
  }
}

const ourFault = () =>
  new DecodeRefusal(
    'our-fault',
    'Something went wrong on our side while this file was read. The file is kept; please try again.',
    true,
  );
