import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { type AppError, conflict, notFound } from '../../http/app-error.js';
import { Queue } from '../../ports/queue/queue.js';
import { Dues } from '../payments/dues.js';
import { isExpired, ProposalStore, type ShownRevision } from '../proposals/proposal-store.js';
import type { ShownCombination } from '../proposals/revision-document.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { CompanyMail } from './company-mail.js';
import type { GuestCaller } from './guest-caller.js';
import { declinedLetter } from './letters.js';
import { sentencesOf } from './sentences.js';
import type { Approve, Decline } from './share.dto.js';
import { ShareRepository } from './share.repository.js';
import { jobProposalUrl } from './share-addresses.js';

/** A homeowner's yes or no to a revision, within the transaction of the request. */
@Injectable()
export class Answers {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(ShareRepository) private readonly repository: ShareRepository,
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(Dues) private readonly dues: Dues,
    @Inject(CompanyMail) private readonly companyMail: CompanyMail,
    @Inject(JobEvents) private readonly events: JobEvents,
    @Inject(Queue) private readonly queue: Queue,
  ) {}

  /**
   * Keeps the evidence of a yes, opens what is owed by it, moves the job on and has the signed paper made.
   * @throws AppError 404 · 409 for whatever is not, or is not any more, what was on the screen
   */
  async approve(guest: Guest, input: Approve, caller: GuestCaller): Promise<void> {
    const { companyId, proposalId, jobId, linkId } = guest;
    const shown = await this.held(guest, input.revisionId);
    const { row, document } = shown;
    if (await this.store.approvalOf(row)) throw alreadyApproved();
    if (await this.store.declineOf(row))
      throw conflict(
        'declined',
        'This was declined. If you have thought again, ask the company for a new proposal.',
      );
    await this.demandNewest(shown);
    if (isExpired(row, new Date()))
      throw conflict(
        'expired',
        'This proposal was valid until a day that is past. Ask the company to send it again.',
      );
    if (input.hash !== row.hash)
      throw conflict('other-content', 'This is not what the company has sent. Please load the page again.');
    if (row.pdfHash === null)
      throw conflict(
        'not-ready',
        'The paper of this proposal is still being made. Please try again shortly.',
      );
    const combination = combinationOf(shown, input);
    const before = await this.store.approved(companyId, proposalId);
    const sentences = sentencesOf(document);
    const approval = await this.repository.insertApproval({
      companyId,
      proposalId,
      revisionId: row.id,
      linkId,
      groups: combination.groups,
      totalMinor: combination.totalMinor,
      typedName: input.typedName,
      agreedTo: sentences.approval,
      consentedTo: sentences.consent,
      address: caller.address,
      userAgent: caller.userAgent,
      revisionHash: row.hash,
      pdfHash: row.pdfHash,
      approvedAt: new Date(),
    });
    await this.dues.openFor({
      companyId,
      proposalId,
      approvalId: approval.id,
      currency: document.currency,
      totalMinor: combination.totalMinor,
      stages: combination.stages,
      before: before && { totalMinor: before.approval.totalMinor, revision: before.row.revision },
      revision: row.revision,
    });
    const key = { companyId, jobId };
    const actor = { id: null, name: input.typedName };
    await this.events.note(
      key,
      'approved',
      { revision: row.revision, amountMinor: combination.totalMinor },
      actor,
    );
    if (!before) await this.store.moveJobOn(key, 'prepare', actor);
    await this.queue.send('approval.sign', { companyId, approvalId: approval.id });
  }

  /** @throws AppError 404 · 409 where it was answered already, or is not the newest any more */
  async decline(guest: Guest, { revisionId, reason }: Decline): Promise<void> {
    const { companyId, proposalId, jobId, linkId, email } = guest;
    const shown = await this.held(guest, revisionId);
    const { row, document } = shown;
    if (await this.store.approvalOf(row)) throw alreadyApproved();
    if (await this.store.declineOf(row)) throw conflict('declined', 'This was declined already.');
    await this.demandNewest(shown);
    await this.repository.insertDecline({ companyId, proposalId, revisionId, linkId, reason });
    const name = guest.name || 'The homeowner';
    const { revision } = row;
    await this.events.note({ companyId, jobId }, 'declined', { revision, reason }, { id: null, name });
    const said = { document, name, email, url: jobProposalUrl(this.env.PUBLIC_URL, jobId) };
    await this.companyMail.post(row, declinedLetter(said, reason));
  }

  /**
   * The revision, held with its job and proposal in the order in which the company's side holds them. Revisions
   * that were never sent don't exist for a guest.
   */
  private async held({ companyId, proposalId, jobId }: Guest, revisionId: string): Promise<ShownRevision> {
    const known = await this.store.revision(companyId, revisionId);
    if (known?.row.proposalId !== proposalId || known.row.sentAt === null) throw notFound('This revision');
    await this.repository.holdJob(companyId, jobId);
    const shown = await this.store.lockRevision(companyId, revisionId);
    await this.repository.holdProposal(companyId, proposalId);
    if (!shown) throw notFound('This revision');
    return shown;
  }

  private async demandNewest({ row }: ShownRevision): Promise<void> {
    if (row.withdrawnAt !== null)
      throw conflict('withdrawn', 'The company has taken this proposal back. Please ask it for a new one.');
    const newest = await this.store.newestShown(row.companyId, row.proposalId);
    if (newest?.row.id !== row.id)
      throw conflict(
        'changed-since',
        'The company has sent a newer revision since you opened this one. Please look at that one.',
      );
  }
}

const alreadyApproved = (): AppError => conflict('already-approved', 'This is approved already. Thank you.');

/** The combination that was on the screen, if it is offered at the sum that was on the screen. */
function combinationOf({ document }: ShownRevision, input: Approve): ShownCombination {
  const { groups, combinations } = document.price;
  const known = new Set(groups.map(({ id }) => id));
  const wanted = new Set(input.groups);
  const found = combinations.find(
    (one) => one.groups.length === wanted.size && one.groups.every((id) => wanted.has(id)),
  );
  if (input.groups.some((id) => !known.has(id)) || wanted.size !== input.groups.length || !found)
    throw conflict('unknown-groups', 'These parts are not offered. Please load the page and choose again.');
  if (!found.offerable) throw conflict('not-offered', found.reason);
  if (found.totalMinor !== input.totalMinor)
    throw conflict(
      'other-total',
      'The total on your screen is not that of these parts. Please load the page again.',
    );
  return found;
}
