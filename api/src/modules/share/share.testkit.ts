import { randomUUID } from 'node:crypto';
import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { emptyPricing } from '@lampwright/geometry/price';
import type { Type } from '@nestjs/common';
import { ModuleRef } from '@nestjs/core';
import type { Agent, TestApp } from '../../../test/harness.js';
import type { TestPerson } from '../../../test/people.js';
import { LINK_COOKIE, LinkGate } from '../../access/link-gate.js';
import { newToken } from '../../access/one-time-token.js';
import { proposalLinks, proposalRevisions, proposals } from '../../database/schema/index.js';
import { PrepareProposal } from '../../jobs/prepare-proposal.js';
import { addJob } from '../plans/plans.testkit.js';
import { group, type PricedCompany, priceAll, quoteFor, savePricing } from '../pricing/pricing.testkit.js';
import { ProposalLinks } from '../proposals/links.js';
import type { RevisionRow } from '../proposals/proposals.repository.js';
import { ProposalsRepository } from '../proposals/proposals.repository.js';
import { addReadyJob, freeze, type ReadyJob, startProposalTest } from '../proposals/proposals.testkit.js';
import { Seal } from '../proposals/seal.js';
import type { SharedPage } from './share.dto.js';
import { ShareModule } from './share.module.js';

/** Homeowners with links, for tests: a browser of their own that has come in by the link. */

export interface Homeowner {
  readonly agent: Agent;
  readonly linkId: string;
  readonly token: string;
}

/** As the editor is built, with nothing in it. */
const SHELL =
  '<!doctype html><html lang="en"><head><title>Your garden lighting</title></head><body></body></html>';

/** A folder with the page of the link, for `EDITOR_FILES`. */
export async function writeShell(folder: string): Promise<void> {
  await mkdir(folder, { recursive: true });
  await writeFile(join(folder, 'home.html'), SHELL);
  await writeFile(join(folder, 'index.html'), '<!doctype html><title>Lampwright</title>');
}

/** The application with object storage and a page for links. */
export async function startShareTest(settings: Record<string, string> = {}): Promise<TestApp> {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-shell-'));
  await writeShell(folder);
  const test = await startProposalTest({ EDITOR_FILES: folder, ...settings });
  return {
    ...test,
    async close() {
      await test.close();
      await rm(folder, { recursive: true, force: true });
    },
  };
}

/**
 * A drawn and priced job frozen into a revision with its PDF, not sent yet. Its third light is the group `more`,
 * which is offered and not taken.
 */
export async function freezeReady(
  test: TestApp,
  company: PricedCompany,
  costMinor = 1000,
): Promise<{ readonly job: ReadyJob; readonly revisionId: string }> {
  const { agent } = company.designer;
  const job = await addReadyJob(test, company);
  // A price of its own: with no markup the cost would stand there, rightly.
  await priceAll(company, job.jobId, { costMinor, priceMinor: 9000 });
  await savePricing(agent, job.jobId, {
    ...emptyPricing,
    groups: [group('more', false)],
    members: { [job.lights[2]!]: 'more' },
  });
  for (const { key, message, acceptance } of (await quoteFor(agent, job.jobId)).faults)
    if (!acceptance)
      await agent
        .post(`/api/jobs/${job.jobId}/fault-acceptances`)
        .send({ faultKey: key, message, reason: 'Known to us.' })
        .expect(201);
  const { id } = await freeze(agent, job.jobId);
  const prepare = await handlerOf(test, PrepareProposal);
  await prepare.handle({ companyId: company.companyId, revisionId: id });
  return { job, revisionId: id };
}

/** A handler of the worker, to be called by hand: nothing is at work behind a test that compares tables. */
export async function handlerOf<T>(test: TestApp, type: Type<T>): Promise<T> {
  return test.app.select(ShareModule).get(ModuleRef, { strict: true }).create(type);
}

export interface SharedProposal {
  readonly companyId: string;
  readonly jobId: string;
  readonly proposalId: string;
  readonly revisionId: string;
}

let copies = 0;

/** A job with a proposal of its own that says what a frozen revision says, sent: without drawing it again. */
export async function copyProposal(
  test: TestApp,
  designer: TestPerson,
  revisionId: string,
  edit: Partial<RevisionRow> = {},
): Promise<SharedProposal> {
  copies += 1;
  const { companyId } = designer.actor;
  const row = await test.app.get(ProposalsRepository, { strict: false }).revision(companyId, revisionId);
  if (!row) throw new Error(`There is no revision ${revisionId}.`);
  const jobId = await addJob(designer, `Copy ${copies}`);
  const [proposal] = await test.database.queries
    .insert(proposals)
    .values({ companyId, jobId, number: 5000 + copies })
    .returning();
  const { id: _id, ...values } = row;
  const [copy] = await test.database.queries
    .insert(proposalRevisions)
    .values({ ...values, proposalId: proposal!.id, sentAt: new Date(), ...edit })
    .returning();
  return { companyId, jobId, proposalId: proposal!.id, revisionId: copy!.id };
}

/** The token that a proposal was sent to an address with. */
export async function tokenSentTo(test: TestApp, companyId: string, email: string): Promise<string> {
  const { rows } = await test.database.executeSql(
    'SELECT id FROM proposal_links WHERE company_id = $1 AND email = $2',
    [companyId, email],
  );
  const [found] = rows as { id: string }[];
  const link = await test.app.get(ProposalsRepository, { strict: false }).link(companyId, found?.id ?? '');
  if (!link) throw new Error(`Nothing was sent to ${email}.`);
  return new URL(test.app.get(ProposalLinks, { strict: false }).urlOf(link)).pathname.slice('/p/'.length);
}

/** A browser that opens a link, and keeps the cookie that it is given. */
export async function open(test: TestApp, token: string): Promise<Homeowner> {
  const agent = test.agent();
  const { text } = await agent.get(`/p/${token}`).expect(200);
  const [, linkId] = /<meta name="lampwright-link" content="([^"]+)">/.exec(text) ?? [];
  if (linkId === undefined) throw new Error(`The page names no link: ${text}`);
  return { agent, linkId, token };
}

/** Another link to the same proposal, or one that is over. */
export async function addLink(
  test: TestApp,
  { companyId, proposalId }: { readonly companyId: string; readonly proposalId: string },
  { email = `${randomUUID()}@example.com`, expiresAt = inAYear(), revokedAt = null as Date | null } = {},
): Promise<{ readonly linkId: string; readonly token: string }> {
  const { token, tokenHash } = newToken();
  const sealedToken = test.app.get(Seal, { strict: false }).close(token, tokenHash);
  const [row] = await test.database.queries
    .insert(proposalLinks)
    .values({
      companyId,
      proposalId,
      tokenHash,
      sealedToken,
      name: 'Ida Fairweather',
      email,
      expiresAt,
      revokedAt,
    })
    .returning();
  return { linkId: row!.id, token };
}

const inAYear = () => new Date(Date.now() + 365 * 86_400_000);

/** The cookie of a link, as the page sets it. */
export const linkCookie = (test: TestApp, linkId: string): string =>
  `${LINK_COOKIE}=${test.app.get(LinkGate, { strict: false }).sign(linkId)}`;

/** The next revision of a proposal, straight in the database: a copy of one, sent at once. */
export async function sendCopy(
  test: TestApp,
  companyId: string,
  revisionId: string,
  edit: Partial<typeof proposalRevisions.$inferInsert> = {},
): Promise<string> {
  const row = await test.app.get(ProposalsRepository, { strict: false }).revision(companyId, revisionId);
  if (!row) throw new Error(`There is no revision ${revisionId}.`);
  const { id: _id, createdAt: _createdAt, ...values } = row;
  const revision = row.revision + 1;
  const document = JSON.stringify({ ...JSON.parse(row.document), revision });
  const [copy] = await test.database.queries
    .insert(proposalRevisions)
    .values({ ...values, revision, document, hash: randomUUID(), sentAt: new Date(), ...edit })
    .returning();
  return copy!.id;
}

export const sharePath = (linkId: string, rest = ''): string => `/api/share/${linkId}${rest}`;

export async function pageOf({ agent, linkId }: Homeowner): Promise<SharedPage> {
  return (await agent.get(sharePath(linkId)).expect(200)).body as SharedPage;
}

/** A yes to what the page shows: as offered, unless the groups are named. */
export function yesTo(page: SharedPage, groups?: readonly string[]) {
  const { combinations } = page.document.price;
  const taken = groups
    ? combinations.find(
        (one) => one.groups.length === groups.length && groups.every((id) => one.groups.includes(id)),
      )
    : combinations[0];
  if (!taken) throw new Error('There is no such combination.');
  return {
    revisionId: page.revisionId,
    hash: page.hash,
    groups: taken.groups,
    totalMinor: taken.totalMinor,
    typedName: 'Ida Fairweather',
    agreed: true,
    consented: true,
  };
}
