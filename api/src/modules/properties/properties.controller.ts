import { Body, Controller, Get, Inject, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type NewProperty,
  newPropertySchema,
  type Property,
  type PropertyEdit,
  type PropertyList,
  type PropertyListQuery,
  propertyEditSchema,
  propertyListQuerySchema,
  propertyListSchema,
  propertySchema,
} from './properties.dto.js';
import { PropertiesService } from './properties.service.js';

const id = { schema: z.uuid() };

@ApiTags('properties')
@Controller('api/properties')
export class PropertiesController {
  constructor(@Inject(PropertiesService) private readonly properties: PropertiesService) {}

  @Get()
  @Permit('clients.read')
  @ApiOkResponse({ standardSchema: propertyListSchema })
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: propertyListQuerySchema }) query: PropertyListQuery,
  ): Promise<PropertyList> {
    return this.properties.list(actor, query.clientId);
  }

  @Post()
  @Permit('clients.edit')
  @ApiCreatedResponse({ standardSchema: propertySchema })
  create(
    @CurrentActor() actor: Actor,
    @Body({ schema: newPropertySchema }) input: NewProperty,
  ): Promise<Property> {
    return this.properties.create(actor, input);
  }

  @Get(':id')
  @Permit('clients.read')
  @ApiOkResponse({ standardSchema: propertySchema })
  get(@CurrentActor() actor: Actor, @Param('id', id) propertyId: string): Promise<Property> {
    return this.properties.get(actor, propertyId);
  }

  @Patch(':id')
  @Permit('clients.edit')
  @ApiOkResponse({ standardSchema: propertySchema })
  edit(
    @CurrentActor() actor: Actor,
    @Param('id', id) propertyId: string,
    @Body({ schema: propertyEditSchema }) edit: PropertyEdit,
  ): Promise<Property> {
    return this.properties.edit(actor, propertyId, edit);
  }
}
