import { type CatalogueItem, catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { notFound } from '../../http/app-error.js';
import type { Catalogue, CatalogueEntry, CatalogueQuery } from './catalogue.dto.js';
import { CatalogueRepository, type CatalogueRow } from './catalogue.repository.js';
import { starterCatalogue } from './starter/index.js';

@Injectable()
export class CatalogueService {
  constructor(@Inject(CatalogueRepository) private readonly repository: CatalogueRepository) {}

  async list(actor: Actor, query: CatalogueQuery): Promise<Catalogue> {
    demand(actor, 'catalogue.read');
    const rows = await this.repository.list(actor.companyId, {
      category: query.category ?? null,
      search: query.search ?? '',
      archived: query.archived === 'true',
    });
    return { items: rows.map(entryOf) };
  }

  async add(actor: Actor, item: CatalogueItem): Promise<CatalogueEntry> {
    demand(actor, 'catalogue.edit');
    const [row] = await this.repository.insert(actor.companyId, [item]);
    return found(row ?? null);
  }

  async replace(actor: Actor, id: string, item: CatalogueItem): Promise<CatalogueEntry> {
    demand(actor, 'catalogue.edit');
    return found(await this.repository.replace(actor.companyId, id, item));
  }

  async archive(actor: Actor, id: string): Promise<CatalogueEntry> {
    demand(actor, 'catalogue.edit');
    return found(await this.repository.setArchived(actor.companyId, id, new Date()));
  }

  async restore(actor: Actor, id: string): Promise<CatalogueEntry> {
    demand(actor, 'catalogue.edit');
    return found(await this.repository.setArchived(actor.companyId, id, null));
  }

  /** Gives a new company its own copy of the starter catalogue; called within the transaction of sign-up. */
  async seed(companyId: string): Promise<void> {
    await this.repository.insert(companyId, starterCatalogue);
  }

  /** A company's items by their names, for building plans outside of a request. */
  async byName(companyId: string): Promise<ReadonlyMap<string, { sourceId: string; item: CatalogueItem }>> {
    const rows = await this.repository.list(companyId, { category: null, search: '', archived: false });
    return new Map(
      rows.map((row) => [row.name, { sourceId: row.id, item: catalogueItemSchema.parse(row.item) }]),
    );
  }
}

function found(row: CatalogueRow | null): CatalogueEntry {
  if (!row) throw notFound('This catalogue item');
  return entryOf(row);
}

function entryOf(row: CatalogueRow): CatalogueEntry {
  return {
    id: row.id,
    item: catalogueItemSchema.parse(row.item),
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
    archivedAt: row.archivedAt?.toISOString() ?? null,
  };
}
