import { Body, Controller, Delete, Get, HttpCode, Inject, Param, Patch } from '@nestjs/common';
import { ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit } from '../../access/decorators.js';
import {
  type Member,
  type MemberEdit,
  type MemberList,
  memberEditSchema,
  memberListSchema,
  memberSchema,
} from './members.dto.js';
import { MembersService } from './members.service.js';

const userId = { schema: z.uuid() };

@ApiTags('members')
@Controller('api/members')
export class MembersController {
  constructor(@Inject(MembersService) private readonly members: MembersService) {}

  @Get()
  @Permit('members.read')
  @ApiOkResponse({ standardSchema: memberListSchema })
  list(@CurrentActor() actor: Actor): Promise<MemberList> {
    return this.members.list(actor);
  }

  @Patch(':userId')
  @Permit('members.edit')
  @ApiOkResponse({ standardSchema: memberSchema })
  setRole(
    @CurrentActor() actor: Actor,
    @Param('userId', userId) id: string,
    @Body({ schema: memberEditSchema }) { role }: MemberEdit,
  ): Promise<Member> {
    return this.members.setRole(actor, id, role);
  }

  @Delete(':userId')
  @Permit('members.edit')
  @HttpCode(204)
  @ApiNoContentResponse()
  async remove(@CurrentActor() actor: Actor, @Param('userId', userId) id: string): Promise<void> {
    await this.members.remove(actor, id);
  }
}
