import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../database/database.js';
import { reminderLetter } from '../modules/proposals/letters.js';
import { isLive, ProposalLinks } from '../modules/proposals/links.js';
import { isExpired, ProposalStore } from '../modules/proposals/proposal-store.js';
import { ProposalsRepository } from '../modules/proposals/proposals.repository.js';
import { JobEvents } from '../modules/timeline/job-events.repository.js';
import { Outbox } from '../ports/mail/outbox.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import type { JobHandler } from './job-handler.js';

/** Reminds a homeowner of a revision, unless it is answered, gone or followed by a newer one by now. */
@Injectable()
export class Remind implements JobHandler<'proposal.remind'> {
  readonly queue = 'proposal.remind';

  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ProposalLinks) private readonly links: ProposalLinks,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async handle({ companyId, linkId, revisionId }: QueuePayloads['proposal.remind']): Promise<void> {
    const now = new Date();
    await this.database.transaction(async () => {
      const shown = await this.store.lockRevision(companyId, revisionId);
      const link = await this.repository.link(companyId, linkId);
      if (!shown || !link || !isLive(link, now) || shown.row.pdfKey === null) return;
      const { row, document } = shown;
      const newest = await this.repository.newestSent(companyId, row.proposalId);
      const answered = (await this.store.approvalOf(row)) ?? (await this.store.declineOf(row));
      const proposal = await this.repository.find(companyId, row.proposalId);
      if (newest?.id !== revisionId || answered || isExpired(row, now) || !proposal) return;
      const mail = { document, link: this.links.urlOf(link), pdfKey: shown.row.pdfKey };
      await this.outbox.post(companyId, link.email, reminderLetter(mail));
      await this.repository.updateLink(companyId, linkId, {
        remindersSent: link.remindersSent + 1,
        lastMailAt: now,
      });
      const key = { companyId, jobId: proposal.jobId };
      await this.events.note(key, 'reminder-sent', { to: link.name || link.email }, null);
    });
  }
}
