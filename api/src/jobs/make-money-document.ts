import { createHash } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../database/database.js';
import { AgreementsRepository } from '../modules/payments/agreements.repository.js';
import {
  type MoneyDocumentRow,
  MoneyDocumentsRepository,
} from '../modules/payments/money-documents.repository.js';
import { companyLetter, homeownerLetter, paperFileName } from '../modules/payments/money-letters.js';
import { moneyPdf } from '../paper/money-pdf.js';
import { Outbox } from '../ports/mail/outbox.js';
import { CardService } from '../ports/payments/card-service.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

/** Puts an invoice, a receipt or the note of a refund on paper, and mails it once. */
@Injectable()
export class MakeMoneyDocument implements JobHandler<'money-document.make'> {
  readonly queue = 'money-document.make';

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(MoneyDocumentsRepository) private readonly documents: MoneyDocumentsRepository,
    @Inject(AgreementsRepository) private readonly agreements: AgreementsRepository,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(Outbox) private readonly outbox: Outbox,
    @Inject(CardService) private readonly cards: CardService,
  ) {}

  async handle({ companyId, documentId }: QueuePayloads['money-document.make']): Promise<void> {
    const row = await this.documents.find(companyId, documentId);
    // The job or the company may be gone by now.
    if (!row || row.mailedAt !== null) return;
    const key = `${companyId}/money/${documentId}.pdf`;
    let hash: string;
    try {
      const pdf = await moneyPdf(row.content.paper);
      hash = createHash('sha256').update(pdf).digest('hex');
      await this.storage.put(key, pdf, 'application/pdf');
    } catch (error) {
      // Told as failed until another try makes it.
      await this.documents.update(companyId, documentId, { status: 'failed' });
      throw error;
    }
    await this.database.transaction(async () => {
      const now = await this.documents.lock(companyId, documentId);
      if (!now || now.mailedAt !== null) return;
      await this.documents.update(companyId, documentId, {
        status: 'ready',
        pdfKey: key,
        pdfHash: hash,
        mailedAt: new Date(),
      });
      await this.post(now, key);
    });
  }

  private async post(row: MoneyDocumentRow, key: string): Promise<void> {
    const { companyId, content } = row;
    const { paper } = content;
    const attachment = { key, fileName: paperFileName(paper), type: 'application/pdf' };
    const agreement = await this.agreements.newest(row);
    if (!agreement) throw new Error('There is a paper about money on a proposal that nobody approved.');
    const letter = homeownerLetter(paper, agreement.name, attachment, this.cards.offered);
    await this.outbox.post(companyId, agreement.email, letter);
    if (paper.kind === 'invoice') return;
    const own = paper.company.email;
    for (const to of own === '' ? await this.agreements.ownerEmails(companyId) : [own])
      await this.outbox.post(companyId, to, companyLetter(paper, attachment));
  }
}
