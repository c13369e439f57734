import { Inject, Injectable } from '@nestjs/common';
import { and, eq, gt, isNull, lt } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { memberships, sessions, users } from '../database/schema/index.js';
import type { Role } from './permissions.js';

export const SESSION_DAYS = 30;
/** A session in use is renewed at most this often, so that a page of requests is not a page of writes. */
const RENEW_AFTER_MINUTES = 10;

export interface LiveSession {
  readonly sessionId: string;
  readonly userId: string;
  readonly companyId: string | null;
  readonly role: Role | null;
}

@Injectable()
export class SessionRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** The session with its person's present role in its company; null if revoked, expired or deleted. */
  async findLive(sessionId: string, now: Date): Promise<LiveSession | null> {
    const [row] = await this.database.queries
      .select({
        sessionId: sessions.id,
        userId: sessions.userId,
        companyId: memberships.companyId,
        role: memberships.role,
      })
      .from(sessions)
      .innerJoin(users, and(eq(users.id, sessions.userId), isNull(users.deletedAt)))
      .leftJoin(
        memberships,
        and(eq(memberships.userId, sessions.userId), eq(memberships.companyId, sessions.companyId)),
      )
      .where(and(eq(sessions.id, sessionId), isNull(sessions.revokedAt), gt(sessions.expiresAt, now)));
    return row ?? null;
  }

  /** Moves the end of a session on when it has not been renewed for a while. */
  async renew(sessionId: string, now: Date): Promise<void> {
    await this.database.queries
      .update(sessions)
      .set({ lastUsedAt: now, expiresAt: new Date(now.getTime() + SESSION_DAYS * 86_400_000) })
      .where(
        and(
          eq(sessions.id, sessionId),
          lt(sessions.lastUsedAt, new Date(now.getTime() - RENEW_AFTER_MINUTES * 60_000)),
        ),
      );
  }
}
