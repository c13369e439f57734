import { Inject, Injectable } from '@nestjs/common';
import type { Guest } from '../../access/guest.js';
import { notFound } from '../../http/app-error.js';
import { isExpired, ProposalStore, type ShownRevision } from '../proposals/proposal-store.js';
import { ProposalsRepository } from '../proposals/proposals.repository.js';
import type { SharedPage } from './share.dto.js';

export interface Standing {
  readonly state: SharedPage['state'];
  readonly decline: SharedPage['decline'];
}

/** What a guest has before them: the newest revision that was sent to them. */
@Injectable()
export class ShownProposal {
  constructor(
    @Inject(ProposalStore) private readonly store: ProposalStore,
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
  ) {}

  /** The newest one sent; one that was withdrawn only where nothing else is left. */
  async of({ companyId, proposalId }: Guest): Promise<ShownRevision> {
    const shown = await this.store.newestShown(companyId, proposalId);
    if (shown) return shown;
    const all = await this.repository.revisions(companyId, [proposalId]);
    const withdrawn = all.find(({ sentAt }) => sentAt !== null);
    const last = withdrawn && (await this.store.revision(companyId, withdrawn.id));
    if (!last) throw notFound('This proposal');
    return last;
  }

  async standingOf({ row }: ShownRevision, now = new Date()): Promise<Standing> {
    if (await this.store.approvalOf(row)) return { state: 'approved', decline: null };
    const declined = await this.store.declineOf(row);
    if (declined)
      return {
        state: 'declined',
        decline: { reason: declined.reason, at: declined.createdAt.toISOString() },
      };
    if (row.withdrawnAt !== null) return { state: 'withdrawn', decline: null };
    return { state: isExpired(row, now) ? 'expired' : 'open', decline: null };
  }
}
