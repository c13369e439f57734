import { Inject, Injectable } from '@nestjs/common';
import {
  and,
  asc,
  count,
  desc,
  eq,
  ilike,
  inArray,
  isNotNull,
  isNull,
  or,
  type SQL,
  type SQLWrapper,
  sql,
} from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { clients, jobs, planSummaries, plans, properties, sheets } from '../../database/schema/index.js';
import { containing } from '../../database/search.js';
import type { JobStage } from './jobs.dto.js';
import { lastEdit } from './jobs.repository.js';

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
        propertyId: jobs.propertyId,
        name: jobs.name,
        stage: jobs.stage,
        existingSystem: jobs.existingSystem,
        createdAt: jobs.createdAt,
        archivedAt: jobs.archivedAt,
        updatedAt: lastEdit.mapWith(jobs.updatedAt).as('last_updated'),
      })
      .from(jobs)
      .leftJoin(plans, and(eq(plans.companyId, jobs.companyId), eq(plans.jobId, jobs.id)))
      .where(this.matching(companyId, filter))
      .orderBy(...ordering({ ...jobs, updatedAt: lastEdit }, order))
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
        client: { id: clients.id, name: clients.name },
        property: { id: properties.id, name: properties.name, address: properties.address },
        thumbnailSheetId: thumbnail.sheetId,
        faults: summary.faults,
        cautions: summary.cautions,
        fixtures: summary.fixtures,
      })
      .from(chosen)
      .innerJoin(properties, and(eq(properties.companyId, companyId), eq(properties.id, chosen.propertyId)))
      .innerJoin(clients, and(eq(clients.companyId, companyId), eq(clients.id, properties.clientId)))
      .leftJoinLateral(thumbnail, sql`true`)
      .leftJoinLateral(summary, sql`true`)
      .orderBy(...ordering(chosen, order));
  }

  async count(companyId: string, filter: JobFilter): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: count() })
      .from(jobs)
      .where(this.matching(companyId, filter));
    return row?.n ?? 0;
  }

  /** What a search finds by client and property is gathered once, not asked anew for every job. */
  private matching(companyId: string, { search, stage, archived }: JobFilter): SQL | undefined {
    const pattern = containing(search);
    const places = this.database.queries
      .select({ id: properties.id })
      .from(properties)
      .innerJoin(
        clients,
        and(eq(clients.companyId, properties.companyId), eq(clients.id, properties.clientId)),
      )
      .where(
        and(
          eq(properties.companyId, companyId),
          // As one text: folding case is what searching costs.
          sql`concat_ws(E'\\n', ${clients.name}, ${properties.name}, ${properties.address}) ILIKE ${pattern}`,
        ),
      );
    return and(
      eq(jobs.companyId, companyId),
      archived ? isNotNull(jobs.archivedAt) : isNull(jobs.archivedAt),
      stage === null ? undefined : eq(jobs.stage, stage),
      search === '' ? undefined : or(ilike(jobs.name, pattern), inArray(jobs.propertyId, places)),
    );
  }
}

interface Sortable {
  readonly id: SQLWrapper;
  readonly name: SQLWrapper;
  readonly stage: SQLWrapper;
  readonly createdAt: SQLWrapper;
  readonly updatedAt: SQLWrapper;
}

function ordering({ id, name, stage, createdAt, updatedAt }: Sortable, { by, direction }: JobOrder): SQL[] {
  const to = direction === 'asc' ? asc : desc;
  switch (by) {
    case 'updated':
      return [to(updatedAt), asc(id)];
    case 'created':
      return [to(createdAt), asc(id)];
    case 'name':
      return [to(sql`lower(${name})`), asc(id)];
    case 'stage':
      return [to(stage), desc(updatedAt), asc(id)];
  }
}
