import {
  type AnyPgColumn,
  bigint,
  doublePrecision,
  foreignKey,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { at, createdAt, id, updatedAt } from './columns.js';
import { jobs } from './jobs.js';
import { companies } from './people.js';

const company = () =>
  uuid('company_id')
    .notNull()
    .references(() => companies.id, { onDelete: 'cascade' });

/** The company's words for proposals: scope, exclusions, warranty, terms and the like. */
export const proposalTexts = pgTable('proposal_texts', {
  companyId: uuid('company_id')
    .primaryKey()
    .references(() => companies.id, { onDelete: 'cascade' }),
  version: integer('version').notNull().default(1),
  texts: jsonb('texts').notNull(),
  updatedAt: updatedAt(),
});

/** The proposal of a job: a number for the homeowner, and revisions. */
export const proposals = pgTable(
  'proposals',
  {
    id: id(),
    companyId: company(),
    jobId: uuid('job_id').notNull(),
    number: integer('number').notNull(),
    /** What this job says in place of the company's words; its shape is parsed at the edge. */
    texts: jsonb('texts').notNull().default({}),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('proposals_company_id').on(t.companyId, t.id),
    unique('proposals_number').on(t.companyId, t.number),
    unique('proposals_job').on(t.companyId, t.jobId),
    foreignKey({
      name: 'proposals_of_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
  ],
);

const ofProposal = (name: string, t: { companyId: AnyPgColumn; proposalId: AnyPgColumn }) =>
  foreignKey({
    name,
    columns: [t.companyId, t.proposalId],
    foreignColumns: [proposals.companyId, proposals.id],
  }).onDelete('cascade');

export const paperStatus = pgEnum('paper_status', ['preparing', 'ready', 'failed']);

/** Plan and price as they were at one moment. What the homeowner sees never changes after this. */
export const proposalRevisions = pgTable(
  'proposal_revisions',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    /** 1, 2, 3 … within the proposal. */
    revision: integer('revision').notNull(),
    planVersion: integer('plan_version').notNull(),
    /** The revision document in canonical JSON (RFC 8785): these bytes are what the hash is of. */
    document: text('document').notNull(),
    /** SHA-256 of the document's UTF-8 bytes, in hex. */
    hash: text('hash').notNull(),
    /** The approved revision that this one changes; null for one that nothing was approved before. */
    changesRevisionId: uuid('changes_revision_id'),
    totalMinor: bigint('total_minor', { mode: 'number' }).notNull(),
    /** Cost of the offered combination, for the company's own numbers; never in the document. */
    costMinor: bigint('cost_minor', { mode: 'number' }),
    status: paperStatus('status').notNull().default('preparing'),
    /** 0 to 100 while it is prepared. */
    progress: integer('progress').notNull().default(0),
    failure: text('failure'),
    pdfKey: text('pdf_key'),
    pdfHash: text('pdf_hash'),
    /** Object keys of the sheets' pictures by sheet id, kept with the revision. */
    pictures: jsonb('pictures').notNull().default({}),
    validUntil: at('valid_until').notNull(),
    /** Sending waits for the PDF: to whom, once it is ready. */
    sendTo: jsonb('send_to'),
    sentAt: at('sent_at'),
    withdrawnAt: at('withdrawn_at'),
    /** The crew may work from it. */
    releasedAt: at('released_at'),
    releasedBy: uuid('released_by'),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('proposal_revisions_number').on(t.companyId, t.proposalId, t.revision),
    unique('proposal_revisions_company_id').on(t.companyId, t.id),
    ofProposal('proposal_revisions_of', t),
  ],
);

/** Ways in for homeowners. Of the token only the hash is kept. */
export const proposalLinks = pgTable(
  'proposal_links',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    /** For sending the same link again in reminders; encrypted with a key that the database does not hold. */
    sealedToken: text('sealed_token').notNull(),
    name: text('name').notNull().default(''),
    email: text('email').notNull(),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    revokedAt: at('revoked_at'),
    /** First and last time that a person made a gesture on the page. */
    openedAt: at('opened_at'),
    lastSeenAt: at('last_seen_at'),
    remindersSent: integer('reminders_sent').notNull().default(0),
    lastMailAt: at('last_mail_at').notNull().defaultNow(),
  },
  (t) => [
    unique('proposal_links_company_id').on(t.companyId, t.id),
    ofProposal('proposal_links_of', t),
    index('proposal_links_proposal').on(t.companyId, t.proposalId),
  ],
);

/** A homeowner's question about a light, a point of the picture, or the whole. */
export const questions = pgTable(
  'questions',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    /** The light that it is pinned to. */
    recordId: text('record_id'),
    /** Or a point of a sheet, in its pixels. */
    sheetId: text('sheet_id'),
    x: doublePrecision('x'),
    y: doublePrecision('y'),
    createdAt: createdAt(),
    resolvedAt: at('resolved_at'),
  },
  (t) => [
    unique('questions_company_id').on(t.companyId, t.id),
    ofProposal('questions_of', t),
    index('questions_proposal').on(t.companyId, t.proposalId),
  ],
);

export const messageSide = pgEnum('message_side', ['homeowner', 'company']);

export const questionMessages = pgTable(
  'question_messages',
  {
    id: id(),
    companyId: company(),
    questionId: uuid('question_id').notNull(),
    side: messageSide('side').notNull(),
    /** The member who wrote it; null for the homeowner. */
    authorId: uuid('author_id'),
    authorName: text('author_name').notNull(),
    text: text('text').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'question_messages_of',
      columns: [t.companyId, t.questionId],
      foreignColumns: [questions.companyId, questions.id],
    }).onDelete('cascade'),
    index('question_messages_question').on(t.companyId, t.questionId, t.createdAt),
  ],
);

/** A yes, with its evidence. Never updated, but for the papers made of it. */
export const approvals = pgTable(
  'approvals',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    linkId: uuid('link_id').notNull(),
    /** Ids of the groups taken. */
    groups: jsonb('groups').notNull(),
    totalMinor: bigint('total_minor', { mode: 'number' }).notNull(),
    typedName: text('typed_name').notNull(),
    /** The sentences agreed to, word for word. */
    agreedTo: text('agreed_to').notNull(),
    consentedTo: text('consented_to').notNull(),
    address: text('address').notNull(),
    userAgent: text('user_agent').notNull(),
    revisionHash: text('revision_hash').notNull(),
    pdfHash: text('pdf_hash').notNull(),
    approvedAt: at('approved_at').notNull().defaultNow(),
    status: paperStatus('status').notNull().default('preparing'),
    signedPdfKey: text('signed_pdf_key'),
    signedPdfHash: text('signed_pdf_hash'),
  },
  (t) => [
    unique('approvals_revision').on(t.companyId, t.revisionId),
    unique('approvals_company_id').on(t.companyId, t.id),
    ofProposal('approvals_of', t),
  ],
);

export const declines = pgTable(
  'declines',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    revisionId: uuid('revision_id').notNull(),
    linkId: uuid('link_id').notNull(),
    reason: text('reason').notNull(),
    createdAt: createdAt(),
  },
  (t) => [unique('declines_revision').on(t.companyId, t.revisionId), ofProposal('declines_of', t)],
);
