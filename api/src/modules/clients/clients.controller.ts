import { Body, Controller, Get, HttpCode, Inject, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiCreatedResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Client,
  type ClientEdit,
  type ClientList,
  type ClientListQuery,
  clientEditSchema,
  clientListQuerySchema,
  clientListSchema,
  clientSchema,
  type NewClient,
  newClientSchema,
} from './clients.dto.js';
import { ClientsService } from './clients.service.js';

const id = { schema: z.uuid() };

@ApiTags('clients')
@Controller('api/clients')
export class ClientsController {
  constructor(@Inject(ClientsService) private readonly clients: ClientsService) {}

  @Get()
  @Permit('clients.read')
  @ApiOkResponse({ standardSchema: clientListSchema })
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: clientListQuerySchema }) query: ClientListQuery,
  ): Promise<ClientList> {
    return this.clients.list(actor, query);
  }

  @Post()
  @Permit('clients.edit')
  @ApiCreatedResponse({ standardSchema: clientSchema })
  create(@CurrentActor() actor: Actor, @Body({ schema: newClientSchema }) input: NewClient): Promise<Client> {
    return this.clients.create(actor, input);
  }

  @Get(':id')
  @Permit('clients.read')
  @ApiOkResponse({ standardSchema: clientSchema })
  get(@CurrentActor() actor: Actor, @Param('id', id) clientId: string): Promise<Client> {
    return this.clients.get(actor, clientId);
  }

  @Patch(':id')
  @Permit('clients.edit')
  @ApiOkResponse({ standardSchema: clientSchema })
  edit(
    @CurrentActor() actor: Actor,
    @Param('id', id) clientId: string,
    @Body({ schema: clientEditSchema }) edit: ClientEdit,
  ): Promise<Client> {
    return this.clients.edit(actor, clientId, edit);
  }

  @Post(':id/archive')
  @HttpCode(200)
  @Permit('clients.edit')
  @ApiOkResponse({ standardSchema: clientSchema })
  archive(@CurrentActor() actor: Actor, @Param('id', id) clientId: string): Promise<Client> {
    return this.clients.archive(actor, clientId);
  }

  @Post(':id/restore')
  @HttpCode(200)
  @Permit('clients.edit')
  @ApiOkResponse({ standardSchema: clientSchema })
  restore(@CurrentActor() actor: Actor, @Param('id', id) clientId: string): Promise<Client> {
    return this.clients.restore(actor, clientId);
  }
}
