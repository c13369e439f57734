import { Inject, Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import { Strategy } from 'passport-jwt';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { type LiveSession, SessionRepository } from './session.repository.js';
import { sessionTokenOf, sessionTokenSchema } from './session-cookie.js';

/** The cookie's token only names a session; whether it still stands is asked of the database each time. */
@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy) {
  constructor(
    @Inject(ENV) env: Env,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
  ) {
    super({
      jwtFromRequest: sessionTokenOf,
      secretOrKey: env.SESSION_SECRET,
      algorithms: ['HS256'],
      // The session row holds the end of it: it moves on with use.
      ignoreExpiration: true,
    });
  }

  async validate(payload: unknown): Promise<LiveSession | false> {
    const parsed = sessionTokenSchema.safeParse(payload);
    if (!parsed.success) return false;
    const now = new Date();
    const session = await this.sessions.findLive(parsed.data.sid, now);
    if (!session) return false;
    await this.sessions.renew(session.sessionId, now);
    return session;
  }
}
