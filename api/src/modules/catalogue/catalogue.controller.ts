import { Body, Controller, Get, HttpCode, Inject, Param, Post, Put, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Catalogue,
  type CatalogueEntry,
  type CatalogueInput,
  type CatalogueQuery,
  catalogueEntrySchema,
  catalogueInputSchema,
  catalogueQuerySchema,
  catalogueSchema,
} from './catalogue.dto.js';
import { CatalogueService } from './catalogue.service.js';

const id = { schema: z.uuid() };

@ApiTags('catalogue')
@Controller('api/catalogue')
export class CatalogueController {
  constructor(@Inject(CatalogueService) private readonly catalogue: CatalogueService) {}

  @Get()
  @Permit('catalogue.read')
  @ApiOkResponse({ standardSchema: catalogueSchema })
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: catalogueQuerySchema }) query: CatalogueQuery,
  ): Promise<Catalogue> {
    return this.catalogue.list(actor, query);
  }

  @Post()
  @Permit('catalogue.edit')
  @ApiCreatedResponse({ standardSchema: catalogueEntrySchema })
  add(
    @CurrentActor() actor: Actor,
    @Body({ schema: catalogueInputSchema }) input: CatalogueInput,
  ): Promise<CatalogueEntry> {
    return this.catalogue.add(actor, input.item);
  }

  @Put(':id')
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: catalogueEntrySchema })
  replace(
    @CurrentActor() actor: Actor,
    @Param('id', id) itemId: string,
    @Body({ schema: catalogueInputSchema }) input: CatalogueInput,
  ): Promise<CatalogueEntry> {
    return this.catalogue.replace(actor, itemId, input.item);
  }

  @Post(':id/archive')
  @HttpCode(200)
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: catalogueEntrySchema })
  archive(@CurrentActor() actor: Actor, @Param('id', id) itemId: string): Promise<CatalogueEntry> {
    return this.catalogue.archive(actor, itemId);
  }

  @Post(':id/restore')
  @HttpCode(200)
  @Permit('catalogue.edit')
  @ApiOkResponse({ standardSchema: catalogueEntrySchema })
  restore(@CurrentActor() actor: Actor, @Param('id', id) itemId: string): Promise<CatalogueEntry> {
    return this.catalogue.restore(actor, itemId);
  }
}
