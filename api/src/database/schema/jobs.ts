import {
  boolean,
  doublePrecision,
  foreignKey,
  index,
  jsonb,
  pgEnum,
  pgTable,
  text,
  unique,
  uuid,
} from 'drizzle-orm/pg-core';
import { at, createdAt, id, updatedAt } from './columns.js';
import { companies } from './people.js';

const company = () =>
  uuid('company_id')
    .notNull()
    .references(() => companies.id, { onDelete: 'cascade' });

export const clients = pgTable(
  'clients',
  {
    id: id(),
    companyId: company(),
    name: text('name').notNull(),
    email: text('email'),
    phone: text('phone'),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    archivedAt: at('archived_at'),
  },
  (t) => [unique('clients_company_id').on(t.companyId, t.id)],
);

export const properties = pgTable(
  'properties',
  {
    id: id(),
    companyId: company(),
    clientId: uuid('client_id').notNull(),
    name: text('name').notNull(),
    address: text('address').notNull().default(''),
    region: text('region').notNull().default(''),
    accessNotes: text('access_notes').notNull().default(''),
    latitude: doublePrecision('latitude'),
    longitude: doublePrecision('longitude'),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    archivedAt: at('archived_at'),
  },
  (t) => [
    unique('properties_company_id').on(t.companyId, t.id),
    foreignKey({
      name: 'properties_client',
      columns: [t.companyId, t.clientId],
      foreignColumns: [clients.companyId, clients.id],
    }),
  ],
);

/** The eight stages of a job, in order. */
export const jobStage = pgEnum('job_stage', [
  'enquiry',
  'plan',
  'prove',
  'propose',
  'prepare',
  'install',
  'commission',
  'aftercare',
]);

export const jobs = pgTable(
  'jobs',
  {
    id: id(),
    companyId: company(),
    propertyId: uuid('property_id').notNull(),
    name: text('name').notNull(),
    stage: jobStage('stage').notNull().default('enquiry'),
    /** The job starts from a system that is already in the ground. */
    existingSystem: boolean('existing_system').notNull().default(false),
    notes: text('notes').notNull().default(''),
    siteWalkOn: at('site_walk_on'),
    installOn: at('install_on'),
    /** The site-walk form as filled in; its shape is parsed at the edge. */
    siteWalk: jsonb('site_walk').notNull().default({}),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    archivedAt: at('archived_at'),
  },
  (t) => [
    unique('jobs_company_id').on(t.companyId, t.id),
    foreignKey({
      name: 'jobs_property',
      columns: [t.companyId, t.propertyId],
      foreignColumns: [properties.companyId, properties.id],
    }),
    index('jobs_company_updated').on(t.companyId, t.updatedAt),
    index('jobs_company_stage').on(t.companyId, t.stage),
  ],
);
