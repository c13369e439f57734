import { setTimeout as sleep } from 'node:timers/promises';
import { Inject, Injectable } from '@nestjs/common';
import type { Person } from '../../access/actor.js';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { hashToken, newToken } from '../../access/one-time-token.js';
import { hashPassword } from '../../access/password.js';
import { PasswordGate } from '../../access/password-gate.js';
import { SessionRepository } from '../../access/session.repository.js';
import { EmailTaken, type UserRow, UsersRepository } from '../../access/users.repository.js';
import { ENV } from '../../config/config.module.js';
import type { Env } from '../../config/env.js';
import { Database } from '../../database/database.js';
import { AppError, notFound } from '../../http/app-error.js';
import { Outbox } from '../../ports/mail/outbox.js';
import { CatalogueService } from '../catalogue/catalogue.service.js';
import { CompaniesRepository } from '../companies/companies.repository.js';
import type { ResetPassword, SignIn, SignUp } from './auth.dto.js';
import { EmailTokensRepository } from './email-tokens.repository.js';
import {
  emailChangedLetter,
  linkTo,
  passwordChangedLetter,
  resetLetter,
  signUpAgainLetter,
} from './letters.js';
import { type BegunSession, type Caller, SessionsService } from './sessions.service.js';

const HOUR_MS = 3_600_000;
const RESET_LASTS_MS = HOUR_MS;
/** More would only fill the mailbox of somebody whose address a stranger types in. */
const MOST_RESET_LETTERS_AN_HOUR = 5;
/** An answer about a forgotten password takes at least this long, well above the work done for a known address. */
const FORGOT_TAKES_MS = 250;

const linkDead = () =>
  new AppError(
    410,
    'link-dead',
    'This link was used already, or its time has run out. Please ask for a new one.',
  );

/**
 * Signing up, in and out. No answer says whether an address has an account, nor does the time it takes. What
 * remains is that a sign-up with a free address succeeds: whoever tries that way leaves an account and a
 * company behind with each free address, and with each taken one a letter to its owner and a counted failure.
 */
@Injectable()
export class AuthService {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(CompaniesRepository) private readonly companies: CompaniesRepository,
    @Inject(SessionRepository) private readonly sessionRows: SessionRepository,
    @Inject(SessionsService) private readonly sessions: SessionsService,
    @Inject(EmailTokensRepository) private readonly tokens: EmailTokensRepository,
    @Inject(PasswordGate) private readonly gate: PasswordGate,
    @Inject(Outbox) private readonly outbox: Outbox,
    @Inject(CatalogueService) private readonly catalogue: CatalogueService,
  ) {}

  /**
   * Makes a company with its owner. An address that has an account signs up only with that account's own
   * password, and then owns one company more; otherwise the refusal does not name the reason, and the
   * address itself is told by mail.
   */
  async signUp(input: SignUp, caller: Caller): Promise<BegunSession> {
    const known = await this.users.findByEmail(input.email);
    if (known) {
      const right = await this.gate.check(input.email, caller.address, known.passwordHash, input.password);
      if (!right) return this.refuseSignUp(known);
      return this.database.transaction(() => this.foundCompany(known.id, input, caller));
    }
    const passwordHash = await hashPassword(input.password);
    const { name, email } = input;
    const begun = await this.database.transaction(async () => {
      const user = await this.users.insert({ name, email, passwordHash, emailConfirmedAt: null });
      return user ? this.foundCompany(user.id, input, caller) : null;
    });
    // Two sign-ups at the same moment: the address is known by now.
    return begun ?? this.signUp(input, caller);
  }

  /** @throws AppError 401 when the two don't belong together, 429 after too many failures */
  async signIn({ email, password }: SignIn, caller: Caller): Promise<BegunSession> {
    const user = await this.users.findByEmail(email);
    const right = await this.gate.check(email, caller.address, user?.passwordHash ?? null, password);
    if (!right || !user)
      throw new AppError(
        401,
        'sign-in-refused',
        'The address and the password don’t belong together. Please check both.',
      );
    return this.database.transaction(() => this.sessions.begin(user.id, caller));
  }

  async signOut(caller: Caller): Promise<void> {
    if (caller.session) await this.sessionRows.revoke(caller.session.userId, caller.session.sessionId);
  }

  async signOutEverywhere({ userId }: Person): Promise<void> {
    await this.sessionRows.revokeAll(userId);
  }

  /** @throws AppError 404 when the person is no member of it */
  async activate({ userId, sessionId }: Person, companyId: string): Promise<void> {
    if ((await this.memberships.roleOf(companyId, userId)) === null) throw notFound('This company');
    await this.sessionRows.setCompany(userId, sessionId, companyId);
  }

  /** Sends a link to whoever has the address. Takes as long when nobody has it. */
  async forgotPassword(email: string): Promise<void> {
    await Promise.all([this.sendReset(email), sleep(FORGOT_TAKES_MS)]);
  }

  /** Sets a new password by a link of {@link forgotPassword}, and signs the person out everywhere. */
  async resetPassword({ token, password }: ResetPassword): Promise<void> {
    await this.database.transaction(async () => {
      const now = new Date();
      const used = await this.tokens.consume('reset-password', hashToken(token), now);
      const user = used && (await this.users.find(used.userId));
      if (!user) throw linkDead();
      await this.users.update(user.id, {
        passwordHash: await hashPassword(password),
        // The link came by mail to this address.
        emailConfirmedAt: user.emailConfirmedAt ?? now,
      });
      await this.tokens.voidAll(user.id);
      await this.sessionRows.revokeAll(user.id);
      await this.gate.forgive(user.email);
      await this.outbox.post(null, user.email, passwordChangedLetter(user.name));
    });
  }

  /** Changes the address by the link that was sent to the new one. */
  async confirmEmail(token: string): Promise<void> {
    try {
      await this.database.transaction(async () => {
        const now = new Date();
        const used = await this.tokens.consume('change-email', hashToken(token), now);
        const user = used && (await this.users.find(used.userId));
        if (!user || used.newEmail === null) throw linkDead();
        await this.users.setEmail(user.id, used.newEmail, now);
        // Open links were sent to the former address, or for another new one.
        await this.tokens.voidAll(user.id);
        await this.outbox.post(null, user.email, emailChangedLetter(user.name));
      });
    } catch (error) {
      throw error instanceof EmailTaken ? linkDead() : error;
    }
  }

  private async foundCompany(userId: string, input: SignUp, caller: Caller): Promise<BegunSession> {
    // The same form sent twice must not make two companies.
    await this.users.lock(userId);
    const mine = await this.memberships.listOfUser(userId);
    const same = mine.find(({ name, role }) => role === 'owner' && name === input.companyName);
    if (same) return this.sessions.begin(userId, caller, same.id);
    const companyId = await this.companies.insert(input.companyName, input.region ?? 'us');
    await this.memberships.insert(companyId, userId, 'owner');
    await this.catalogue.seed(companyId);
    return this.sessions.begin(userId, caller, companyId);
  }

  private async refuseSignUp(known: UserRow): Promise<never> {
    const signInUrl = new URL('/sign-in', this.env.PUBLIC_URL).href;
    await this.outbox.post(null, known.email, signUpAgainLetter(known.name, signInUrl));
    throw new AppError(
      400,
      'sign-up-refused',
      'This address and password can’t be used to sign up. If you have an account, sign in, or choose a new password through “Forgotten password”.',
    );
  }

  private async sendReset(email: string): Promise<void> {
    const user = await this.users.findByEmail(email);
    if (!user) return;
    await this.database.transaction(async () => {
      await this.users.lock(user.id);
      const now = new Date();
      const since = new Date(now.getTime() - HOUR_MS);
      const sent = await this.tokens.countSince(user.id, 'reset-password', since);
      if (sent >= MOST_RESET_LETTERS_AN_HOUR) return;
      const { token, tokenHash } = newToken();
      await this.tokens.insert({
        userId: user.id,
        purpose: 'reset-password',
        tokenHash,
        newEmail: null,
        expiresAt: new Date(now.getTime() + RESET_LASTS_MS),
      });
      const url = linkTo(this.env.PUBLIC_URL, 'reset-password', token);
      await this.outbox.post(null, user.email, resetLetter(user.name, url));
    });
  }
}
