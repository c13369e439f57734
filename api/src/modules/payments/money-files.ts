import { Inject, Injectable } from '@nestjs/common';
import type { StoredFile } from '../../http/send-file.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import type { MoneyDocumentRow } from './money-documents.repository.js';
import { paperFileName } from './money-letters.js';

/** The PDFs of invoices, receipts and notes of refunds. */
@Injectable()
export class MoneyFiles {
  constructor(@Inject(ObjectStorage) private readonly storage: ObjectStorage) {}

  /** Null while it is not made yet. */
  of(row: MoneyDocumentRow): StoredFile | null {
    const { pdfKey, pdfHash } = row;
    if (pdfKey === null || pdfHash === null) return null;
    return {
      etag: `"${pdfHash}"`,
      name: paperFileName(row),
      open: async () => {
        const stored = await this.storage.get(pdfKey);
        if (!stored) throw new Error('The PDF of a paper about money is not in object storage.');
        return stored;
      },
    };
  }
}
