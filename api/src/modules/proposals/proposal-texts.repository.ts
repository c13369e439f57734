import { Inject, Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { proposalTexts } from '../../database/schema/index.js';
import type { ProposalTexts } from './proposals.dto.js';

export type ProposalTextsRow = typeof proposalTexts.$inferSelect;

@Injectable()
export class ProposalTextsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async find(companyId: string): Promise<ProposalTextsRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(proposalTexts)
      .where(eq(proposalTexts.companyId, companyId));
    return row ?? null;
  }

  /** Saves on top of a version, 0 for the first; null when they are at another one. */
  async save(companyId: string, baseVersion: number, texts: ProposalTexts): Promise<ProposalTextsRow | null> {
    const { queries } = this.database;
    const [row] =
      baseVersion === 0
        ? await queries.insert(proposalTexts).values({ companyId, texts }).onConflictDoNothing().returning()
        : await queries
            .update(proposalTexts)
            .set({ texts, version: baseVersion + 1, updatedAt: sql`now()` })
            .where(and(eq(proposalTexts.companyId, companyId), eq(proposalTexts.version, baseVersion)))
            .returning();
    return row ?? null;
  }
}
