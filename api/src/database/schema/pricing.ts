import { foreignKey, index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { catalogueItems } from './catalogue.js';
import { at, createdAt, id, updatedAt } from './columns.js';
import { jobs } from './jobs.js';
import { companies } from './people.js';

const company = () =>
  uuid('company_id')
    .notNull()
    .references(() => companies.id, { onDelete: 'cascade' });

/** What a company's work costs and how prices are made of it. */
export const priceBooks = pgTable('price_books', {
  companyId: uuid('company_id')
    .primaryKey()
    .references(() => companies.id, { onDelete: 'cascade' }),
  version: integer('version').notNull().default(1),
  book: jsonb('book').notNull(),
  updatedAt: updatedAt(),
});

/** Prices of catalogue items over time: the newest row of an item holds. Never updated. */
export const cataloguePrices = pgTable(
  'catalogue_prices',
  {
    id: id(),
    companyId: company(),
    itemId: uuid('item_id')
      .notNull()
      .references(() => catalogueItems.id, { onDelete: 'cascade' }),
    price: jsonb('price').notNull(),
    /** The import that brought it; null for one typed in. */
    importId: uuid('import_id'),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
  },
  (t) => [index('catalogue_prices_newest').on(t.companyId, t.itemId, t.createdAt)],
);

/** A file of items and prices that was taken in, with what it takes to undo that. */
export const catalogueImports = pgTable(
  'catalogue_imports',
  {
    id: id(),
    companyId: company(),
    fileName: text('file_name').notNull(),
    summary: jsonb('summary').notNull(),
    undo: jsonb('undo').notNull(),
    createdBy: uuid('created_by'),
    createdAt: createdAt(),
    undoneAt: at('undone_at'),
  },
  (t) => [index('catalogue_imports_company').on(t.companyId, t.createdAt)],
);

/** What people decided about the price of a job; the lines themselves come from the plan. */
export const jobPricings = pgTable(
  'job_pricings',
  {
    companyId: company(),
    jobId: uuid('job_id').notNull(),
    version: integer('version').notNull().default(1),
    pricing: jsonb('pricing').notNull(),
    updatedBy: uuid('updated_by'),
    updatedAt: updatedAt(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId] }),
    foreignKey({
      name: 'job_pricings_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
  ],
);

/** A fault of a plan that a designer answers for in writing, as it was told to them. */
export const faultAcceptances = pgTable(
  'fault_acceptances',
  {
    id: id(),
    companyId: company(),
    jobId: uuid('job_id').notNull(),
    /** Code and records of the fault, as the pricing module writes them. */
    faultKey: text('fault_key').notNull(),
    message: text('message').notNull(),
    reason: text('reason').notNull(),
    acceptedBy: uuid('accepted_by'),
    acceptedByName: text('accepted_by_name').notNull(),
    createdAt: createdAt(),
    withdrawnAt: at('withdrawn_at'),
  },
  (t) => [
    foreignKey({
      name: 'fault_acceptances_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
    index('fault_acceptances_of_job').on(t.companyId, t.jobId),
  ],
);

/** Numbers that count up within a company: of proposals, invoices, receipts. */
export const companyCounters = pgTable(
  'company_counters',
  {
    companyId: company(),
    name: text('name').notNull(),
    last: integer('last').notNull(),
  },
  (t) => [primaryKey({ columns: [t.companyId, t.name] })],
);

/** What happened to a job, in order; never updated. */
export const jobEvents = pgTable(
  'job_events',
  {
    id: id(),
    companyId: company(),
    jobId: uuid('job_id').notNull(),
    kind: text('kind').notNull(),
    /** Null for the homeowner and for the product itself. */
    actorId: uuid('actor_id'),
    actorName: text('actor_name').notNull().default(''),
    data: jsonb('data').notNull().default({}),
    createdAt: createdAt(),
  },
  (t) => [
    foreignKey({
      name: 'job_events_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
    index('job_events_of_job').on(t.companyId, t.jobId, t.createdAt),
  ],
);

/** Answers to requests that may happen once: by whoever asked and the key they gave. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    /** Who asked: a user or a link, as the access layer names them. */
    scope: text('scope').notNull(),
    key: text('key').notNull(),
    /** Method and path. */
    route: text('route').notNull(),
    bodyHash: text('body_hash').notNull(),
    /** Null while the first request is at work. */
    status: integer('status'),
    answer: jsonb('answer'),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.scope, t.key] }), index('idempotency_keys_age').on(t.createdAt)],
);
