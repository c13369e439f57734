import { Inject, Injectable } from '@nestjs/common';
import { and, asc, desc, eq, ilike, isNotNull, isNull, or, type SQL, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { clients, jobs, planSummaries, plans, properties, sheets } from '../../database/schema/index.js';
import { containing } from '../../database/search.js';
import type { JobStage } from './jobs.dto.js';

export interface JobFilter {
  readonly search: string;
  readonly stage: JobStage | null;
  readonly archived: boolean;
}
export interface JobOrder {
  readonly by: 'updated' | 'name' | 'stage' | 'created';
  readonly direction: 'asc' | 'desc';
}

/** The list of jobs: a page of them with the figures that the list shows. */
@Injectable()
export class JobListRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Only the jobs of the page are looked into further, so that the length of the whole list costs little. */
  async page(companyId: string, filter: JobFilter, order: JobOrder, limit: number, offset: number) {
    const chosen = this.database.queries
      .select({
        id: jobs.id,
        name: jobs.name,
        stage: jobs.stage,
        existingSystem: jobs.existingSystem,
        archivedAt: jobs.archivedAt,
        updatedAt: sql<Date>`greatest(${jobs.updatedAt}, ${plans.updatedAt})`
          .mapWith(jobs.updatedAt)
          .as('last_updated'),
        clientId: sql<string>`${clients.id}`.as('client_id'),
        clientName: sql<string>`${clients.name}`.as('client_name'),
        propertyId: sql<string>`${properties.id}`.as('property_id'),
        propertyName: sql<string>`${properties.name}`.as('property_name'),
        address: properties.address,
        total: sql<number>`(count(*) OVER ())::int`.as('total'),
        place: sql<number>`row_number() OVER (ORDER BY ${sql.join(ordering(order), sql`, `)})`.as('place'),
      })
      .from(jobs)
      .innerJoin(
        properties,
        and(eq(properties.companyId, jobs.companyId), eq(properties.id, jobs.propertyId)),
      )
      .innerJoin(
        clients,
        and(eq(clients.companyId, properties.companyId), eq(clients.id, properties.clientId)),
      )
      .leftJoin(plans, and(eq(plans.companyId, jobs.companyId), eq(plans.jobId, jobs.id)))
      .where(matching(companyId, filter))
      .orderBy(sql`place`)
      .limit(limit)
      .offset(offset)
      .as('chosen');

    const thumbnail = this.database.queries
      .select({ sheetId: sheets.id })
      .from(sheets)
      .where(
        and(
          eq(sheets.companyId, companyId),
          eq(sheets.jobId, chosen.id),
          eq(sheets.status, 'ready'),
          isNull(sheets.archivedAt),
        ),
      )
      .orderBy(asc(sheets.createdAt), asc(sheets.id))
      .limit(1)
      .as('thumbnail');
    const summary = this.database.queries
      .select({
        faults: planSummaries.faults,
        cautions: planSummaries.cautions,
        fixtures: planSummaries.fixtures,
      })
      .from(planSummaries)
      .where(and(eq(planSummaries.companyId, companyId), eq(planSummaries.jobId, chosen.id)))
      .orderBy(desc(planSummaries.planVersion), desc(planSummaries.createdAt))
      .limit(1)
      .as('summary');

    return this.database.queries
      .select({
        id: chosen.id,
        name: chosen.name,
        stage: chosen.stage,
        existingSystem: chosen.existingSystem,
        archivedAt: chosen.archivedAt,
        updatedAt: chosen.updatedAt,
        client: { id: chosen.clientId, name: chosen.clientName },
        property: { id: chosen.propertyId, name: chosen.propertyName, address: chosen.address },
        total: chosen.total,
        thumbnailSheetId: thumbnail.sheetId,
        faults: summary.faults,
        cautions: summary.cautions,
        fixtures: summary.fixtures,
      })
      .from(chosen)
      .leftJoinLateral(thumbnail, sql`true`)
      .leftJoinLateral(summary, sql`true`)
      .orderBy(chosen.place);
  }

  /** For pages beyond the end, which bring no row to tell the total. */
  async count(companyId: string, filter: JobFilter): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: sql<number>`count(*)::int` })
      .from(jobs)
      .innerJoin(
        properties,
        and(eq(properties.companyId, jobs.companyId), eq(properties.id, jobs.propertyId)),
      )
      .innerJoin(
        clients,
        and(eq(clients.companyId, properties.companyId), eq(clients.id, properties.clientId)),
      )
      .where(matching(companyId, filter));
    return row?.n ?? 0;
  }
}

function matching(companyId: string, { search, stage, archived }: JobFilter): SQL | undefined {
  const pattern = containing(search);
  return and(
    eq(jobs.companyId, companyId),
    archived ? isNotNull(jobs.archivedAt) : isNull(jobs.archivedAt),
    stage === null ? undefined : eq(jobs.stage, stage),
    search === ''
      ? undefined
      : or(
          ilike(jobs.name, pattern),
          ilike(clients.name, pattern),
          ilike(properties.name, pattern),
          ilike(properties.address, pattern),
        ),
  );
}

function ordering({ by, direction }: JobOrder): SQL[] {
  const to = direction === 'asc' ? asc : desc;
  const updated = sql`greatest(${jobs.updatedAt}, ${plans.updatedAt})`;
  switch (by) {
    case 'updated':
      return [to(updated), asc(jobs.id)];
    case 'created':
      return [to(jobs.createdAt), asc(jobs.id)];
    case 'name':
      return [to(sql`lower(${jobs.name})`), asc(jobs.id)];
    case 'stage':
      return [to(jobs.stage), desc(updated), asc(jobs.id)];
  }
}
