import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { properties } from '../../database/schema/index.js';
import type { NewProperty, PropertyEdit } from './properties.dto.js';

export type PropertyRow = typeof properties.$inferSelect;

@Injectable()
export class PropertiesRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async listOfClient(companyId: string, clientId: string): Promise<PropertyRow[]> {
    return this.database.queries
      .select()
      .from(properties)
      .where(
        and(
          eq(properties.companyId, companyId),
          eq(properties.clientId, clientId),
          isNull(properties.archivedAt),
        ),
      )
      .orderBy(asc(properties.createdAt), asc(properties.id));
  }

  async find(companyId: string, id: string): Promise<PropertyRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(properties)
      .where(and(eq(properties.companyId, companyId), eq(properties.id, id)));
    return row ?? null;
  }

  async insert(companyId: string, values: NewProperty): Promise<PropertyRow> {
    const [row] = await this.database.queries
      .insert(properties)
      .values({ ...values, companyId })
      .returning();
    return row!;
  }

  async update(companyId: string, id: string, values: PropertyEdit): Promise<PropertyRow | null> {
    const [row] = await this.database.queries
      .update(properties)
      .set({ ...values, updatedAt: sql`now()` })
      .where(and(eq(properties.companyId, companyId), eq(properties.id, id)))
      .returning();
    return row ?? null;
  }
}
