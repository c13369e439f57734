import { Inject, Injectable } from '@nestjs/common';
import { type JobStage, jobStages } from '../jobs/jobs.dto.js';
import { type EventActor, JobEvents } from '../timeline/job-events.repository.js';
import {
  type ApprovalRow,
  type DeclineRow,
  ProposalsRepository,
  type RevisionFactsRow,
  type RevisionRow,
} from './proposals.repository.js';
import { type RevisionDocument, revisionDocumentSchema } from './revision-document.js';

export interface ShownRevision {
  readonly row: RevisionRow;
  readonly document: RevisionDocument;
}

export interface ApprovedRevision extends ShownRevision {
  readonly approval: ApprovalRow;
}

/** What others need of proposals: the homeowner's page, approvals, payments and the worker. */
@Injectable()
export class ProposalStore {
  constructor(
    @Inject(ProposalsRepository) private readonly repository: ProposalsRepository,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  /** The newest revision that was sent and not withdrawn; null where there is none. */
  async newestShown(companyId: string, proposalId: string): Promise<ShownRevision | null> {
    const row = await this.repository.newestSent(companyId, proposalId);
    return row && shownOf(row);
  }

  async revision(companyId: string, revisionId: string): Promise<ShownRevision | null> {
    const row = await this.repository.revision(companyId, revisionId);
    return row && shownOf(row);
  }

  /** As `revision`, held until the running transaction ends. */
  async lockRevision(companyId: string, revisionId: string): Promise<ShownRevision | null> {
    const row = await this.repository.lockRevision(companyId, revisionId);
    return row && shownOf(row);
  }

  /** The revision approved last; null before any was. */
  async approved(companyId: string, proposalId: string): Promise<ApprovedRevision | null> {
    const [approval] = await this.repository.approvals(companyId, [proposalId]);
    if (!approval) return null;
    const shown = await this.revision(companyId, approval.revisionId);
    return shown && { ...shown, approval };
  }

  /**
   * What was approved after a revision was frozen, so that the revision tells its changes against something else,
   * or against nothing; null where it was not overtaken.
   */
  async approvedSince(row: RevisionFactsRow): Promise<ApprovedRevision | null> {
    const approved = await this.approved(row.companyId, row.proposalId);
    const known = approved === null || [row.id, row.changesRevisionId].includes(approved.row.id);
    return known ? null : approved;
  }

  /** The approval of one revision. */
  async approvalOf(row: RevisionFactsRow): Promise<ApprovalRow | null> {
    const all = await this.repository.approvals(row.companyId, [row.proposalId]);
    return all.find(({ revisionId }) => revisionId === row.id) ?? null;
  }

  async declineOf(row: RevisionFactsRow): Promise<DeclineRow | null> {
    const all = await this.repository.declines(row.companyId, [row.proposalId]);
    return all.find(({ revisionId }) => revisionId === row.id) ?? null;
  }

  /** Moves the job on to a stage unless it is there or beyond, and tells its timeline. */
  async moveJobOn(
    key: { readonly companyId: string; readonly jobId: string },
    to: JobStage,
    actor: EventActor,
  ): Promise<void> {
    const before = jobStages.slice(0, jobStages.indexOf(to));
    const from = await this.repository.moveStage(key.companyId, key.jobId, before, to);
    if (from !== null) await this.events.note(key, 'stage-changed', { from, to }, actor);
  }
}

/** The stored bytes are what was hashed: they are parsed, never written anew. */
const shownOf = (row: RevisionRow): ShownRevision => ({
  row,
  document: revisionDocumentSchema.parse(JSON.parse(row.document)),
});

/** Until the end of the day, in UTC. */
export const isExpired = ({ validUntil }: Pick<RevisionRow, 'validUntil'>, now: Date): boolean =>
  now.getTime() >= validUntil.getTime() + 24 * 3_600_000;

/** Object keys of a sheet's picture by sheet id. */
export function picturesOf({ pictures }: Pick<RevisionRow, 'pictures'>): ReadonlyMap<string, string> {
  const entries = Object.entries(pictures as Record<string, unknown>);
  return new Map(entries.flatMap(([id, key]) => (typeof key === 'string' ? [[id, key] as const] : [])));
}
