import { index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { at, createdAt, id } from './columns.js';
import { companies } from './people.js';

/** Mail to be sent, written in the transaction of what it tells about, sent once by the worker. */
export const mailMessages = pgTable(
  'mail_messages',
  {
    id: id(),
    companyId: uuid('company_id').references(() => companies.id, { onDelete: 'cascade' }),
    to: text('to').notNull(),
    subject: text('subject').notNull(),
    text: text('text').notNull(),
    html: text('html').notNull(),
    /** Files in object storage to send with it: key, name and type of each. */
    attachments: jsonb('attachments').notNull().default([]),
    /** Where an answer goes, if not to the product. */
    replyTo: text('reply_to'),
    attempts: integer('attempts').notNull().default(0),
    createdAt: createdAt(),
    sentAt: at('sent_at'),
  },
  (t) => [index('mail_messages_company').on(t.companyId)],
);
