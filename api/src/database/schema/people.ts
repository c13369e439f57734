import { sql } from 'drizzle-orm';
import { index, jsonb, pgEnum, pgTable, primaryKey, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { at, createdAt, id, updatedAt } from './columns.js';

export const role = pgEnum('role', ['owner', 'designer', 'crew']);

/** A tenant. */
export const companies = pgTable('companies', {
  id: id(),
  name: text('name').notNull(),
  /** The regional pack: wording and rules (us, eu, uk …). */
  region: text('region').notNull().default('us'),
  settings: jsonb('settings').notNull().default({}),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
});

/** A person; may belong to several companies. A deleted one keeps the row, emptied of personal data. */
export const users = pgTable(
  'users',
  {
    id: id(),
    email: text('email').notNull(),
    name: text('name').notNull(),
    passwordHash: text('password_hash'),
    preferences: jsonb('preferences').notNull().default({}),
    emailConfirmedAt: at('email_confirmed_at'),
    createdAt: createdAt(),
    deletedAt: at('deleted_at'),
  },
  (t) => [uniqueIndex('users_email').on(sql`lower(${t.email})`)],
);

export const memberships = pgTable(
  'memberships',
  {
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id, { onDelete: 'cascade' }),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    role: role('role').notNull(),
    createdAt: createdAt(),
  },
  (t) => [primaryKey({ columns: [t.companyId, t.userId] }), index('memberships_user').on(t.userId)],
);

/** What the cookie's token names; revoking the row ends the session at once. */
export const sessions = pgTable(
  'sessions',
  {
    id: id(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    /** The active company; null for a person who belongs to none. */
    companyId: uuid('company_id').references(() => companies.id, { onDelete: 'set null' }),
    userAgent: text('user_agent').notNull().default(''),
    createdAt: createdAt(),
    lastUsedAt: at('last_used_at').notNull().defaultNow(),
    expiresAt: at('expires_at').notNull(),
    revokedAt: at('revoked_at'),
  },
  (t) => [index('sessions_user').on(t.userId)],
);

export const invitations = pgTable(
  'invitations',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id, { onDelete: 'cascade' }),
    email: text('email').notNull(),
    role: role('role').notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    invitedBy: uuid('invited_by')
      .notNull()
      .references(() => users.id),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    acceptedAt: at('accepted_at'),
    revokedAt: at('revoked_at'),
  },
  (t) => [index('invitations_company').on(t.companyId)],
);

export const emailTokenPurpose = pgEnum('email_token_purpose', ['reset-password', 'change-email']);

/** One-time links sent by mail; only the hash is kept. */
export const emailTokens = pgTable(
  'email_tokens',
  {
    id: id(),
    userId: uuid('user_id')
      .notNull()
      .references(() => users.id),
    purpose: emailTokenPurpose('purpose').notNull(),
    tokenHash: text('token_hash').notNull().unique(),
    newEmail: text('new_email'),
    createdAt: createdAt(),
    expiresAt: at('expires_at').notNull(),
    usedAt: at('used_at'),
  },
  (t) => [index('email_tokens_user').on(t.userId)],
);

/** Failed sign-ins, counted per account and address. */
export const signInFailures = pgTable(
  'sign_in_failures',
  {
    id: id(),
    /** Lower-cased e-mail as typed, hashed: it may name nobody. */
    accountKey: text('account_key').notNull(),
    addressKey: text('address_key').notNull(),
    at: at('at').notNull().defaultNow(),
  },
  (t) => [index('sign_in_failures_keys').on(t.accountKey, t.addressKey, t.at)],
);
