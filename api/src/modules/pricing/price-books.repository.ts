import { Inject, Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { priceBooks } from '../../database/schema/index.js';

export type PriceBookRow = typeof priceBooks.$inferSelect;

/** The price book of each company; a company that never saved one has no row. */
@Injectable()
export class PriceBooksRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async find(companyId: string): Promise<PriceBookRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(priceBooks)
      .where(eq(priceBooks.companyId, companyId));
    return row ?? null;
  }

  /** Saves on top of a version, 0 for the first time; null when the book is at another one. */
  async save(companyId: string, baseVersion: number, book: unknown): Promise<PriceBookRow | null> {
    const { queries } = this.database;
    const saved =
      baseVersion === 0
        ? queries.insert(priceBooks).values({ companyId, book }).onConflictDoNothing()
        : queries
            .update(priceBooks)
            .set({ book, version: baseVersion + 1, updatedAt: sql`now()` })
            .where(and(eq(priceBooks.companyId, companyId), eq(priceBooks.version, baseVersion)));
    const [row] = await saved.returning();
    return row ?? null;
  }
}
