import { Inject, Injectable } from '@nestjs/common';
import { and, eq } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { proposalLinks, proposals } from '../database/schema/index.js';

const columns = {
  linkId: proposalLinks.id,
  companyId: proposalLinks.companyId,
  proposalId: proposalLinks.proposalId,
  jobId: proposals.jobId,
  name: proposalLinks.name,
  email: proposalLinks.email,
  expiresAt: proposalLinks.expiresAt,
  revokedAt: proposalLinks.revokedAt,
};

/** Finds links before anybody is known: by their secret, or by the id that a signed cookie names. */
@Injectable()
export class LinksRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async byTokenHash(tokenHash: string) {
    return this.one(eq(proposalLinks.tokenHash, tokenHash));
  }

  async byId(linkId: string) {
    return this.one(eq(proposalLinks.id, linkId));
  }

  private async one(where: ReturnType<typeof eq>) {
    const [row] = await this.database.queries
      .select(columns)
      .from(proposalLinks)
      .innerJoin(
        proposals,
        and(eq(proposals.companyId, proposalLinks.companyId), eq(proposals.id, proposalLinks.proposalId)),
      )
      .where(where)
      .limit(1);
    return row ?? null;
  }
}
export type LinkRow = NonNullable<Awaited<ReturnType<LinksRepository['byId']>>>;
