import { and, eq } from 'drizzle-orm';
import type { TestApp } from '../../../test/harness.js';
import { newToken } from '../../access/one-time-token.js';
import {
  approvals,
  proposalLinks,
  proposalRevisions,
  questionMessages,
  questions,
} from '../../database/schema/index.js';
import { ObjectStorage } from '../../ports/storage/storage.js';
import { addProposal, approve, type TestProposal } from '../payments/payments.testkit.js';
import { Seal } from './seal.js';

export interface ShownProposal extends TestProposal {
  /** Approved, with its signed PDF. */
  readonly approvedId: string;
  /** A change order that was sent and not answered. */
  readonly sentId: string;
  readonly token: string;
}

/** A proposal that was approved, and a change order that waits for an answer, straight in the database. */
export async function addShownProposal(
  test: TestApp,
  companyId: string,
  name: string,
): Promise<ShownProposal> {
  const { queries } = test.database;
  const proposal = await addProposal(test, companyId, name);
  await approve(test, proposal, { revision: 1, totalMinor: 100_000, clientName: name });
  const { token, tokenHash } = newToken();
  const sealedToken = test.app.get(Seal, { strict: false }).close(token, tokenHash);
  await queries
    .update(proposalLinks)
    .set({ tokenHash, sealedToken })
    .where(and(eq(proposalLinks.companyId, companyId), eq(proposalLinks.id, proposal.linkId)));

  const pdfKey = `${companyId}/proposals/${proposal.proposalId}/spec.pdf`;
  const storage = test.app.get(ObjectStorage, { strict: false });
  await storage.put(pdfKey, Buffer.from(`%PDF ${name}`), 'application/pdf');
  const papers = { status: 'ready', progress: 100, pdfKey, pdfHash: 'hash', sentAt: new Date() } as const;
  const [approved] = await queries
    .update(proposalRevisions)
    .set(papers)
    .where(
      and(eq(proposalRevisions.companyId, companyId), eq(proposalRevisions.proposalId, proposal.proposalId)),
    )
    .returning();
  await queries
    .update(approvals)
    .set({ status: 'ready', signedPdfKey: pdfKey, signedPdfHash: 'hash' })
    .where(and(eq(approvals.companyId, companyId), eq(approvals.proposalId, proposal.proposalId)));
  const { id: approvedId, ...rest } = approved!;
  const [sent] = await queries
    .insert(proposalRevisions)
    .values({ ...rest, revision: 2, changesRevisionId: approvedId })
    .returning();
  return { ...proposal, approvedId, sentId: sent!.id, token };
}

/** A question of the homeowner about the whole. */
export async function addQuestion(
  test: TestApp,
  { companyId, proposalId, sentId }: ShownProposal,
  text: string,
): Promise<string> {
  const { queries } = test.database;
  const [row] = await queries
    .insert(questions)
    .values({ companyId, proposalId, revisionId: sentId })
    .returning();
  await queries.insert(questionMessages).values({
    companyId,
    questionId: row!.id,
    side: 'homeowner',
    authorName: 'Maren Holloway',
    text,
  });
  return row!.id;
}
