import { Inject, Injectable } from '@nestjs/common';
import { eq, like, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { companies, idempotencyKeys } from '../../database/schema/index.js';
import { companyScope } from '../../http/once.repository.js';

export type CompanyRow = typeof companies.$inferSelect;

@Injectable()
export class CompaniesRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async insert(name: string, region: string): Promise<string> {
    const [row] = await this.database.queries
      .insert(companies)
      .values({ name, region })
      .returning({ id: companies.id });
    return row!.id;
  }

  async find(companyId: string): Promise<CompanyRow | null> {
    const [row] = await this.database.queries.select().from(companies).where(eq(companies.id, companyId));
    return row ?? null;
  }

  /** The same, kept from changing until the running transaction ends. */
  async lock(companyId: string): Promise<CompanyRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(companies)
      .where(eq(companies.id, companyId))
      .for('no key update');
    return row ?? null;
  }

  async update(
    companyId: string,
    values: Partial<Pick<CompanyRow, 'name' | 'region' | 'settings'>>,
  ): Promise<CompanyRow | null> {
    const [row] = await this.database.queries
      .update(companies)
      .set({ ...values, updatedAt: sql`now()` })
      .where(eq(companies.id, companyId))
      .returning();
    return row ?? null;
  }

  /** Takes every record of the company with it, and what its people and its homeowners were answered. */
  async delete(companyId: string): Promise<void> {
    await this.database.queries
      .delete(idempotencyKeys)
      .where(like(idempotencyKeys.scope, `${companyScope(companyId)}%`));
    await this.database.queries.delete(companies).where(eq(companies.id, companyId));
  }
}
