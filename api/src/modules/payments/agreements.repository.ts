import { Inject, Injectable } from '@nestjs/common';
import { and, desc, eq } from 'drizzle-orm';
import { z } from 'zod';
import { Database } from '../../database/database.js';
import {
  approvals,
  memberships,
  proposalLinks,
  proposalRevisions,
  users,
} from '../../database/schema/index.js';
import { type RevisionDocument, revisionDocumentSchema } from '../proposals/revision-document.js';
import type { ProposalKey } from './payments.repository.js';

/** What was agreed last on a proposal, and with whom. */
export interface Agreement {
  readonly revision: number;
  readonly totalMinor: number;
  /** Tax in the total. */
  readonly taxMinor: number;
  readonly document: RevisionDocument;
  /** Whose link the yes came by. */
  readonly name: string;
  readonly email: string;
}

const groupsSchema = z.array(z.string());

@Injectable()
export class AgreementsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Null before the first approval. */
  async newest({ companyId, proposalId }: ProposalKey): Promise<Agreement | null> {
    const [row] = await this.database.queries
      .select({
        groups: approvals.groups,
        totalMinor: approvals.totalMinor,
        revision: proposalRevisions.revision,
        document: proposalRevisions.document,
        name: proposalLinks.name,
        email: proposalLinks.email,
      })
      .from(approvals)
      .innerJoin(
        proposalRevisions,
        and(
          eq(proposalRevisions.companyId, approvals.companyId),
          eq(proposalRevisions.id, approvals.revisionId),
        ),
      )
      .innerJoin(
        proposalLinks,
        and(eq(proposalLinks.companyId, approvals.companyId), eq(proposalLinks.id, approvals.linkId)),
      )
      .where(and(eq(approvals.companyId, companyId), eq(approvals.proposalId, proposalId)))
      .orderBy(desc(approvals.approvedAt), desc(proposalRevisions.revision))
      .limit(1);
    if (!row) return null;
    const document = revisionDocumentSchema.parse(JSON.parse(row.document));
    const { groups, ...rest } = row;
    return { ...rest, document, taxMinor: taxOf(document, groupsSchema.parse(groups)) };
  }

  /** Where letters for the company go when it has named no address for them. */
  async ownerEmails(companyId: string): Promise<string[]> {
    const rows = await this.database.queries
      .select({ email: users.email })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(and(eq(memberships.companyId, companyId), eq(memberships.role, 'owner')));
    return rows.map(({ email }) => email);
  }
}

/** @throws Error when the document does not hold the approved combination, which no approval can name */
function taxOf(document: RevisionDocument, groups: readonly string[]): number {
  const wanted = [...groups].sort().join(' ');
  const combination = document.price.combinations.find((one) => [...one.groups].sort().join(' ') === wanted);
  if (!combination) throw new Error('An approval names groups that its revision does not offer.');
  return combination.taxMinor;
}
