import {
  Body,
  Controller,
  Delete,
  Get,
  HttpCode,
  Inject,
  Param,
  Patch,
  Post,
  Req,
  Res,
} from '@nestjs/common';
import { ApiAcceptedResponse, ApiNoContentResponse, ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { Person } from '../../access/actor.js';
import { CurrentPerson, SignedIn } from '../../access/decorators.js';
import { SessionCookie } from '../../access/session-cookie.js';
import { type Me, meSchema } from '../auth/auth.dto.js';
import { addressOf } from '../auth/caller.js';
import { MeService } from '../auth/me.service.js';
import {
  type AccountDeletion,
  type AccountEdit,
  accountDeletionSchema,
  accountEditSchema,
  type EmailChange,
  emailChangeSchema,
  type PasswordChange,
  passwordChangeSchema,
  type SessionList,
  sessionListSchema,
} from './account.dto.js';
import { AccountService } from './account.service.js';

@ApiTags('account')
@Controller('api/account')
@SignedIn()
export class AccountController {
  constructor(
    @Inject(AccountService) private readonly account: AccountService,
    @Inject(MeService) private readonly me: MeService,
    @Inject(SessionCookie) private readonly cookie: SessionCookie,
  ) {}

  @Patch()
  @ApiOkResponse({ standardSchema: meSchema })
  async edit(
    @CurrentPerson() person: Person,
    @Req() request: Request,
    @Body({ schema: accountEditSchema }) edit: AccountEdit,
  ): Promise<Me> {
    await this.account.edit(person, edit);
    return this.me.describe(person.userId, request.actor?.companyId ?? null);
  }

  @Post('password')
  @HttpCode(204)
  @ApiNoContentResponse()
  async changePassword(
    @CurrentPerson() person: Person,
    @Req() request: Request,
    @Body({ schema: passwordChangeSchema }) change: PasswordChange,
  ): Promise<void> {
    await this.account.changePassword(person, addressOf(request), change);
  }

  @Post('email')
  @HttpCode(202)
  @ApiAcceptedResponse()
  async changeEmail(
    @CurrentPerson() person: Person,
    @Req() request: Request,
    @Body({ schema: emailChangeSchema }) change: EmailChange,
  ): Promise<void> {
    await this.account.changeEmail(person, addressOf(request), change);
  }

  @Get('sessions')
  @ApiOkResponse({ standardSchema: sessionListSchema })
  listSessions(@CurrentPerson() person: Person): Promise<SessionList> {
    return this.account.listSessions(person);
  }

  @Delete('sessions/:id')
  @HttpCode(204)
  @ApiNoContentResponse()
  async endSession(
    @CurrentPerson() person: Person,
    @Param('id', { schema: z.uuid() }) id: string,
  ): Promise<void> {
    await this.account.endSession(person, id);
  }

  @Delete()
  @HttpCode(204)
  @ApiNoContentResponse()
  async delete(
    @CurrentPerson() person: Person,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
    @Body({ schema: accountDeletionSchema }) { password }: AccountDeletion,
  ): Promise<void> {
    await this.account.delete(person, addressOf(request), password);
    this.cookie.clear(response);
  }
}
