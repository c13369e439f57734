import { Inject, Injectable } from '@nestjs/common';
import { and, eq, inArray, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { clients, jobs, properties, sheets, users } from '../../database/schema/index.js';

/** Who a proposal is from and for, and the pictures that go with it. */
@Injectable()
export class PartiesRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async ofJob(companyId: string, jobId: string) {
    const [row] = await this.database.queries
      .select({
        job: { id: jobs.id, name: jobs.name },
        property: {
          name: properties.name,
          address: properties.address,
          latitude: properties.latitude,
          longitude: properties.longitude,
        },
        client: { name: clients.name, email: clients.email, phone: clients.phone },
      })
      .from(jobs)
      .innerJoin(
        properties,
        and(eq(properties.companyId, jobs.companyId), eq(properties.id, jobs.propertyId)),
      )
      .innerJoin(clients, and(eq(clients.companyId, jobs.companyId), eq(clients.id, properties.clientId)))
      .where(and(eq(jobs.companyId, companyId), eq(jobs.id, jobId)));
    return row ?? null;
  }

  /** Where the pictures of these sheets are stored; those without one are left out. */
  async pictures(companyId: string, sheetIds: readonly string[]): Promise<Map<string, string>> {
    if (sheetIds.length === 0) return new Map();
    const rows = await this.database.queries
      .select({ id: sheets.id, key: sheets.imageKey })
      .from(sheets)
      .where(
        and(
          eq(sheets.companyId, companyId),
          // Ids of a plan are any text: one that is no uuid has no picture.
          inArray(sql<string>`${sheets.id}::text`, [...sheetIds]),
        ),
      );
    return new Map(rows.flatMap(({ id, key }) => (key === null ? [] : [[id, key] as const])));
  }

  /** Empty for somebody who is no longer known. */
  async person(userId: string): Promise<{ readonly name: string; readonly email: string }> {
    const [row] = await this.database.queries
      .select({ name: users.name, email: users.email })
      .from(users)
      .where(eq(users.id, userId));
    return row ?? { name: '', email: '' };
  }
}
