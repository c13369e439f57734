import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { notFound } from '../../http/app-error.js';
import type { StoredFile } from '../../http/send-file.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { pageKey } from './sheet-keys.js';
import { type SheetRow, SheetsRepository } from './sheets.repository.js';

/** The files of sheets, for those who may see the job they belong to. */
@Injectable()
export class SheetFilesService {
  constructor(
    @Inject(SheetsRepository) private readonly repository: SheetsRepository,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
  ) {}

  async image(actor: Actor, id: string): Promise<StoredFile> {
    return this.file((await this.row(actor, id)).imageKey);
  }

  async thumbnail(actor: Actor, id: string): Promise<StoredFile> {
    return this.file((await this.row(actor, id)).thumbnailKey);
  }

  /** A small picture of a page that may be chosen. */
  async pagePreview(actor: Actor, id: string, page: number): Promise<StoredFile> {
    const row = await this.row(actor, id);
    const offered = row.status === 'choose-page' && page <= (row.pageCount ?? 0);
    return this.file(offered ? pageKey(actor.companyId, id, page) : null);
  }

  /** Archived sheets too: earlier versions of the plan show them. */
  private async row(actor: Actor, id: string): Promise<SheetRow> {
    demand(actor, 'sheets.read');
    const row = await this.repository.find(actor.companyId, id);
    if (!row) throw notFound('This sheet');
    return row;
  }

  private file(key: string | null): StoredFile {
    if (key === null) throw notFound('This picture');
    return {
      // An object is never overwritten: its key names its content.
      etag: `"${key.split('/').slice(2).join('-')}"`,
      open: async () => {
        const found = await this.storage.get(key);
        if (!found) throw notFound('This picture');
        return found;
      },
    };
  }
}
