import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { UsersRepository } from '../../access/users.repository.js';
import { Database } from '../../database/database.js';
import { badInput, notFound } from '../../http/app-error.js';
import { ClientsService } from '../clients/clients.service.js';
import { PropertiesService } from '../properties/properties.service.js';
import { thumbnailUrl } from '../sheets/sheet-urls.js';
import { SheetsService } from '../sheets/sheets.service.js';
import { JobEvents } from '../timeline/job-events.repository.js';
import { JobListRepository } from './job-list.repository.js';
import type { Job, JobEdit, JobList, JobListQuery, NewJob } from './jobs.dto.js';
import { type JobRow, JobsRepository } from './jobs.repository.js';
import { type SiteWalk, siteWalkSchema } from './site-walk.dto.js';

const PAGE_SIZE = 25;

@Injectable()
export class JobsService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(JobsRepository) private readonly repository: JobsRepository,
    @Inject(JobListRepository) private readonly lists: JobListRepository,
    @Inject(ClientsService) private readonly clients: ClientsService,
    @Inject(PropertiesService) private readonly properties: PropertiesService,
    @Inject(SheetsService) private readonly sheets: SheetsService,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(JobEvents) private readonly events: JobEvents,
  ) {}

  async list(actor: Actor, query: JobListQuery): Promise<JobList> {
    demand(actor, 'jobs.read');
    const { page = 1, pageSize = PAGE_SIZE, sort = 'updated' } = query;
    const filter = {
      search: query.search ?? '',
      stage: query.stage ?? null,
      archived: query.archived === 'true',
    };
    // Newest first, but names and stages from their beginning.
    const direction = query.direction ?? (sort === 'updated' || sort === 'created' ? 'desc' : 'asc');
    const order = { by: sort, direction } as const;
    const [rows, total] = await Promise.all([
      this.lists.page(actor.companyId, filter, order, pageSize, (page - 1) * pageSize),
      this.lists.count(actor.companyId, filter),
    ]);
    const items = rows.map(({ thumbnailSheetId, updatedAt, archivedAt, ...row }) => ({
      ...row,
      thumbnailUrl: thumbnailSheetId === null ? null : thumbnailUrl(thumbnailSheetId),
      updatedAt: updatedAt.toISOString(),
      archivedAt: archivedAt?.toISOString() ?? null,
    }));
    return { items, total, page, pageSize };
  }

  async get(actor: Actor, id: string): Promise<Job> {
    demand(actor, 'jobs.read');
    return this.whole(actor, found(await this.repository.find(actor.companyId, id)));
  }

  /** Makes the job, and with it the client and the property where they are new: all or nothing. */
  async create(actor: Actor, input: NewJob): Promise<Job> {
    demand(actor, 'jobs.edit');
    const { client, property } = input;
    return this.database.transaction(async () => {
      const { id: clientId } =
        'id' in client ? await this.clients.get(actor, client.id) : await this.clients.create(actor, client);
      const place =
        'id' in property
          ? await this.properties.get(actor, property.id)
          : await this.properties.create(actor, { ...property, clientId });
      if (place.clientId !== clientId)
        throw badInput([{ pointer: '/property/id', detail: 'This property belongs to another client.' }]);
      const row = await this.repository.insert(actor.companyId, {
        name: input.name,
        propertyId: place.id,
        existingSystem: input.existingSystem ?? false,
        notes: input.notes ?? '',
      });
      return this.whole(actor, row);
    });
  }

  async edit(actor: Actor, id: string, edit: JobEdit): Promise<Job> {
    demand(actor, 'jobs.edit');
    const { siteWalkOn, installOn, ...rest } = edit;
    return this.database.transaction(async () => {
      const before = found(await this.repository.lock(actor.companyId, id));
      const row = await this.repository.update(actor.companyId, id, {
        ...rest,
        siteWalkOn: startOfDay(siteWalkOn),
        installOn: startOfDay(installOn),
      });
      if (edit.stage !== undefined && edit.stage !== before.stage)
        await this.events.note(
          { companyId: actor.companyId, jobId: id },
          'stage-changed',
          { from: before.stage, to: edit.stage },
          { id: actor.userId, name: (await this.users.find(actor.userId))?.name ?? '' },
        );
      return this.whole(actor, found(row));
    });
  }

  async saveSiteWalk(actor: Actor, id: string, siteWalk: SiteWalk): Promise<Job> {
    demand(actor, 'jobs.survey');
    return this.whole(actor, found(await this.repository.update(actor.companyId, id, { siteWalk })));
  }

  async archive(actor: Actor, id: string): Promise<Job> {
    demand(actor, 'jobs.edit');
    const archivedAt = new Date();
    return this.whole(actor, found(await this.repository.update(actor.companyId, id, { archivedAt })));
  }

  async restore(actor: Actor, id: string): Promise<Job> {
    demand(actor, 'jobs.edit');
    return this.whole(actor, found(await this.repository.update(actor.companyId, id, { archivedAt: null })));
  }

  private async whole(actor: Actor, row: JobRow): Promise<Job> {
    const property = await this.properties.get(actor, row.propertyId);
    const client = await this.clients.get(actor, property.clientId);
    const sheets = await this.sheets.listOfJob(actor, row.id);
    const editedAt = (await this.repository.editedAt(actor.companyId, row.id)) ?? row.updatedAt;
    const siteWalk = siteWalkSchema.safeParse(row.siteWalk);
    return {
      id: row.id,
      name: row.name,
      stage: row.stage,
      existingSystem: row.existingSystem,
      notes: row.notes,
      siteWalkOn: dayOf(row.siteWalkOn),
      installOn: dayOf(row.installOn),
      client,
      property,
      siteWalk: siteWalk.success ? siteWalk.data : null,
      sheets: sheets.items,
      createdAt: row.createdAt.toISOString(),
      updatedAt: editedAt.toISOString(),
      archivedAt: row.archivedAt?.toISOString() ?? null,
    };
  }
}

function found(row: JobRow | null): JobRow {
  if (!row) throw notFound('This job');
  return row;
}

/** Days are kept as their beginning in UTC. Undefined leaves the present one. */
const startOfDay = (day: string | null | undefined): Date | null | undefined =>
  typeof day === 'string' ? new Date(`${day}T00:00:00Z`) : day;
const dayOf = (date: Date | null): string | null => date?.toISOString().slice(0, 10) ?? null;
