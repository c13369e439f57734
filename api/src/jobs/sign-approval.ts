import { createHash } from 'node:crypto';
import { buffer } from 'node:stream/consumers';
import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { Database } from '../database/database.js';
import { paperName } from '../modules/proposals/letters.js';
import { ProposalLinks } from '../modules/proposals/links.js';
import { NightPictures } from '../modules/proposals/night-pictures.js';
import { ProposalStore, picturesOf, type ShownRevision } from '../modules/proposals/proposal-store.js';
import { ProposalsRepository } from '../modules/proposals/proposals.repository.js';
import { CompanyMail } from '../modules/share/company-mail.js';
import { approvedLetter, copyLetter } from '../modules/share/letters.js';
import { ShareRepository, type SignedApproval } from '../modules/share/share.repository.js';
import { jobProposalUrl } from '../modules/share/share-addresses.js';
import { proposalPdf } from '../paper/proposal-pdf.js';
import type { SignatureEvidence } from '../paper/signature.js';
import { Outbox } from '../ports/mail/outbox.js';
import type { QueuePayloads } from '../ports/queue/queues.js';
import { ObjectStorage } from '../ports/storage/storage.js';
import type { JobHandler } from './job-handler.js';

/** Makes the signed PDF of an approval, and mails it to both sides, once. */
@Injectable()
export class SignApproval implements JobHandler<'approval.sign'> {
  readonly queue = 'approval.sign';

  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(ShareRepository) private readonly repository: ShareRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ProposalsRepository) private readonly proposals: ProposalsRepository,
    @Inject(ProposalLinks) private readonly links: ProposalLinks,
    @Inject(CompanyMail) private readonly companyMail: CompanyMail,
    @Inject(NightPictures) private readonly nights: NightPictures,
    @Inject(ObjectStorage) private readonly storage: ObjectStorage,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async handle({ companyId, approvalId }: QueuePayloads['approval.sign']): Promise<void> {
    const approval = await this.repository.approval(companyId, approvalId);
    // The job or the company may be gone by now.
    if (!approval || approval.signedPdfKey !== null) return;
    const shown = await this.store.revision(companyId, approval.revisionId);
    if (!shown) return;
    const key = `${companyId}/proposals/${shown.row.id}/signed-${approvalId}.pdf`;
    let hash: string;
    try {
      const pdf = await this.paperOf(shown, approval);
      hash = createHash('sha256').update(pdf).digest('hex');
      // The same approval gives the same bytes: a try that died here is simply overwritten.
      await this.storage.put(key, pdf, 'application/pdf');
    } catch (error) {
      await this.repository.signingFailed(companyId, approvalId);
      throw error;
    }
    await this.database.transaction(async () => {
      // Of two tries at once the later waits here, and finds it done.
      if (await this.repository.keepSigned(companyId, approvalId, key, hash))
        await this.post(shown, approval, key);
    });
  }

  private async paperOf(shown: ShownRevision, approval: SignedApproval): Promise<Buffer> {
    const { row, document } = shown;
    const pictures = new Map<string, Buffer>();
    for (const [sheetId, key] of picturesOf(row)) {
      const stored = await this.storage.get(key);
      if (!stored) throw new Error(`The picture of sheet ${sheetId} is not in object storage.`);
      pictures.set(sheetId, await buffer(stored.stream));
    }
    const signature = evidenceOf(document, approval);
    const nights = await this.nights.asApproved(shown, pictures, signature.groups);
    return proposalPdf({ document, hash: row.hash, pictures, nights, signature });
  }

  private async post({ row, document }: ShownRevision, approval: SignedApproval, key: string): Promise<void> {
    const { companyId, linkId, proposalId, typedName, totalMinor } = approval;
    const link = await this.proposals.link(companyId, linkId);
    const proposal = await this.proposals.find(companyId, proposalId);
    if (!link || !proposal) throw new Error('An approval has lost the link or the proposal it is of.');
    const fileName = paperName(document).replace('proposal', 'approved');
    const attachment = { key, fileName, type: 'application/pdf' };
    const signed = { document, typedName, totalMinor, attachment };
    await this.outbox.post(companyId, link.email, copyLetter(signed, this.links.urlOf(link)));
    const url = jobProposalUrl(this.env.PUBLIC_URL, proposal.jobId);
    await this.companyMail.post(row, approvedLetter(signed, { email: link.email, url }));
  }
}

/** @throws Error when the revision does not hold the approved combination, which no approval can name */
function evidenceOf({ price }: ShownRevision['document'], approval: SignedApproval): SignatureEvidence {
  const groups = approval.groups as string[];
  const combination = price.combinations.find(
    (one) => one.groups.length === groups.length && one.groups.every((id) => groups.includes(id)),
  );
  if (!combination) throw new Error('An approval names groups that its revision does not offer.');
  const { offerable: _offerable, reason: _reason, ...totals } = combination;
  const { typedName, agreedTo, consentedTo, address, userAgent, revisionHash, pdfHash } = approval;
  return {
    typedName,
    agreedTo,
    consentedTo,
    approvedAt: approval.approvedAt.toISOString(),
    address,
    userAgent,
    revisionHash,
    pdfHash,
    groups,
    totals,
  };
}
