import { type ExecutionContext, Injectable } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuthGuard } from '@nestjs/passport';
import type { Request, Response } from 'express';
import { notAllowed, notSignedIn } from '../http/app-error.js';
import { ACCESS, type Access } from './decorators.js';
import { LinkGate } from './link-gate.js';
import { allows } from './permissions.js';
import type { LiveSession } from './session.repository.js';

/** Stands before every route. A route that says nothing about access is denied to all. */
@Injectable()
export class AccessGuard extends AuthGuard('jwt') {
  constructor(
    private readonly reflector: Reflector,
    private readonly links: LinkGate,
  ) {
    super();
  }

  override async canActivate(context: ExecutionContext): Promise<boolean> {
    const access = this.reflector.getAllAndOverride<Access | undefined>(ACCESS, [
      context.getHandler(),
      context.getClass(),
    ]);
    if (!access) throw notAllowed('This address is not open to anyone.');
    if (access.kind === 'public') return true;

    const request = context.switchToHttp().getRequest<Request>();
    if (access.kind === 'shared') {
      context.switchToHttp().getResponse<Response>().setHeader('Cache-Control', 'no-store');
      request.guest = await this.links.guestOf(request);
      return true;
    }
    await super.canActivate(context);
    // Whatever is behind a sign-in stays in no cache, unless the route has a better rule of its own.
    context.switchToHttp().getResponse<Response>().setHeader('Cache-Control', 'no-store');
    const session = request.user as LiveSession;
    request.person = { userId: session.userId, sessionId: session.sessionId };
    if (session.companyId !== null && session.role !== null)
      request.actor = { ...request.person, companyId: session.companyId, role: session.role };
    if (access.kind === 'signed-in') return true;
    if (!request.actor) throw notAllowed('You are not a member of a company at the moment.');
    if (!allows(request.actor.role, access.permission)) throw notAllowed();
    return true;
  }

  override handleRequest<T>(error: unknown, session: T | false): T {
    if (error) throw error;
    if (!session) throw notSignedIn();
    return session;
  }
}
