import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { newToken } from '../../access/one-time-token.js';
import { UsersRepository } from '../../access/users.repository.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { Database } from '../../database/database.js';
import { AppError, conflict, notFound } from '../../http/app-error.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { linkTo } from '../auth/letters.js';
import { CompaniesRepository } from '../companies/companies.repository.js';
import { type InvitationRow, InvitationsRepository } from './invitations.repository.js';
import { invitationLetter } from './letters.js';
import type { Invitation, InvitationList, NewInvitation } from './members.dto.js';

const LASTS_MS = 7 * 86_400_000;
/** The least time between two letters of the same invitation. */
const RESEND_AFTER_MS = 60_000;
/** A company that waits for more answers than this is more likely sending bulk mail than inviting people. */
const MOST_WAITING = 100;

/** Inviting people, seen from the company. */
@Injectable()
export class InvitationsService {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(InvitationsRepository) private readonly invitations: InvitationsRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async list(actor: Actor): Promise<InvitationList> {
    demand(actor, 'members.edit');
    const now = new Date();
    const rows = await this.invitations.listWaiting(actor.companyId);
    return { items: rows.map((row) => invitationOf(row, row.inviter, now)) };
  }

  /** @throws AppError 409 for a member, for somebody invited already, or when too many wait */
  async invite(actor: Actor, { email, role }: NewInvitation): Promise<Invitation> {
    demand(actor, 'members.edit');
    return this.database.transaction(async () => {
      await this.memberships.lockCompany(actor.companyId);
      const members = await this.memberships.listOfCompany(actor.companyId);
      const member = members.find((one) => one.email === email);
      if (member) throw conflict('is-member', `${member.name} (${email}) is a member already.`);
      const waiting = await this.invitations.listWaiting(actor.companyId);
      if (waiting.some((one) => one.email === email))
        throw conflict('is-invited', `${email} is invited already. Send that invitation again instead.`);
      if (waiting.length >= MOST_WAITING)
        throw conflict(
          'too-many-invitations',
          `${MOST_WAITING} invitations wait for an answer. Take some of them back first.`,
        );
      const { token, tokenHash } = newToken();
      const now = new Date();
      const expiresAt = new Date(now.getTime() + LASTS_MS);
      const { companyId, userId: invitedBy } = actor;
      const row = await this.invitations.insert({ companyId, email, role, tokenHash, invitedBy, expiresAt });
      return invitationOf(row, await this.post(actor, row, token), now);
    });
  }

  /** Sends a fresh link; the one before stops working. */
  async resend(actor: Actor, id: string): Promise<Invitation> {
    demand(actor, 'members.edit');
    return this.database.transaction(async () => {
      await this.memberships.lockCompany(actor.companyId);
      const waiting = await this.invitations.listWaiting(actor.companyId);
      const former = waiting.find((one) => one.id === id);
      if (!former) throw notFound('This invitation');
      const now = new Date();
      const waitMs = former.expiresAt.getTime() - LASTS_MS + RESEND_AFTER_MS - now.getTime();
      if (waitMs > 0) throw tooSoon(waitMs);
      const { token, tokenHash } = newToken();
      const expiresAt = new Date(now.getTime() + LASTS_MS);
      const row = await this.invitations.renew(actor.companyId, id, { tokenHash, expiresAt });
      if (!row) throw notFound('This invitation');
      await this.post(actor, row, token);
      return invitationOf(row, former.inviter, now);
    });
  }

  async revoke(actor: Actor, id: string): Promise<void> {
    demand(actor, 'members.edit');
    if (!(await this.invitations.revoke(actor.companyId, id))) throw notFound('This invitation');
  }

  /** Writes the letter; gives the name of who invites. */
  private async post(actor: Actor, invitation: InvitationRow, token: string): Promise<string> {
    const [company, inviter] = [
      await this.companies.find(actor.companyId),
      await this.users.find(actor.userId),
    ];
    if (!company || !inviter) throw notFound('This company');
    const url = linkTo(this.env.PUBLIC_URL, 'invitation', token);
    const letter = invitationLetter(company.name, inviter.name, invitation.role, url);
    await this.outbox.post(actor.companyId, invitation.email, letter);
    return inviter.name;
  }
}

function tooSoon(waitMs: number): AppError {
  const seconds = Math.ceil(waitMs / 1000);
  return new AppError(
    429,
    'too-soon',
    'This invitation was sent a moment ago. Please give it a minute to arrive.',
    { retryAfterSeconds: seconds },
    { 'Retry-After': String(seconds) },
  );
}

function invitationOf(row: InvitationRow, invitedBy: string, now: Date): Invitation {
  return {
    id: row.id,
    email: row.email,
    role: row.role,
    invitedBy,
    createdAt: row.createdAt.toISOString(),
    expiresAt: row.expiresAt.toISOString(),
    expired: row.expiresAt <= now,
  };
}
