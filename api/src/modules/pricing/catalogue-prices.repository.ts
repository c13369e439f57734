import type { ItemPrice } from '@lampwright/geometry/price';
import { Inject, Injectable } from '@nestjs/common';
import { and, asc, desc, eq, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { catalogueImports, catalogueItems, cataloguePrices, users } from '../../database/schema/index.js';

export type CataloguePriceRow = typeof cataloguePrices.$inferSelect;
export type PricedItemRow = Pick<typeof catalogueItems.$inferSelect, 'id' | 'item' | 'archivedAt'>;

export interface PriceHistoryRow {
  readonly price: unknown;
  readonly createdAt: Date;
  /** Null for the product itself. */
  readonly by: string | null;
  readonly importedFrom: string | null;
}

/** Prices of catalogue items: rows are only ever added, and the newest of an item holds. */
@Injectable()
export class CataloguePricesRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  private get queries() {
    return this.database.queries;
  }

  /** The price in force of every item that has one. */
  async newest(companyId: string): Promise<CataloguePriceRow[]> {
    return this.queries
      .selectDistinctOn([cataloguePrices.itemId])
      .from(cataloguePrices)
      .where(eq(cataloguePrices.companyId, companyId))
      .orderBy(asc(cataloguePrices.itemId), desc(cataloguePrices.createdAt), desc(cataloguePrices.id));
  }

  async newestOf(companyId: string, itemId: string): Promise<CataloguePriceRow | null> {
    const [row] = await this.queries
      .select()
      .from(cataloguePrices)
      .where(and(eq(cataloguePrices.companyId, companyId), eq(cataloguePrices.itemId, itemId)))
      .orderBy(desc(cataloguePrices.createdAt), desc(cataloguePrices.id))
      .limit(1);
    return row ?? null;
  }

  /** Newest first. */
  async history(companyId: string, itemId: string): Promise<PriceHistoryRow[]> {
    return this.queries
      .select({
        price: cataloguePrices.price,
        createdAt: cataloguePrices.createdAt,
        by: users.name,
        importedFrom: catalogueImports.fileName,
      })
      .from(cataloguePrices)
      .leftJoin(users, eq(users.id, cataloguePrices.createdBy))
      .leftJoin(
        catalogueImports,
        and(eq(catalogueImports.companyId, companyId), eq(catalogueImports.id, cataloguePrices.importId)),
      )
      .where(and(eq(cataloguePrices.companyId, companyId), eq(cataloguePrices.itemId, itemId)))
      .orderBy(desc(cataloguePrices.createdAt), desc(cataloguePrices.id));
  }

  /** Each row is newer than any before it, also within one transaction. */
  async add(
    companyId: string,
    prices: readonly { readonly itemId: string; readonly price: ItemPrice }[],
    createdBy: string | null,
  ): Promise<void> {
    if (prices.length === 0) return;
    const createdAt = sql`clock_timestamp()`;
    await this.queries
      .insert(cataloguePrices)
      .values(prices.map((priced) => ({ ...priced, companyId, createdBy, createdAt })));
  }

  /** Whether the company has the item, archived or not; kept from being priced by others until the transaction ends. */
  async lockItem(companyId: string, itemId: string): Promise<boolean> {
    const rows = await this.queries
      .select({ id: catalogueItems.id })
      .from(catalogueItems)
      .where(and(eq(catalogueItems.companyId, companyId), eq(catalogueItems.id, itemId)))
      .for('no key update');
    return rows.length > 0;
  }

  async hasItem(companyId: string, itemId: string): Promise<boolean> {
    const rows = await this.queries
      .select({ id: catalogueItems.id })
      .from(catalogueItems)
      .where(and(eq(catalogueItems.companyId, companyId), eq(catalogueItems.id, itemId)));
    return rows.length > 0;
  }

  /** All items, archived ones last, in the order of the catalogue. */
  async items(companyId: string): Promise<PricedItemRow[]> {
    return this.queries
      .select({ id: catalogueItems.id, item: catalogueItems.item, archivedAt: catalogueItems.archivedAt })
      .from(catalogueItems)
      .where(eq(catalogueItems.companyId, companyId))
      .orderBy(
        sql`${catalogueItems.archivedAt} is not null`,
        asc(catalogueItems.category),
        asc(sql`lower(${catalogueItems.name})`),
        asc(catalogueItems.id),
      );
  }
}
