import { Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type { Request, Response } from 'express';
import { z } from 'zod';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { SESSION_COOKIE, sessionCookieOptions } from './cookie.js';
import { type LiveSession, SessionRepository } from './session.repository.js';

/** All that the cookie says: which session. Everything else is asked of the database. */
export const sessionTokenSchema = z.object({ sid: z.uuid() });

export function sessionTokenOf(request: Request): string | null {
  const cookies: Record<string, unknown> = request.cookies ?? {};
  const token = cookies[SESSION_COOKIE];
  return typeof token === 'string' ? token : null;
}

/** Hands the session to the browser, and reads it where a route is open to everyone. */
@Injectable()
export class SessionCookie {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(JwtService) private readonly jwt: JwtService,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
  ) {}

  set(response: Response, sessionId: string): void {
    response.cookie(SESSION_COOKIE, this.sign(sessionId), sessionCookieOptions(this.env));
  }

  clear(response: Response): void {
    const { maxAge: _, ...options } = sessionCookieOptions(this.env);
    response.clearCookie(SESSION_COOKIE, options);
  }

  sign(sessionId: string): string {
    return this.jwt.sign({ sid: sessionId });
  }

  /** The live session that a request carries, or null: never an error. */
  async live(request: Request): Promise<LiveSession | null> {
    const token = sessionTokenOf(request);
    if (token === null) return null;
    const payload = await this.jwt.verifyAsync<object>(token).catch(() => null);
    const parsed = sessionTokenSchema.safeParse(payload);
    return parsed.success ? this.sessions.findLive(parsed.data.sid, new Date()) : null;
  }
}
