import { randomUUID } from 'node:crypto';
import type { TestApp } from '../../../test/harness.js';
import {
  approvals,
  clients,
  jobs,
  properties,
  proposalLinks,
  proposalRevisions,
  proposals,
} from '../../database/schema/index.js';
import type { RevisionDocument } from '../proposals/revision-document.js';
import { Dues } from './dues.js';

export interface TestProposal {
  readonly companyId: string;
  readonly jobId: string;
  readonly proposalId: string;
  readonly linkId: string;
  readonly email: string;
}

let count = 0;

/** A job with a proposal and a homeowner's link, straight in the database. */
export async function addProposal(
  test: TestApp,
  companyId: string,
  name = 'Harrow Bank',
): Promise<TestProposal> {
  const { queries } = test.database;
  count += 1;
  const email = `homeowner-${count}@example.com`;
  const [client] = await queries.insert(clients).values({ companyId, name: 'Maren Holloway' }).returning();
  const [property] = await queries
    .insert(properties)
    .values({ companyId, clientId: client!.id, name })
    .returning();
  const [job] = await queries.insert(jobs).values({ companyId, propertyId: property!.id, name }).returning();
  const [proposal] = await queries
    .insert(proposals)
    .values({ companyId, jobId: job!.id, number: 1000 + count })
    .returning();
  const [link] = await queries
    .insert(proposalLinks)
    .values({
      companyId,
      proposalId: proposal!.id,
      tokenHash: randomUUID(),
      sealedToken: '',
      name: 'Maren Holloway',
      email,
      expiresAt: new Date(Date.now() + 86_400_000),
    })
    .returning();
  return { companyId, jobId: job!.id, proposalId: proposal!.id, linkId: link!.id, email };
}

export interface TestApproval {
  readonly revision: number;
  readonly totalMinor: number;
  readonly taxMinor?: number;
  readonly before?: { readonly totalMinor: number; readonly revision: number } | null;
  /** Percents of all stages but the last. */
  readonly shares?: readonly number[];
  readonly currency?: string;
  readonly companyName?: string;
  readonly clientName?: string;
  readonly companyEmail?: string;
}

const dueOrder = ['approval', 'start', 'finish'] as const;

/** Approves a revision as the homeowner would, and opens its dues. Deposit, start and the rest by default. */
export async function approve(test: TestApp, proposal: TestProposal, approval: TestApproval): Promise<void> {
  const { companyId, proposalId, linkId } = proposal;
  const { revision, totalMinor, before = null } = approval;
  const shares = approval.shares ?? [30, 40];
  const early = shares.map((percent, i) => ({
    id: `stage-${i}`,
    name: ['Deposit', 'When work begins', 'Third part'][i] ?? `Part ${i}`,
    due: dueOrder[Math.min(i, 1)]!,
    percent,
    amountMinor: Math.floor((totalMinor * percent) / 100),
    capped: false,
  }));
  const stages = [
    ...early,
    {
      id: 'last',
      name: 'When finished',
      due: 'finish' as const,
      percent: null,
      amountMinor: totalMinor - early.reduce((sum, { amountMinor }) => sum + amountMinor, 0),
      capped: false,
    },
  ];
  await test.database.transaction(async () => {
    const [row] = await queriesOf(test)
      .insert(proposalRevisions)
      .values({
        companyId,
        proposalId,
        revision,
        planVersion: 1,
        document: JSON.stringify(documentOf(proposal, approval, stages)),
        hash: randomUUID(),
        totalMinor,
        validUntil: new Date(Date.now() + 86_400_000),
      })
      .returning();
    const [approved] = await queriesOf(test)
      .insert(approvals)
      .values({
        companyId,
        proposalId,
        revisionId: row!.id,
        linkId,
        groups: [],
        totalMinor,
        typedName: 'Maren Holloway',
        agreedTo: 'I approve.',
        consentedTo: 'Electronic records are fine with me.',
        address: '192.0.2.1',
        userAgent: 'spec',
        revisionHash: row!.hash,
        pdfHash: 'none',
      })
      .returning();
    await test.app.get(Dues, { strict: false }).openFor({
      companyId,
      proposalId,
      approvalId: approved!.id,
      currency: approval.currency ?? 'USD',
      totalMinor,
      stages,
      before,
      revision,
    });
  });
}

const queriesOf = (test: TestApp) => test.database.queries;

function documentOf(
  proposal: TestProposal,
  {
    revision,
    totalMinor,
    taxMinor = 0,
    currency = 'USD',
    companyName = 'Fernhollow Lights',
    clientName = 'Maren Holloway',
    companyEmail = 'office@fernhollow.example',
  }: TestApproval,
  stages: RevisionDocument['price']['combinations'][number]['stages'],
): RevisionDocument {
  return {
    form: 1,
    number: 1001,
    revision,
    changes: null,
    madeAt: '2026-05-01T12:00:00.000Z',
    validUntil: '2026-06-01',
    currency,
    locale: 'en-US',
    region: 'us',
    units: 'imperial',
    company: { name: companyName, email: companyEmail, phone: '', address: '', licence: '' },
    client: { name: clientName, email: proposal.email, phone: '', address: '' },
    job: { id: proposal.jobId, name: 'Harrow Bank', property: 'Harrow Bank' },
    plan: { version: 1, records: [] },
    sheets: [],
    lights: [],
    price: {
      groups: [],
      lines: [],
      discountName: '',
      tax: { name: 'Sales tax', jurisdiction: '', percent: 8.25 },
      stages: [{ id: 'last', name: 'When finished', due: 'finish', percent: 0 }],
      combinations: [
        {
          groups: [],
          subtotalMinor: totalMinor - taxMinor,
          discountMinor: 0,
          taxableMinor: totalMinor - taxMinor,
          taxMinor,
          totalMinor,
          stages: [...stages],
          offerable: true,
          reason: '',
        },
      ],
    },
    words: {
      scope: '',
      exclusions: '',
      timeline: '',
      locate: '',
      warranty: '',
      terms: 'Payable within 14 days.',
      cancellation: '',
    },
    cautions: [],
    acceptedFaults: [],
  };
}
