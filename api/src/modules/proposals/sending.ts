import { Inject, Injectable } from '@nestjs/common';
import { z } from 'zod';
import { Database } from '../../database/database.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { Queue } from '../../ports/queue/queue.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { CompanyTexts } from './company-texts.js';
import { proposalLetter } from './letters.js';
import { ProposalLinks } from './links.js';
import { ProposalStore } from './proposal-store.js';
import { sendSchema } from './proposals.dto.js';
import { type ProposalRow, ProposalsRepository } from './proposals.repository.js';

/** What a revision keeps until its PDF is there. */
export const sendToSchema = sendSchema.extend({ byId: z.string(), byName: z.string() });
export type SendTo = z.infer<typeof sendToSchema>;

/** Sends a revision whose PDF is ready to homeowners: links, letters, reminders, timeline. */
@Injectable()
export class Sending {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ProposalLinks) private readonly links: ProposalLinks,
    @Inject(CompanyTexts) private readonly texts: CompanyTexts,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Outbox) private readonly outbox: Outbox,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /**
   * In one transaction: everybody gets the mail, or nobody. A revision that was overtaken by an approval while its
   * PDF was made goes to nobody, and stays ready.
   */
  async send(proposal: ProposalRow, revisionId: string, to: SendTo): Promise<void> {
    const { companyId, jobId } = proposal;
    await this.database.transaction(async () => {
      // Before the revision, as whoever answers holds them.
      await this.repository.lockJob(companyId, jobId);
      const shown = await this.store.lockRevision(companyId, revisionId);
      if (!shown || shown.row.pdfKey === null || shown.row.withdrawnAt !== null) return;
      const { row, document } = shown;
      if (await this.store.approvedSince(row)) {
        await this.repository.updateRevision(companyId, revisionId, { sendTo: null });
        return;
      }
      const reminderDays = (await this.texts.inForce(companyId))?.texts.reminderDays ?? [];
      const now = new Date();
      for (const recipient of to.recipients) {
        const { link, mailedAt } = await this.links.forRecipient(row, recipient, to.byId, now);
        const mail = { document, link: this.links.urlOf(link), pdfKey: shown.row.pdfKey };
        await this.outbox.post(companyId, recipient.email, proposalLetter(mail, to.message));
        // Sent once more, it is reminded of as it was the first time.
        if (row.sentAt !== null && mailedAt !== null && mailedAt >= row.sentAt) continue;
        for (const days of reminderDays)
          await this.queue.send(
            'proposal.remind',
            { companyId, linkId: link.id, revisionId },
            { startAfterSeconds: days * 86_400 },
          );
      }
      await this.repository.updateRevision(companyId, revisionId, {
        sentAt: row.sentAt ?? now,
        sendTo: null,
      });
      const actor = { id: to.byId, name: to.byName };
      const sent = to.recipients.map(({ name, email }) => name || email);
      const { revision, totalMinor } = row;
      const key = { companyId, jobId };
      await this.events.note(key, 'proposal-sent', { revision, to: sent, amountMinor: totalMinor }, actor);
      await this.store.moveJobOn(key, 'propose', actor);
    });
  }
}
