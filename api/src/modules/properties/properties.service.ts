import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { badInput, notFound } from '../../http/app-error.js';
import { ClientsService } from '../clients/clients.service.js';
import type { NewProperty, Property, PropertyEdit, PropertyList } from './properties.dto.js';
import { PropertiesRepository, type PropertyRow } from './properties.repository.js';

@Injectable()
export class PropertiesService {
  constructor(
    @Inject(PropertiesRepository) private readonly repository: PropertiesRepository,
    @Inject(ClientsService) private readonly clients: ClientsService,
  ) {}

  async list(actor: Actor, clientId: string): Promise<PropertyList> {
    demand(actor, 'clients.read');
    const rows = await this.repository.listOfClient(actor.companyId, clientId);
    return { items: rows.map(propertyOf) };
  }

  async get(actor: Actor, id: string): Promise<Property> {
    demand(actor, 'clients.read');
    return found(await this.repository.find(actor.companyId, id));
  }

  async create(actor: Actor, input: NewProperty): Promise<Property> {
    demand(actor, 'clients.edit');
    checkPlace(input.latitude, input.longitude);
    // Reading the client through its own service also keeps other companies' clients out.
    await this.clients.get(actor, input.clientId);
    return propertyOf(await this.repository.insert(actor.companyId, input));
  }

  async edit(actor: Actor, id: string, edit: PropertyEdit): Promise<Property> {
    demand(actor, 'clients.edit');
    const present = found(await this.repository.find(actor.companyId, id));
    const { latitude = present.latitude, longitude = present.longitude } = edit;
    checkPlace(latitude, longitude);
    return found(await this.repository.update(actor.companyId, id, edit));
  }
}

function checkPlace(latitude: number | null | undefined, longitude: number | null | undefined): void {
  if ((latitude ?? null) === null && (longitude ?? null) !== null)
    throw badInput([{ pointer: '/latitude', detail: 'A longitude needs a latitude with it.' }]);
  if ((latitude ?? null) !== null && (longitude ?? null) === null)
    throw badInput([{ pointer: '/longitude', detail: 'A latitude needs a longitude with it.' }]);
}

function found(row: PropertyRow | null): Property {
  if (!row) throw notFound('This property');
  return propertyOf(row);
}

function propertyOf(row: PropertyRow): Property {
  return {
    id: row.id,
    clientId: row.clientId,
    name: row.name,
    address: row.address,
    region: row.region,
    accessNotes: row.accessNotes,
    latitude: row.latitude,
    longitude: row.longitude,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}
