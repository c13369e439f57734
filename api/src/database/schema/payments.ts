import {
  bigint,
  date,
  foreignKey,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { at, createdAt, id } from './columns.js';
import { companies } from './people.js';
import { approvals, paperStatus, proposals } from './proposals.js';

const company = () =>
  uuid('company_id')
    .notNull()
    .references(() => companies.id, { onDelete: 'cascade' });
const money = (name: string) => bigint(name, { mode: 'number' });

export const dueWhen = pgEnum('due_when', ['approval', 'start', 'finish']);

/**
 * What a homeowner owes, by stage. An approval makes the dues of its revision; a change order adds what it
 * costs more as a due of its own, and takes what it costs less from the last dues that are not paid.
 */
export const dues = pgTable(
  'dues',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    approvalId: uuid('approval_id').notNull(),
    name: text('name').notNull(),
    due: dueWhen('due').notNull(),
    position: integer('position').notNull(),
    /** As agreed; what later change orders took off stands beside it. */
    amountMinor: money('amount_minor').notNull(),
    reducedMinor: money('reduced_minor').notNull().default(0),
    currency: text('currency').notNull(),
    /** Asked for: the homeowner may pay it now. That of the approval is asked for at once. */
    requestedAt: at('requested_at'),
    createdAt: createdAt(),
  },
  (t) => [
    unique('dues_company_id').on(t.companyId, t.id),
    unique('dues_of_approval').on(t.companyId, t.approvalId, t.position),
    foreignKey({
      name: 'dues_proposal',
      columns: [t.companyId, t.proposalId],
      foreignColumns: [proposals.companyId, proposals.id],
    }).onDelete('cascade'),
    foreignKey({
      name: 'dues_approval',
      columns: [t.companyId, t.approvalId],
      foreignColumns: [approvals.companyId, approvals.id],
    }).onDelete('cascade'),
  ],
);

export const paymentMethod = pgEnum('payment_method', ['card', 'cheque', 'transfer', 'cash']);
export const paymentStatus = pgEnum('payment_status', ['open', 'succeeded', 'failed', 'expired']);

export const payments = pgTable(
  'payments',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    dueId: uuid('due_id').notNull(),
    method: paymentMethod('method').notNull(),
    status: paymentStatus('status').notNull(),
    amountMinor: money('amount_minor').notNull(),
    currency: text('currency').notNull(),
    /** Of the card service. */
    checkoutId: text('checkout_id'),
    checkoutUrl: text('checkout_url'),
    paymentIntentId: text('payment_intent_id'),
    /** When the company got it, for what it records by hand. */
    receivedOn: date('received_on'),
    note: text('note').notNull().default(''),
    recordedBy: uuid('recorded_by'),
    createdAt: createdAt(),
    settledAt: at('settled_at'),
  },
  (t) => [
    unique('payments_company_id').on(t.companyId, t.id),
    uniqueIndex('payments_checkout').on(t.checkoutId),
    foreignKey({
      name: 'payments_due',
      columns: [t.companyId, t.dueId],
      foreignColumns: [dues.companyId, dues.id],
    }).onDelete('cascade'),
    index('payments_proposal').on(t.companyId, t.proposalId),
  ],
);

export const refundStatus = pgEnum('refund_status', ['pending', 'succeeded', 'failed']);

export const refunds = pgTable(
  'refunds',
  {
    id: id(),
    companyId: company(),
    paymentId: uuid('payment_id').notNull(),
    amountMinor: money('amount_minor').notNull(),
    reason: text('reason').notNull(),
    status: refundStatus('status').notNull(),
    providerId: text('provider_id'),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
    settledAt: at('settled_at'),
  },
  (t) => [
    unique('refunds_company_id').on(t.companyId, t.id),
    foreignKey({
      name: 'refunds_payment',
      columns: [t.companyId, t.paymentId],
      foreignColumns: [payments.companyId, payments.id],
    }).onDelete('cascade'),
  ],
);

/** Events of the card service that were acted on: each is stored in the transaction of what it did. */
export const paymentEvents = pgTable('payment_events', {
  eventId: text('event_id').primaryKey(),
  type: text('type').notNull(),
  receivedAt: at('received_at').notNull().defaultNow(),
});

export const moneyDocumentKind = pgEnum('money_document_kind', ['invoice', 'receipt', 'refund']);

/** Invoices, receipts and notes of refunds: numbered, frozen, made into PDFs by the worker. */
export const moneyDocuments = pgTable(
  'money_documents',
  {
    id: id(),
    companyId: company(),
    proposalId: uuid('proposal_id').notNull(),
    kind: moneyDocumentKind('kind').notNull(),
    number: integer('number').notNull(),
    /** What it is about: one of the three. */
    dueId: uuid('due_id'),
    paymentId: uuid('payment_id'),
    refundId: uuid('refund_id'),
    amountMinor: money('amount_minor').notNull(),
    currency: text('currency').notNull(),
    document: jsonb('document').notNull(),
    status: paperStatus('status').notNull().default('preparing'),
    pdfKey: text('pdf_key'),
    pdfHash: text('pdf_hash'),
    createdAt: createdAt(),
    mailedAt: at('mailed_at'),
  },
  (t) => [
    unique('money_documents_number').on(t.companyId, t.kind, t.number),
    unique('money_documents_company_id').on(t.companyId, t.id),
    foreignKey({
      name: 'money_documents_proposal',
      columns: [t.companyId, t.proposalId],
      foreignColumns: [proposals.companyId, proposals.id],
    }).onDelete('cascade'),
    index('money_documents_proposal_index').on(t.companyId, t.proposalId),
  ],
);
