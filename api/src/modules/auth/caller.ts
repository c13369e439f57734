import { Inject, Injectable } from '@nestjs/common';
import type { Request } from 'express';
import { SessionCookie } from '../../access/session-cookie.js';
import type { Caller } from './sessions.service.js';

/** The address that attempts are counted by. */
export const addressOf = (request: Request): string => request.ip ?? '';

/** Says who calls a route that is open to everyone. */
@Injectable()
export class Callers {
  constructor(@Inject(SessionCookie) private readonly cookie: SessionCookie) {}

  async of(request: Request): Promise<Caller> {
    return {
      address: addressOf(request),
      userAgent: request.get('user-agent') ?? '',
      session: await this.cookie.live(request),
    };
  }
}
