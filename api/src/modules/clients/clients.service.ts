import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { notFound } from '../../http/app-error.js';
import type { Client, ClientEdit, ClientList, ClientListQuery, NewClient } from './clients.dto.js';
import { type ClientRow, ClientsRepository } from './clients.repository.js';

const PAGE_SIZE = 50;

@Injectable()
export class ClientsService {
  constructor(@Inject(ClientsRepository) private readonly repository: ClientsRepository) {}

  async list(actor: Actor, query: ClientListQuery): Promise<ClientList> {
    demand(actor, 'clients.read');
    const { page = 1, pageSize = PAGE_SIZE } = query;
    const filter = { search: query.search ?? '', archived: query.archived === 'true' };
    const [rows, total] = await Promise.all([
      this.repository.list(actor.companyId, filter, { limit: pageSize, offset: (page - 1) * pageSize }),
      this.repository.count(actor.companyId, filter),
    ]);
    return { items: rows.map((row) => ({ ...clientOf(row), jobs: row.jobs })), total, page, pageSize };
  }

  async get(actor: Actor, id: string): Promise<Client> {
    demand(actor, 'clients.read');
    return found(await this.repository.find(actor.companyId, id));
  }

  async create(actor: Actor, input: NewClient): Promise<Client> {
    demand(actor, 'clients.edit');
    const { name, email, phone } = input;
    return clientOf(
      await this.repository.insert(actor.companyId, { name, email: email || null, phone: phone || null }),
    );
  }

  async edit(actor: Actor, id: string, edit: ClientEdit): Promise<Client> {
    demand(actor, 'clients.edit');
    return found(await this.repository.update(actor.companyId, id, edit));
  }

  async archive(actor: Actor, id: string): Promise<Client> {
    demand(actor, 'clients.edit');
    return found(await this.repository.update(actor.companyId, id, { archivedAt: new Date() }));
  }

  async restore(actor: Actor, id: string): Promise<Client> {
    demand(actor, 'clients.edit');
    return found(await this.repository.update(actor.companyId, id, { archivedAt: null }));
  }
}

function found(row: ClientRow | null): Client {
  if (!row) throw notFound('This client');
  return clientOf(row);
}

function clientOf(row: ClientRow): Client {
  return {
    id: row.id,
    name: row.name,
    email: row.email,
    phone: row.phone,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    archivedAt: row.archivedAt?.toISOString() ?? null,
  };
}
