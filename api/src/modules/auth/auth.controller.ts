import { Body, Controller, Get, HttpCode, Inject, Post, Req, Res } from '@nestjs/common';
import {
  ApiAcceptedResponse,
  ApiCreatedResponse,
  ApiNoContentResponse,
  ApiOkResponse,
  ApiTags,
} from '@nestjs/swagger';
import type { Request, Response } from 'express';
import type { Person } from '../../access/actor.js';
import { CurrentPerson, Public, SignedIn } from '../../access/decorators.js';
import { SessionCookie } from '../../access/session-cookie.js';
import {
  type ActiveCompany,
  activeCompanySchema,
  type ConfirmEmail,
  confirmEmailSchema,
  type ForgotPassword,
  forgotPasswordSchema,
  type Me,
  meSchema,
  type ResetPassword,
  resetPasswordSchema,
  type SignIn,
  type SignUp,
  signInSchema,
  signUpSchema,
} from './auth.dto.js';
import { AuthService } from './auth.service.js';
import { Callers } from './caller.js';
import { MeService } from './me.service.js';
import type { BegunSession } from './sessions.service.js';

@ApiTags('auth')
@Controller('api/auth')
export class AuthController {
  constructor(
    @Inject(AuthService) private readonly auth: AuthService,
    @Inject(MeService) private readonly me: MeService,
    @Inject(Callers) private readonly callers: Callers,
    @Inject(SessionCookie) private readonly cookie: SessionCookie,
  ) {}

  @Post('sign-up')
  @Public()
  @ApiCreatedResponse({ standardSchema: meSchema })
  async signUp(
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
    @Body({ schema: signUpSchema }) input: SignUp,
  ): Promise<Me> {
    return this.welcome(response, await this.auth.signUp(input, await this.callers.of(request)));
  }

  @Post('sign-in')
  @Public()
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: meSchema })
  async signIn(
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
    @Body({ schema: signInSchema }) input: SignIn,
  ): Promise<Me> {
    return this.welcome(response, await this.auth.signIn(input, await this.callers.of(request)));
  }

  /** Open to everyone: whose session has run out wants to be signed out, too. */
  @Post('sign-out')
  @Public()
  @HttpCode(204)
  @ApiNoContentResponse()
  async signOut(@Req() request: Request, @Res({ passthrough: true }) response: Response): Promise<void> {
    await this.auth.signOut(await this.callers.of(request));
    this.cookie.clear(response);
  }

  @Post('sign-out-everywhere')
  @SignedIn()
  @HttpCode(204)
  @ApiNoContentResponse()
  async signOutEverywhere(
    @CurrentPerson() person: Person,
    @Res({ passthrough: true }) response: Response,
  ): Promise<void> {
    await this.auth.signOutEverywhere(person);
    this.cookie.clear(response);
  }

  @Post('forgot-password')
  @Public()
  @HttpCode(202)
  @ApiAcceptedResponse()
  async forgotPassword(@Body({ schema: forgotPasswordSchema }) { email }: ForgotPassword): Promise<void> {
    await this.auth.forgotPassword(email);
  }

  @Post('reset-password')
  @Public()
  @HttpCode(204)
  @ApiNoContentResponse()
  async resetPassword(@Body({ schema: resetPasswordSchema }) input: ResetPassword): Promise<void> {
    await this.auth.resetPassword(input);
  }

  @Post('confirm-email')
  @Public()
  @HttpCode(204)
  @ApiNoContentResponse()
  async confirmEmail(@Body({ schema: confirmEmailSchema }) { token }: ConfirmEmail): Promise<void> {
    await this.auth.confirmEmail(token);
  }

  @Get('me')
  @SignedIn()
  @ApiOkResponse({ standardSchema: meSchema })
  async whoAmI(@CurrentPerson() person: Person, @Req() request: Request): Promise<Me> {
    return this.me.describe(person.userId, request.actor?.companyId ?? null);
  }

  @Post('active-company')
  @SignedIn()
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: meSchema })
  async activate(
    @CurrentPerson() person: Person,
    @Body({ schema: activeCompanySchema }) { companyId }: ActiveCompany,
  ): Promise<Me> {
    await this.auth.activate(person, companyId);
    return this.me.describe(person.userId, companyId);
  }

  private async welcome(response: Response, begun: BegunSession): Promise<Me> {
    this.cookie.set(response, begun.sessionId);
    return this.me.describe(begun.userId, begun.companyId);
  }
}
