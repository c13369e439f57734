import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, inArray } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { proposalRevisions, proposals, questionMessages, questions } from '../../database/schema/index.js';

export type QuestionRow = typeof questions.$inferSelect & { readonly revision: number };
export type MessageRow = typeof questionMessages.$inferSelect;

/** Questions of homeowners and what was written to them. */
@Injectable()
export class QuestionsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  /** Oldest first, with the revision that each was asked about. */
  async ofProposal(companyId: string, proposalId: string): Promise<QuestionRow[]> {
    const rows = await this.queries
      .select({ row: questions, revision: proposalRevisions.revision })
      .from(questions)
      .innerJoin(
        proposalRevisions,
        and(
          eq(proposalRevisions.companyId, questions.companyId),
          eq(proposalRevisions.id, questions.revisionId),
        ),
      )
      .where(and(eq(questions.companyId, companyId), eq(questions.proposalId, proposalId)))
      .orderBy(asc(questions.createdAt), asc(questions.id));
    return rows.map(({ row, revision }) => ({ ...row, revision }));
  }

  async find(companyId: string, questionId: string): Promise<QuestionRow | null> {
    const [found] = await this.queries
      .select({ row: questions, revision: proposalRevisions.revision })
      .from(questions)
      .innerJoin(
        proposalRevisions,
        and(
          eq(proposalRevisions.companyId, questions.companyId),
          eq(proposalRevisions.id, questions.revisionId),
        ),
      )
      .where(and(eq(questions.companyId, companyId), eq(questions.id, questionId)));
    return found ? { ...found.row, revision: found.revision } : null;
  }

  /** Oldest first. */
  async messages(companyId: string, questionIds: readonly string[]): Promise<MessageRow[]> {
    if (questionIds.length === 0) return [];
    return this.queries
      .select()
      .from(questionMessages)
      .where(
        and(
          eq(questionMessages.companyId, companyId),
          inArray(questionMessages.questionId, [...questionIds]),
        ),
      )
      .orderBy(asc(questionMessages.createdAt), asc(questionMessages.id));
  }

  async insert(values: typeof questions.$inferInsert): Promise<string> {
    const [row] = await this.queries.insert(questions).values(values).returning({ id: questions.id });
    return row!.id;
  }

  async addMessage(values: typeof questionMessages.$inferInsert): Promise<void> {
    await this.queries.insert(questionMessages).values(values);
  }

  async setResolved(companyId: string, questionId: string, resolvedAt: Date | null): Promise<void> {
    await this.queries
      .update(questions)
      .set({ resolvedAt })
      .where(and(eq(questions.companyId, companyId), eq(questions.id, questionId)));
  }

  async proposalOfJob(companyId: string, jobId: string): Promise<{ readonly id: string } | null> {
    const [row] = await this.queries
      .select({ id: proposals.id })
      .from(proposals)
      .where(and(eq(proposals.companyId, companyId), eq(proposals.jobId, jobId)));
    return row ?? null;
  }
}
