import { Inject, Injectable } from '@nestjs/common';
import { and, desc, eq, gt, isNull, lt, ne, or } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { memberships, sessions, users } from '../database/schema/index.js';
import type { Role } from './permissions.js';

export const SESSION_DAYS = 30;
/** A session in use is renewed at most this often, so that a page of requests is not a page of writes. */
const RENEW_AFTER_MINUTES = 10;

const endOfSession = (now: Date) => new Date(now.getTime() + SESSION_DAYS * 86_400_000);

export interface LiveSession {
  readonly sessionId: string;
  readonly userId: string;
  readonly companyId: string | null;
  readonly role: Role | null;
}

export interface SessionRow {
  readonly id: string;
  readonly userAgent: string;
  readonly createdAt: Date;
  readonly lastUsedAt: Date;
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
      .set({ lastUsedAt: now, expiresAt: endOfSession(now) })
      .where(
        and(
          eq(sessions.id, sessionId),
          lt(sessions.lastUsedAt, new Date(now.getTime() - RENEW_AFTER_MINUTES * 60_000)),
        ),
      );
  }

  /** Begins a session; `companyId` is the active company, null for a member of none. */
  async insert(userId: string, companyId: string | null, userAgent: string): Promise<string> {
    const now = new Date();
    const [row] = await this.database.queries
      .insert(sessions)
      .values({ userId, companyId, userAgent, createdAt: now, lastUsedAt: now, expiresAt: endOfSession(now) })
      .returning({ id: sessions.id });
    return row!.id;
  }

  /** The company that the person worked in last, by their newest session. */
  async lastCompanyOf(userId: string): Promise<string | null> {
    const [row] = await this.database.queries
      .select({ companyId: sessions.companyId })
      .from(sessions)
      .innerJoin(
        memberships,
        and(eq(memberships.userId, sessions.userId), eq(memberships.companyId, sessions.companyId)),
      )
      .where(eq(sessions.userId, userId))
      .orderBy(desc(sessions.lastUsedAt))
      .limit(1);
    return row?.companyId ?? null;
  }

  async listLive(userId: string, now: Date): Promise<SessionRow[]> {
    return this.database.queries
      .select({
        id: sessions.id,
        userAgent: sessions.userAgent,
        createdAt: sessions.createdAt,
        lastUsedAt: sessions.lastUsedAt,
      })
      .from(sessions)
      .where(and(eq(sessions.userId, userId), isNull(sessions.revokedAt), gt(sessions.expiresAt, now)))
      .orderBy(desc(sessions.lastUsedAt), desc(sessions.createdAt));
  }

  async setCompany(userId: string, sessionId: string, companyId: string): Promise<void> {
    await this.database.queries
      .update(sessions)
      .set({ companyId })
      .where(and(eq(sessions.id, sessionId), eq(sessions.userId, userId)));
  }

  /** Points a person's sessions in one company at another, or at none. */
  async moveOff(userId: string, companyId: string, next: string | null): Promise<void> {
    await this.database.queries
      .update(sessions)
      .set({ companyId: next })
      .where(and(eq(sessions.userId, userId), eq(sessions.companyId, companyId)));
  }

  /** Gives a person's sessions that have no company (it was deleted) another one. */
  async moveFromNone(userId: string, next: string): Promise<void> {
    await this.database.queries
      .update(sessions)
      .set({ companyId: next })
      .where(and(eq(sessions.userId, userId), isNull(sessions.companyId)));
  }

  /** Ends one session of a person; false when they have no such live session. */
  async revoke(userId: string, sessionId: string): Promise<boolean> {
    const ended = await this.database.queries
      .update(sessions)
      .set({ revokedAt: new Date() })
      .where(and(eq(sessions.id, sessionId), eq(sessions.userId, userId), isNull(sessions.revokedAt)))
      .returning({ id: sessions.id });
    return ended.length > 0;
  }

  /** Ends all sessions of a person, but for one if given. */
  async revokeAll(userId: string, except?: string): Promise<void> {
    await this.database.queries
      .update(sessions)
      .set({ revokedAt: new Date() })
      .where(
        and(
          eq(sessions.userId, userId),
          isNull(sessions.revokedAt),
          except === undefined ? undefined : ne(sessions.id, except),
        ),
      );
  }

  /** Removes a person's sessions that ended before a time, by whatever end. */
  async deleteEnded(userId: string, before: Date): Promise<void> {
    await this.database.queries
      .delete(sessions)
      .where(
        and(eq(sessions.userId, userId), or(lt(sessions.revokedAt, before), lt(sessions.expiresAt, before))),
      );
  }

  /** Removes every trace of a person's sessions, user agents included. */
  async deleteAll(userId: string): Promise<void> {
    await this.database.queries.delete(sessions).where(eq(sessions.userId, userId));
  }
}
