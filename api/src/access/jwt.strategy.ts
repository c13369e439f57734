import { Inject, Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import type { Request } from 'express';
import { Strategy } from 'passport-jwt';
import { z } from 'zod';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { SESSION_COOKIE } from './cookie.js';
import { type LiveSession, SessionRepository } from './session.repository.js';

const payloadSchema = z.object({ sid: z.uuid() });

const fromCookie = (request: Request): string | null => {
  const cookies: Record<string, unknown> = request.cookies ?? {};
  const token = cookies[SESSION_COOKIE];
  return typeof token === 'string' ? token : null;
};

/** The cookie's token only names a session; whether it still stands is asked of the database each time. */
@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy) {
  constructor(
    @Inject(ENV) env: Env,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
  ) {
    super({
      jwtFromRequest: fromCookie,
      secretOrKey: env.SESSION_SECRET,
      algorithms: ['HS256'],
      // The session row holds the end of it: it moves on with use.
      ignoreExpiration: true,
    });
  }

  async validate(payload: unknown): Promise<LiveSession | false> {
    const parsed = payloadSchema.safeParse(payload);
    if (!parsed.success) return false;
    const now = new Date();
    const session = await this.sessions.findLive(parsed.data.sid, now);
    if (!session) return false;
    await this.sessions.renew(session.sessionId, now);
    return session;
  }
}
