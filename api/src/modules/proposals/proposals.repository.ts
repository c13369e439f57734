import { Inject, Injectable } from '@nestjs/common';
import { and, asc, desc, eq, getTableColumns, inArray, isNotNull, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import {
  approvals,
  declines,
  jobs,
  proposalLinks,
  proposalRevisions,
  proposals,
  questions,
  users,
} from '../../database/schema/index.js';

export type ProposalRow = typeof proposals.$inferSelect;
export type RevisionRow = typeof proposalRevisions.$inferSelect;
export type NewRevision = typeof proposalRevisions.$inferInsert;
export type RevisionEdit = Partial<
  Pick<
    RevisionRow,
    | 'status'
    | 'progress'
    | 'failure'
    | 'pdfKey'
    | 'pdfHash'
    | 'pictures'
    | 'sendTo'
    | 'sentAt'
    | 'withdrawnAt'
    | 'releasedAt'
    | 'releasedBy'
  >
>;
/** A revision without its document, which may be large. */
export type RevisionFactsRow = Omit<RevisionRow, 'document'>;
export type LinkRow = typeof proposalLinks.$inferSelect;
export type ApprovalRow = typeof approvals.$inferSelect;
export type DeclineRow = typeof declines.$inferSelect;

const { document: _, ...factColumns } = getTableColumns(proposalRevisions);

/** Proposals with their revisions and links; every question names the company. */
@Injectable()
export class ProposalsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  async ofJob(companyId: string, jobId: string): Promise<ProposalRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.jobId, jobId)));
    return row ?? null;
  }

  async find(companyId: string, proposalId: string): Promise<ProposalRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.id, proposalId)));
    return row ?? null;
  }

  /** Keeps others from making the proposal of this job, or a revision of it, until the transaction ends. */
  async lockJob(companyId: string, jobId: string): Promise<{ archivedAt: Date | null } | null> {
    const [row] = await this.queries
      .select({ archivedAt: jobs.archivedAt })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)))
      .for('update');
    return row ?? null;
  }

  async jobExists(companyId: string, jobId: string): Promise<boolean> {
    const rows = await this.queries
      .select({ id: jobs.id })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    return rows.length > 0;
  }

  async insert(values: typeof proposals.$inferInsert): Promise<ProposalRow> {
    const [row] = await this.queries.insert(proposals).values(values).returning();
    return row!;
  }

  async setTexts(companyId: string, proposalId: string, texts: unknown): Promise<void> {
    await this.queries
      .update(proposals)
      .set({ texts })
      .where(and(eq(proposals.companyId, companyId), eq(proposals.id, proposalId)));
  }

  /** Of these proposals, newest first, with the name of whoever made each. */
  async revisions(
    companyId: string,
    proposalIds: readonly string[],
  ): Promise<(RevisionFactsRow & { by: string | null })[]> {
    if (proposalIds.length === 0) return [];
    return this.queries
      .select({ ...factColumns, by: users.name })
      .from(proposalRevisions)
      .leftJoin(users, eq(users.id, proposalRevisions.createdBy))
      .where(
        and(
          eq(proposalRevisions.companyId, companyId),
          inArray(proposalRevisions.proposalId, [...proposalIds]),
        ),
      )
      .orderBy(desc(proposalRevisions.revision));
  }

  async revision(companyId: string, revisionId: string): Promise<RevisionRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposalRevisions)
      .where(and(eq(proposalRevisions.companyId, companyId), eq(proposalRevisions.id, revisionId)));
    return row ?? null;
  }

  /** Held until the transaction ends, so that it is approved, declined, sent or withdrawn by one at a time. */
  async lockRevision(companyId: string, revisionId: string): Promise<RevisionRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposalRevisions)
      .where(and(eq(proposalRevisions.companyId, companyId), eq(proposalRevisions.id, revisionId)))
      .for('update');
    return row ?? null;
  }

  /** The newest that was sent and not withdrawn: what the homeowner sees. */
  async newestSent(companyId: string, proposalId: string): Promise<RevisionRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposalRevisions)
      .where(
        and(
          eq(proposalRevisions.companyId, companyId),
          eq(proposalRevisions.proposalId, proposalId),
          isNotNull(proposalRevisions.sentAt),
          isNull(proposalRevisions.withdrawnAt),
        ),
      )
      .orderBy(desc(proposalRevisions.revision))
      .limit(1);
    return row ?? null;
  }

  async insertRevision(values: NewRevision): Promise<RevisionRow> {
    const [row] = await this.queries.insert(proposalRevisions).values(values).returning();
    return row!;
  }

  async updateRevision(companyId: string, revisionId: string, edit: RevisionEdit): Promise<RevisionRow> {
    const [row] = await this.queries
      .update(proposalRevisions)
      .set(edit)
      .where(and(eq(proposalRevisions.companyId, companyId), eq(proposalRevisions.id, revisionId)))
      .returning();
    return row!;
  }

  async approvals(companyId: string, proposalIds: readonly string[]): Promise<ApprovalRow[]> {
    if (proposalIds.length === 0) return [];
    return this.queries
      .select()
      .from(approvals)
      .where(and(eq(approvals.companyId, companyId), inArray(approvals.proposalId, [...proposalIds])))
      .orderBy(desc(approvals.approvedAt));
  }

  async declines(companyId: string, proposalIds: readonly string[]): Promise<DeclineRow[]> {
    if (proposalIds.length === 0) return [];
    return this.queries
      .select()
      .from(declines)
      .where(and(eq(declines.companyId, companyId), inArray(declines.proposalId, [...proposalIds])));
  }

  async links(companyId: string, proposalIds: readonly string[]): Promise<LinkRow[]> {
    if (proposalIds.length === 0) return [];
    return this.queries
      .select()
      .from(proposalLinks)
      .where(and(eq(proposalLinks.companyId, companyId), inArray(proposalLinks.proposalId, [...proposalIds])))
      .orderBy(asc(proposalLinks.createdAt), asc(proposalLinks.id));
  }

  async link(companyId: string, linkId: string): Promise<LinkRow | null> {
    const [row] = await this.queries
      .select()
      .from(proposalLinks)
      .where(and(eq(proposalLinks.companyId, companyId), eq(proposalLinks.id, linkId)));
    return row ?? null;
  }

  async insertLink(values: typeof proposalLinks.$inferInsert): Promise<LinkRow> {
    const [row] = await this.queries.insert(proposalLinks).values(values).returning();
    return row!;
  }

  async updateLink(
    companyId: string,
    linkId: string,
    edit: Partial<Pick<LinkRow, 'name' | 'expiresAt' | 'revokedAt' | 'remindersSent' | 'lastMailAt'>>,
  ): Promise<LinkRow> {
    const [row] = await this.queries
      .update(proposalLinks)
      .set(edit)
      .where(and(eq(proposalLinks.companyId, companyId), eq(proposalLinks.id, linkId)))
      .returning();
    return row!;
  }

  /** Revisions that the homeowner asked something about. */
  async commented(companyId: string, proposalIds: readonly string[]): Promise<Set<string>> {
    if (proposalIds.length === 0) return new Set();
    const rows = await this.queries
      .selectDistinct({ revisionId: questions.revisionId })
      .from(questions)
      .where(and(eq(questions.companyId, companyId), inArray(questions.proposalId, [...proposalIds])));
    return new Set(rows.map(({ revisionId }) => revisionId));
  }

  /** Moves a job on to a stage if it is at one of those before it. */
  async moveStage(
    companyId: string,
    jobId: string,
    from: readonly (typeof jobs.$inferSelect)['stage'][],
    to: (typeof jobs.$inferSelect)['stage'],
  ): Promise<(typeof jobs.$inferSelect)['stage'] | null> {
    const [before] = await this.queries
      .select({ stage: jobs.stage })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId), inArray(jobs.stage, [...from])))
      .for('update');
    if (!before) return null;
    await this.queries
      .update(jobs)
      .set({ stage: to, updatedAt: sql`now()` })
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    return before.stage;
  }
}
