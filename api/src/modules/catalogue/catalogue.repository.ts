import type { CatalogueCategory, CatalogueItem } from '@lampwright/geometry/catalogue';
import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, ilike, isNotNull, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { catalogueItems } from '../../database/schema/index.js';
import { containing } from '../../database/search.js';

export type CatalogueRow = typeof catalogueItems.$inferSelect;
export interface CatalogueFilter {
  readonly category: CatalogueCategory | null;
  readonly search: string;
  readonly archived: boolean;
}

@Injectable()
export class CatalogueRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async list(companyId: string, { category, search, archived }: CatalogueFilter): Promise<CatalogueRow[]> {
    return this.database.queries
      .select()
      .from(catalogueItems)
      .where(
        and(
          eq(catalogueItems.companyId, companyId),
          archived ? isNotNull(catalogueItems.archivedAt) : isNull(catalogueItems.archivedAt),
          category === null ? undefined : eq(catalogueItems.category, category),
          search === '' ? undefined : ilike(catalogueItems.name, containing(search)),
        ),
      )
      .orderBy(asc(catalogueItems.category), asc(sql`lower(${catalogueItems.name})`), asc(catalogueItems.id));
  }

  async insert(companyId: string, items: readonly CatalogueItem[]): Promise<CatalogueRow[]> {
    return this.database.queries
      .insert(catalogueItems)
      .values(items.map((item) => ({ companyId, category: item.category, name: item.name, item })))
      .returning();
  }

  async replace(companyId: string, id: string, item: CatalogueItem): Promise<CatalogueRow | null> {
    const [row] = await this.database.queries
      .update(catalogueItems)
      .set({ category: item.category, name: item.name, item, updatedAt: sql`now()` })
      .where(and(eq(catalogueItems.companyId, companyId), eq(catalogueItems.id, id)))
      .returning();
    return row ?? null;
  }

  async setArchived(companyId: string, id: string, archivedAt: Date | null): Promise<CatalogueRow | null> {
    const [row] = await this.database.queries
      .update(catalogueItems)
      .set({ archivedAt, updatedAt: sql`now()` })
      .where(and(eq(catalogueItems.companyId, companyId), eq(catalogueItems.id, id)))
      .returning();
    return row ?? null;
  }
}
