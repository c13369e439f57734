import { Inject, Injectable } from '@nestjs/common';
import { and, desc, eq, isNull } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import {
  approvals,
  declines,
  jobs,
  memberships,
  proposalLinks,
  proposals,
  users,
} from '../../database/schema/index.js';

export type NewApproval = typeof approvals.$inferInsert;
export type SignedApproval = typeof approvals.$inferSelect;

/** What homeowners write by their links; every question names the company. */
@Injectable()
export class ShareRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  /**
   * Holds a job against its own members' work on the proposal until the transaction ends. Weaker than they hold
   * it: rows that only refer to the job go on being written.
   */
  async holdJob(companyId: string, jobId: string): Promise<void> {
    await this.queries
      .select({ id: jobs.id })
      .from(jobs)
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)))
      .for('no key update');
  }

  /** One answer of a proposal at a time, whichever revision it is about. */
  async holdProposal(companyId: string, proposalId: string): Promise<void> {
    await this.queries
      .select({ id: proposals.id })
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.id, proposalId)))
      .for('no key update');
  }

  async insertApproval(values: NewApproval): Promise<SignedApproval> {
    const [row] = await this.queries.insert(approvals).values(values).returning();
    return row!;
  }

  async approval(companyId: string, approvalId: string): Promise<SignedApproval | null> {
    const [row] = await this.queries
      .select()
      .from(approvals)
      .where(and(eq(approvals.companyId, companyId), eq(approvals.id, approvalId)));
    return row ?? null;
  }

  /** Newest first. */
  async approvals(companyId: string, proposalId: string): Promise<SignedApproval[]> {
    return this.queries
      .select()
      .from(approvals)
      .where(and(eq(approvals.companyId, companyId), eq(approvals.proposalId, proposalId)))
      .orderBy(desc(approvals.approvedAt));
  }

  /** Keeps the signed paper of an approval. False when another try has done so. */
  async keepSigned(companyId: string, approvalId: string, key: string, hash: string): Promise<boolean> {
    const rows = await this.queries
      .update(approvals)
      .set({ status: 'ready', signedPdfKey: key, signedPdfHash: hash })
      .where(
        and(eq(approvals.companyId, companyId), eq(approvals.id, approvalId), isNull(approvals.signedPdfKey)),
      )
      .returning({ id: approvals.id });
    return rows.length > 0;
  }

  /** Told as failed until another try makes it. */
  async signingFailed(companyId: string, approvalId: string): Promise<void> {
    await this.queries
      .update(approvals)
      .set({ status: 'failed' })
      .where(
        and(eq(approvals.companyId, companyId), eq(approvals.id, approvalId), isNull(approvals.signedPdfKey)),
      );
  }

  async insertDecline(values: typeof declines.$inferInsert): Promise<void> {
    await this.queries.insert(declines).values(values);
  }

  /** Notes that a person looks at the page. True for the first time. */
  async seen(companyId: string, linkId: string): Promise<boolean> {
    const ofLink = and(eq(proposalLinks.companyId, companyId), eq(proposalLinks.id, linkId));
    const now = new Date();
    const first = await this.queries
      .update(proposalLinks)
      .set({ openedAt: now, lastSeenAt: now })
      .where(and(ofLink, isNull(proposalLinks.openedAt)))
      .returning({ id: proposalLinks.id });
    if (first.length > 0) return true;
    await this.queries.update(proposalLinks).set({ lastSeenAt: now }).where(ofLink);
    return false;
  }

  /** Of somebody who is still a member; null otherwise. */
  async memberEmail(companyId: string, userId: string): Promise<string | null> {
    const [row] = await this.queries
      .select({ email: users.email })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(and(eq(memberships.companyId, companyId), eq(memberships.userId, userId)));
    return row?.email ?? null;
  }
}
