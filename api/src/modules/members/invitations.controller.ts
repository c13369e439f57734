import { Body, Controller, Delete, Get, HttpCode, Inject, Param, Post, Req, Res } from '@nestjs/common';
import { ApiCreatedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Actor } from '../../access/actor.js';
import { CurrentActor, Permit, Public } from '../../access/decorators.js';
import { SessionCookie } from '../../access/session-cookie.js';
import { type Me, meSchema } from '../auth/auth.dto.js';
import { Callers } from '../auth/caller.js';
import { MeService } from '../auth/me.service.js';
import { AcceptanceService } from './acceptance.service.js';
import { InvitationsService } from './invitations.service.js';
import {
  type Invitation,
  type InvitationAcceptance,
  type InvitationList,
  type InvitationLook,
  type InvitationView,
  invitationAcceptanceSchema,
  invitationListSchema,
  invitationLookSchema,
  invitationSchema,
  invitationViewSchema,
  type NewInvitation,
  newInvitationSchema,
} from './members.dto.js';

const id = { schema: z.uuid() };

@ApiTags('members')
@Controller('api/invitations')
export class InvitationsController {
  constructor(
    @Inject(InvitationsService) private readonly invitations: InvitationsService,
    @Inject(AcceptanceService) private readonly acceptance: AcceptanceService,
    @Inject(MeService) private readonly me: MeService,
    @Inject(Callers) private readonly callers: Callers,
    @Inject(SessionCookie) private readonly cookie: SessionCookie,
  ) {}

  @Get()
  @Permit('members.edit')
  @ApiOkResponse({ standardSchema: invitationListSchema })
  list(@CurrentActor() actor: Actor): Promise<InvitationList> {
    return this.invitations.list(actor);
  }

  @Post()
  @Permit('members.edit')
  @ApiCreatedResponse({ standardSchema: invitationSchema })
  invite(
    @CurrentActor() actor: Actor,
    @Body({ schema: newInvitationSchema }) input: NewInvitation,
  ): Promise<Invitation> {
    return this.invitations.invite(actor, input);
  }

  /** The secret comes in a body, by POST: opening the link alone neither logs nor uses it. */
  @Post('look')
  @Public()
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: invitationViewSchema })
  look(@Body({ schema: invitationLookSchema }) { token }: InvitationLook): Promise<InvitationView> {
    return this.acceptance.look(token);
  }

  @Post('accept')
  @Public()
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: meSchema })
  async accept(
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
    @Body({ schema: invitationAcceptanceSchema }) input: InvitationAcceptance,
  ): Promise<Me> {
    const begun = await this.acceptance.accept(input, await this.callers.of(request));
    this.cookie.set(response, begun.sessionId);
    return this.me.describe(begun.userId, begun.companyId);
  }

  @Post(':id/resend')
  @Permit('members.edit')
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: invitationSchema })
  resend(@CurrentActor() actor: Actor, @Param('id', id) invitationId: string): Promise<Invitation> {
    return this.invitations.resend(actor, invitationId);
  }

  @Delete(':id')
  @Permit('members.edit')
  @HttpCode(204)
  @ApiNoContentResponse()
  async revoke(@CurrentActor() actor: Actor, @Param('id', id) invitationId: string): Promise<void> {
    await this.invitations.revoke(actor, invitationId);
  }
}
