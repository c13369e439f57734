import { Inject, Injectable } from '@nestjs/common';
import { and, asc, count, eq, ilike, isNotNull, isNull, or, type SQL, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { clients, jobs, properties } from '../../database/schema/index.js';
import { containing } from '../../database/search.js';

export type ClientRow = typeof clients.$inferSelect;
export interface ClientFilter {
  readonly search: string;
  readonly archived: boolean;
}

@Injectable()
export class ClientsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async list(
    companyId: string,
    filter: ClientFilter,
    page: { limit: number; offset: number },
  ): Promise<(ClientRow & { jobs: number })[]> {
    const rows = await this.database.queries
      .select({ client: clients, jobs: count(jobs.id) })
      .from(clients)
      .leftJoin(
        properties,
        and(eq(properties.companyId, clients.companyId), eq(properties.clientId, clients.id)),
      )
      .leftJoin(
        jobs,
        and(
          eq(jobs.companyId, properties.companyId),
          eq(jobs.propertyId, properties.id),
          isNull(jobs.archivedAt),
        ),
      )
      .where(matching(companyId, filter))
      .groupBy(clients.id)
      .orderBy(asc(sql`lower(${clients.name})`), asc(clients.id))
      .limit(page.limit)
      .offset(page.offset);
    return rows.map((row) => ({ ...row.client, jobs: row.jobs }));
  }

  async count(companyId: string, filter: ClientFilter): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: count() })
      .from(clients)
      .where(matching(companyId, filter));
    return row?.n ?? 0;
  }

  async find(companyId: string, id: string): Promise<ClientRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(clients)
      .where(and(eq(clients.companyId, companyId), eq(clients.id, id)));
    return row ?? null;
  }

  async insert(
    companyId: string,
    values: { name: string; email: string | null; phone: string | null },
  ): Promise<ClientRow> {
    const [row] = await this.database.queries
      .insert(clients)
      .values({ ...values, companyId })
      .returning();
    return row!;
  }

  async update(
    companyId: string,
    id: string,
    values: Partial<Pick<ClientRow, 'name' | 'email' | 'phone' | 'archivedAt'>>,
  ): Promise<ClientRow | null> {
    const [row] = await this.database.queries
      .update(clients)
      .set({ ...values, updatedAt: sql`now()` })
      .where(and(eq(clients.companyId, companyId), eq(clients.id, id)))
      .returning();
    return row ?? null;
  }
}

function matching(companyId: string, { search, archived }: ClientFilter): SQL | undefined {
  const pattern = containing(search);
  return and(
    eq(clients.companyId, companyId),
    archived ? isNotNull(clients.archivedAt) : isNull(clients.archivedAt),
    search === ''
      ? undefined
      : or(ilike(clients.name, pattern), ilike(clients.email, pattern), ilike(clients.phone, pattern)),
  );
}
