import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import type { ItemPrice } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { and, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { catalogueImports, catalogueItems, cataloguePrices, users } from '../../database/schema/index.js';

export type ImportRecord = typeof catalogueImports.$inferSelect;
type NewImport = Pick<ImportRecord, 'id' | 'fileName' | 'summary' | 'undo' | 'createdBy'>;

/** Imports listed; older ones can't be undone on the screen any more. */
const LISTED = 50;

@Injectable()
export class CatalogueImportsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  /** Others who import, or undo, wait until the transaction ends. */
  async alone(companyId: string): Promise<void> {
    await this.queries.execute(
      sql`SELECT pg_advisory_xact_lock(hashtextextended(${`catalogue ${companyId}`}, 0))`,
    );
  }

  async insert(companyId: string, values: NewImport): Promise<ImportRecord> {
    const [row] = await this.queries
      .insert(catalogueImports)
      .values({ ...values, companyId })
      .returning();
    return row!;
  }

  async find(companyId: string, id: string): Promise<ImportRecord | null> {
    const [row] = await this.queries
      .select()
      .from(catalogueImports)
      .where(and(eq(catalogueImports.companyId, companyId), eq(catalogueImports.id, id)));
    return row ?? null;
  }

  /** Newest first. */
  async list(companyId: string): Promise<(ImportRecord & { by: string | null })[]> {
    const rows = await this.queries
      .select({ record: catalogueImports, by: users.name })
      .from(catalogueImports)
      .leftJoin(users, eq(users.id, catalogueImports.createdBy))
      .where(eq(catalogueImports.companyId, companyId))
      .orderBy(desc(catalogueImports.createdAt), desc(catalogueImports.id))
      .limit(LISTED);
    return rows.map(({ record, by }) => ({ ...record, by }));
  }

  async markUndone(companyId: string, id: string): Promise<void> {
    await this.queries
      .update(catalogueImports)
      .set({ undoneAt: sql`now()` })
      .where(and(eq(catalogueImports.companyId, companyId), eq(catalogueImports.id, id)));
  }

  async addPrices(
    companyId: string,
    importId: string,
    createdBy: string,
    prices: readonly { readonly itemId: string; readonly price: ItemPrice }[],
  ): Promise<void> {
    if (prices.length === 0) return;
    const createdAt = sql`clock_timestamp()`;
    await this.queries
      .insert(cataloguePrices)
      .values(prices.map((priced) => ({ ...priced, companyId, importId, createdBy, createdAt })));
  }

  /** Takes back the prices of an import, so that those before them hold again. */
  async removePrices(companyId: string, importId: string): Promise<void> {
    await this.queries
      .delete(cataloguePrices)
      .where(and(eq(cataloguePrices.companyId, companyId), eq(cataloguePrices.importId, importId)));
  }

  async items(companyId: string, ids: readonly string[]): Promise<Map<string, unknown>> {
    if (ids.length === 0) return new Map();
    const rows = await this.queries
      .select({ id: catalogueItems.id, item: catalogueItems.item })
      .from(catalogueItems)
      .where(
        and(
          eq(catalogueItems.companyId, companyId),
          isNull(catalogueItems.archivedAt),
          inArray(catalogueItems.id, [...ids]),
        ),
      );
    return new Map(rows.map(({ id, item }) => [id, item]));
  }

  async insertItems(
    companyId: string,
    items: readonly { readonly id: string; readonly item: CatalogueItem }[],
  ): Promise<void> {
    if (items.length === 0) return;
    await this.queries
      .insert(catalogueItems)
      .values(
        items.map(({ id, item }) => ({ id, companyId, category: item.category, name: item.name, item })),
      );
  }

  async archive(companyId: string, ids: readonly string[]): Promise<void> {
    if (ids.length === 0) return;
    await this.queries
      .update(catalogueItems)
      .set({ archivedAt: sql`now()`, updatedAt: sql`now()` })
      .where(and(eq(catalogueItems.companyId, companyId), inArray(catalogueItems.id, [...ids])));
  }
}
