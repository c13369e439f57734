import {
  foreignKey,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, updatedAt } from './columns.js';
import { jobs } from './jobs.js';
import { companies } from './people.js';

/** The plan of a job: one document, whose version counts the changes applied. */
export const plans = pgTable(
  'plans',
  {
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id, { onDelete: 'cascade' }),
    jobId: uuid('job_id').notNull(),
    version: integer('version').notNull().default(0),
    schemaVersion: integer('schema_version').notNull(),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId] }),
    foreignKey({
      name: 'plans_job',
      columns: [t.companyId, t.jobId],
      foreignColumns: [jobs.companyId, jobs.id],
    }).onDelete('cascade'),
  ],
);

const plan = {
  companyId: uuid('company_id').notNull(),
  jobId: uuid('job_id').notNull(),
};

/** The present records, a row each. */
export const planRecords = pgTable(
  'plan_records',
  {
    ...plan,
    recordId: text('record_id').notNull(),
    record: jsonb('record').notNull(),
    /** The plan version that last put it. */
    version: integer('version').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId, t.recordId] }),
    foreignKey({
      name: 'plan_records_plan',
      columns: [t.companyId, t.jobId],
      foreignColumns: [plans.companyId, plans.jobId],
    }).onDelete('cascade'),
  ],
);

/** Every change ever applied, in order; never updated. */
export const planChanges = pgTable(
  'plan_changes',
  {
    ...plan,
    version: integer('version').notNull(),
    /** Given by the client: a repeated change is recognised by it. */
    changeId: text('change_id').notNull(),
    schemaVersion: integer('schema_version').notNull(),
    put: jsonb('put').notNull(),
    remove: jsonb('remove').notNull(),
    /** Null for the system's own changes; of a deleted person only this id is left. */
    authorId: uuid('author_id'),
    /** The editing session that made it, whose later changes know it; empty for the system's own. */
    session: text('session').notNull().default(''),
    label: text('label').notNull().default(''),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId, t.version] }),
    unique('plan_changes_change').on(t.companyId, t.jobId, t.changeId),
    foreignKey({
      name: 'plan_changes_plan',
      columns: [t.companyId, t.jobId],
      foreignColumns: [plans.companyId, plans.jobId],
    }).onDelete('cascade'),
  ],
);

/** The whole document at some versions, so that replay starts near. */
export const planSnapshots = pgTable(
  'plan_snapshots',
  {
    ...plan,
    version: integer('version').notNull(),
    schemaVersion: integer('schema_version').notNull(),
    records: jsonb('records').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId, t.version] }),
    foreignKey({
      name: 'plan_snapshots_plan',
      columns: [t.companyId, t.jobId],
      foreignColumns: [plans.companyId, plans.jobId],
    }).onDelete('cascade'),
  ],
);

/** What the server itself computed from a version of the plan; the newest is what lists show. */
export const planSummaries = pgTable(
  'plan_summaries',
  {
    ...plan,
    planVersion: integer('plan_version').notNull(),
    solverVersion: text('solver_version').notNull(),
    faults: integer('faults').notNull(),
    cautions: integer('cautions').notNull(),
    fixtures: integer('fixtures').notNull(),
    summary: jsonb('summary').notNull(),
    createdAt: createdAt(),
  },
  (t) => [
    primaryKey({ columns: [t.companyId, t.jobId, t.planVersion, t.solverVersion] }),
    foreignKey({
      name: 'plan_summaries_plan',
      columns: [t.companyId, t.jobId],
      foreignColumns: [plans.companyId, plans.jobId],
    }).onDelete('cascade'),
    index('plan_summaries_newest').on(t.companyId, t.jobId, t.planVersion),
  ],
);
