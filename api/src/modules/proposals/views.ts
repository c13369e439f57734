import { Inject, Injectable } from '@nestjs/common';
import type { ProposalLink, ProposalState, Revision } from './proposals.dto.js';
import { type LinkRow, type ProposalRow, ProposalsRepository } from './proposals.repository.js';
import { type RevisionFacts, stateOf } from './state.js';

/** Revisions as the company's screens show them. */
@Injectable()
export class RevisionViews {
  constructor(@Inject(ProposalsRepository) private readonly repository: ProposalsRepository) {}

  /** Newest first. */
  async all({ companyId, id }: ProposalRow, jobId: string): Promise<Revision[]> {
    const facts = await this.factsOf(companyId, [id]);
    return facts.map((fact) => revisionOf(fact, jobId));
  }

  /** Where each of these proposals stands: a handful of questions to the database, however many they are. */
  async states(companyId: string, proposalIds: readonly string[]): Promise<Map<string, ProposalState>> {
    const byProposal = new Map<string, { state: ProposalState }[]>();
    for (const facts of await this.factsOf(companyId, proposalIds)) {
      const { proposalId } = facts.row;
      byProposal.set(proposalId, [...(byProposal.get(proposalId) ?? []), { state: stateOf(facts) }]);
    }
    return new Map(proposalIds.map((id) => [id, proposalStateOf(byProposal.get(id) ?? [])]));
  }

  private async factsOf(companyId: string, ids: readonly string[]): Promise<NamedFacts[]> {
    const rows = await this.repository.revisions(companyId, ids);
    const approvals = await this.repository.approvals(companyId, ids);
    const declines = await this.repository.declines(companyId, ids);
    const links = await this.repository.links(companyId, ids);
    const commented = await this.repository.commented(companyId, ids);
    const now = new Date();
    return rows.map((row) => ({
      row,
      by: row.by ?? '',
      approval: approvals.find(({ revisionId }) => revisionId === row.id) ?? null,
      decline: declines.find(({ revisionId }) => revisionId === row.id) ?? null,
      links: links.filter(({ proposalId }) => proposalId === row.proposalId),
      commented: commented.has(row.id),
      now,
    }));
  }

  async one(proposal: ProposalRow, jobId: string, revisionId: string): Promise<Revision> {
    const revision = (await this.all(proposal, jobId)).find(({ id }) => id === revisionId);
    if (!revision) throw new Error(`Revision ${revisionId} is not of proposal ${proposal.id}.`);
    return revision;
  }
}

interface NamedFacts extends RevisionFacts {
  /** Who made it. */
  readonly by: string;
}

function revisionOf(facts: NamedFacts, jobId: string): Revision {
  const { row, approval, decline, by } = facts;
  const path = `/api/jobs/${jobId}/proposal/revisions/${row.id}`;
  return {
    id: row.id,
    revision: row.revision,
    state: stateOf(facts),
    changeOrder: row.changesRevisionId !== null,
    planVersion: row.planVersion,
    hash: row.hash,
    totalMinor: row.totalMinor,
    progress: row.progress,
    failure: row.failure,
    pdfUrl: row.pdfKey === null ? null : `${path}/pdf`,
    validUntil: row.validUntil.toISOString().slice(0, 10),
    createdAt: row.createdAt.toISOString(),
    createdBy: by,
    sentAt: row.sentAt?.toISOString() ?? null,
    releasedAt: row.releasedAt?.toISOString() ?? null,
    approval: approval && {
      typedName: approval.typedName,
      at: approval.approvedAt.toISOString(),
      groups: approval.groups as string[],
      totalMinor: approval.totalMinor,
      signedPdfUrl: approval.signedPdfKey === null ? null : `${path}/signed-pdf`,
    },
    decline: decline && { reason: decline.reason, at: decline.createdAt.toISOString() },
  };
}

/** Where the whole proposal stands: where its newest revision does, and what is approved before all. */
export function proposalStateOf(revisions: readonly { readonly state: ProposalState }[]): ProposalState {
  const [newest] = revisions;
  if (!newest) return 'draft';
  // A revision that nobody was sent yet does not take the approval of an earlier one away.
  const unsent = newest.state === 'preparing' || newest.state === 'ready' || newest.state === 'withdrawn';
  if (unsent && revisions.some(({ state }) => state === 'approved')) return 'approved';
  return newest.state;
}

export const linkOf = (row: LinkRow): ProposalLink => ({
  id: row.id,
  name: row.name,
  email: row.email,
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt.toISOString(),
  revokedAt: row.revokedAt?.toISOString() ?? null,
  openedAt: row.openedAt?.toISOString() ?? null,
  remindersSent: row.remindersSent,
});
