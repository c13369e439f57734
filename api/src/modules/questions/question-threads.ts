import { Inject, Injectable } from '@nestjs/common';
import type { Question } from '../proposals/proposals.dto.js';
import { type MessageRow, type QuestionRow, QuestionsRepository } from './questions.repository.js';

/** Questions with their messages, as both sides see them. */
@Injectable()
export class QuestionThreads {
  constructor(@Inject(QuestionsRepository) private readonly repository: QuestionsRepository) {}

  /** Oldest first. */
  async ofProposal(companyId: string, proposalId: string): Promise<Question[]> {
    const rows = await this.repository.ofProposal(companyId, proposalId);
    const messages = await this.repository.messages(
      companyId,
      rows.map(({ id }) => id),
    );
    return rows.map((row) => threadOf(row, messages));
  }

  async one(companyId: string, row: QuestionRow): Promise<Question> {
    return threadOf(row, await this.repository.messages(companyId, [row.id]));
  }
}

const threadOf = (row: QuestionRow, messages: readonly MessageRow[]): Question => ({
  id: row.id,
  recordId: row.recordId,
  sheetId: row.sheetId,
  x: row.x,
  y: row.y,
  revision: row.revision,
  resolvedAt: row.resolvedAt?.toISOString() ?? null,
  messages: messages
    .filter(({ questionId }) => questionId === row.id)
    .map(({ id, side, authorName, text, createdAt }) => ({
      id,
      side,
      authorName,
      text,
      at: createdAt.toISOString(),
    })),
});

/** What a question is about, in a few words: the tag of its light, a place, or the whole. */
export function aboutOf(
  { recordId, sheetId }: Pick<QuestionRow, 'recordId' | 'sheetId'>,
  lights: readonly { readonly recordId: string; readonly tag: string }[],
): string {
  if (recordId !== null) return lights.find((light) => light.recordId === recordId)?.tag ?? 'a light';
  return sheetId === null ? 'the proposal' : 'a place in the garden';
}
