import { Inject, Injectable } from '@nestjs/common';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { SessionRepository } from '../../access/session.repository.js';

/** The caller of a route that is open to everyone. */
export interface Caller {
  readonly address: string;
  readonly userAgent: string;
  /** The session that the browser already carries, if it is alive. */
  readonly session: { readonly sessionId: string; readonly userId: string } | null;
}

/** A session just begun. */
export interface BegunSession {
  readonly sessionId: string;
  readonly userId: string;
  readonly companyId: string | null;
}

/** Where a person worked last is remembered for as long; after that nothing is left of a session that ended. */
const FORGET_AFTER_MS = 90 * 86_400_000;

/** User agents are only shown back to their owner; longer ones are cut to what is worth showing. */
const MOST_USER_AGENT = 300;

@Injectable()
export class SessionsService {
  constructor(
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
  ) {}

  /**
   * Begins a new session, in the given company, or the one the person worked in last, or their first. A session
   * that the browser carried before ends: nobody can plant one and have it raised by somebody else's sign-in.
   */
  async begin(userId: string, caller: Caller, companyId?: string): Promise<BegunSession> {
    if (caller.session) await this.sessions.revoke(caller.session.userId, caller.session.sessionId);
    await this.sessions.deleteEnded(userId, new Date(Date.now() - FORGET_AFTER_MS));
    const active = companyId ?? (await this.usualCompany(userId));
    const sessionId = await this.sessions.insert(userId, active, caller.userAgent.slice(0, MOST_USER_AGENT));
    return { sessionId, userId, companyId: active };
  }

  private async usualCompany(userId: string): Promise<string | null> {
    const last = await this.sessions.lastCompanyOf(userId);
    return last ?? (await this.memberships.listOfUser(userId))[0]?.id ?? null;
  }
}
