import { index, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { at, createdAt, id, updatedAt } from './columns.js';
import { companies } from './people.js';

/** What the company installs. A plan keeps its own copy of each item it uses. */
export const catalogueItems = pgTable(
  'catalogue_items',
  {
    id: id(),
    companyId: uuid('company_id')
      .notNull()
      .references(() => companies.id, { onDelete: 'cascade' }),
    category: text('category').notNull(),
    name: text('name').notNull(),
    item: jsonb('item').notNull(),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    archivedAt: at('archived_at'),
  },
  (t) => [index('catalogue_items_company').on(t.companyId, t.category, t.name)],
);
