import { Inject, Injectable } from '@nestjs/common';
import type { Person } from '../../access/actor.js';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { newToken } from '../../access/one-time-token.js';
import { hashPassword } from '../../access/password.js';
import { PasswordGate } from '../../access/password-gate.js';
import { SessionRepository } from '../../access/session.repository.js';
import { type UserRow, UsersRepository } from '../../access/users.repository.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { Database } from '../../database/database.js';
import { badInput, conflict, notFound, notSignedIn } from '../../http/app-error.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { preferencesSchema } from '../auth/auth.dto.js';
import { EmailTokensRepository } from '../auth/email-tokens.repository.js';
import {
  addressInUseLetter,
  confirmEmailLetter,
  emailChangeAskedLetter,
  linkTo,
  passwordChangedLetter,
} from '../auth/letters.js';
import { InvitationsRepository } from '../members/invitations.repository.js';
import type { AccountEdit, EmailChange, PasswordChange, SessionList } from './account.dto.js';

const CONFIRMATION_LASTS_MS = 86_400_000;
/** As with forgotten passwords: nobody's mailbox is to be filled. */
const MOST_CHANGES_A_DAY = 5;

/** A person's own account. Every method takes the person who asks, and touches nobody else. */
@Injectable()
export class AccountService {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
    @Inject(EmailTokensRepository) private readonly tokens: EmailTokensRepository,
    @Inject(InvitationsRepository) private readonly invitations: InvitationsRepository,
    @Inject(PasswordGate) private readonly gate: PasswordGate,
    @Inject(Outbox) private readonly outbox: Outbox,
  ) {}

  async edit({ userId }: Person, { name, preferences }: AccountEdit): Promise<void> {
    await this.database.transaction(async () => {
      const user = await this.users.lock(userId);
      if (!user) throw notSignedIn();
      const present = preferencesSchema.partial().parse(user.preferences);
      await this.users.update(userId, {
        name: name ?? user.name,
        preferences: { ...present, ...preferences },
      });
    });
  }

  /** Other devices are signed out; open links become worthless. */
  async changePassword(person: Person, address: string, { current, next }: PasswordChange): Promise<void> {
    const user = await this.prove(person, address, current, '/current');
    const passwordHash = await hashPassword(next);
    await this.database.transaction(async () => {
      await this.users.update(user.id, { passwordHash });
      await this.tokens.voidAll(user.id);
      await this.sessions.revokeAll(user.id, person.sessionId);
      await this.outbox.post(null, user.email, passwordChangedLetter(user.name));
    });
  }

  /** Sends a link to the new address; nothing changes before it is used. The present address is told. */
  async changeEmail(person: Person, address: string, { password, email }: EmailChange): Promise<void> {
    const user = await this.prove(person, address, password, '/password');
    if (email === user.email)
      throw badInput([{ pointer: '/email', detail: 'This is the address that you use already.' }]);
    await this.database.transaction(async () => {
      await this.users.lock(user.id);
      const now = new Date();
      const since = new Date(now.getTime() - CONFIRMATION_LASTS_MS);
      if ((await this.tokens.countSince(user.id, 'change-email', since)) >= MOST_CHANGES_A_DAY)
        throw conflict(
          'too-many-changes',
          'A new address was asked for several times today. Please wait until tomorrow.',
        );
      await this.tokens.voidAll(user.id, 'change-email');
      const { token, tokenHash } = newToken();
      await this.tokens.insert({
        userId: user.id,
        purpose: 'change-email',
        tokenHash,
        newEmail: email,
        expiresAt: new Date(now.getTime() + CONFIRMATION_LASTS_MS),
      });
      // Whether the address has an account is told to the address, never to whoever types it in.
      const taken = await this.users.findByEmail(email);
      const url = linkTo(this.env.PUBLIC_URL, 'confirm-email', token);
      const letter = taken ? addressInUseLetter(taken.name) : confirmEmailLetter(user.name, url);
      await this.outbox.post(null, email, letter);
      await this.outbox.post(null, user.email, emailChangeAskedLetter(user.name));
    });
  }

  async listSessions({ userId, sessionId }: Person): Promise<SessionList> {
    const rows = await this.sessions.listLive(userId, new Date());
    return {
      items: rows.map((row) => ({
        id: row.id,
        userAgent: row.userAgent,
        createdAt: row.createdAt.toISOString(),
        lastUsedAt: row.lastUsedAt.toISOString(),
        current: row.id === sessionId,
      })),
    };
  }

  async endSession({ userId }: Person, id: string): Promise<void> {
    if (!(await this.sessions.revoke(userId, id))) throw notFound('This session');
  }

  /**
   * Removes the person: sessions, links, letters, memberships, and everything personal in their row. What they
   * made for their companies stays there, signed by a former member.
   * @throws AppError 409 when a company would be left without an owner
   */
  async delete(person: Person, address: string, password: string): Promise<void> {
    const user = await this.prove(person, address, password, '/password');
    await this.database.transaction(async () => {
      const companies = await this.memberships.listOfUser(user.id);
      // Always in the same order, so that two people who leave the same companies don't wait for each other.
      for (const company of companies.sort((a, b) => (a.id < b.id ? -1 : 1))) {
        await this.memberships.lockCompany(company.id);
        await this.checkReplaceable(user.id, company);
        await this.memberships.delete(company.id, user.id);
      }
      await this.sessions.deleteAll(user.id);
      const asked = await this.tokens.deleteAll(user.id);
      await this.invitations.deleteFor(user.email);
      for (const email of new Set([user.email, ...asked])) await this.outbox.forget(email);
      await this.gate.forgive(user.email);
      await this.users.erase(user.id);
    });
  }

  private async checkReplaceable(userId: string, company: { id: string; name: string }): Promise<void> {
    const members = await this.memberships.listOfCompany(company.id);
    const others = members.filter((member) => member.userId !== userId);
    if (others.length === 0)
      throw conflict(
        'only-member',
        `You are the only member of ${company.name}. Delete the company first, or make somebody else its owner.`,
      );
    if (!others.some(({ role }) => role === 'owner'))
      throw conflict(
        'only-owner',
        `You are the only owner of ${company.name}. Make another member an owner first.`,
      );
  }

  /** @throws AppError 400 at the field when the password is wrong, 429 after too many failures */
  private async prove(person: Person, address: string, password: string, pointer: string): Promise<UserRow> {
    const user = await this.users.find(person.userId);
    if (!user) throw notSignedIn();
    const right = await this.gate.check(user.email, address, user.passwordHash, password);
    if (!right) throw badInput([{ pointer, detail: 'This is not your password.' }]);
    return user;
  }
}
