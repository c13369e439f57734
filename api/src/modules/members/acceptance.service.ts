import { Inject, Injectable } from '@nestjs/common';
import { MembershipsRepository } from '../../access/memberships.repository.js';
import { hashToken } from '../../access/one-time-token.js';
import { hashPassword } from '../../access/password.js';
import { PasswordGate } from '../../access/password-gate.js';
import { type UserRow, UsersRepository } from '../../access/users.repository.js';
import { Database } from '../../database/database.js';
import { AppError, badInput, conflict, type FieldFault, notFound } from '../../http/app-error.js';
import { type BegunSession, type Caller, SessionsService } from '../auth/sessions.service.js';
import { type InvitationRow, InvitationsRepository } from './invitations.repository.js';
import type { InvitationAcceptance, InvitationView } from './members.dto.js';

type KnownInvitation = InvitationRow & { readonly companyName: string };

const dead = () =>
  new AppError(
    410,
    'invitation-dead',
    'This invitation was used or taken back, or its time has run out. Ask whoever invited you for a new one.',
  );

/** Accepting an invitation, seen from the invited person. The link's secret proves that the mailbox is theirs. */
@Injectable()
export class AcceptanceService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(InvitationsRepository) private readonly invitations: InvitationsRepository,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(UsersRepository) private readonly users: UsersRepository,
    @Inject(SessionsService) private readonly sessions: SessionsService,
    @Inject(PasswordGate) private readonly gate: PasswordGate,
  ) {}

  /** Looking uses nothing up. */
  async look(token: string): Promise<InvitationView> {
    const { companyName, email, role } = await this.find(token);
    return { companyName, email, role, hasAccount: (await this.users.findByEmail(email)) !== null };
  }

  /**
   * Makes the person a member: as the account that is signed in, as the account of that address by its
   * password, or as a new account.
   */
  async accept(input: InvitationAcceptance, caller: Caller): Promise<BegunSession> {
    const invitation = await this.find(input.token);
    const known = await this.users.findByEmail(invitation.email);
    if (known) {
      await this.checkIsThem(known, input, caller);
      return this.database.transaction(() => this.join(invitation, known, caller));
    }
    if (caller.session) throw otherAccount(invitation.email);
    const { name, password } = newPerson(input);
    const passwordHash = await hashPassword(password);
    return this.database.transaction(async () => {
      const { email } = invitation;
      const user = await this.users.insert({ email, name, passwordHash, emailConfirmedAt: new Date() });
      // Somebody signed up with the address at the same moment; the link then still works, with a password.
      if (!user) throw conflict('has-account', 'You have an account by now. Please enter its password.');
      return this.join(invitation, user, caller);
    });
  }

  private async find(token: string): Promise<KnownInvitation> {
    const invitation = await this.invitations.findByToken(hashToken(token));
    if (!invitation) throw notFound('This invitation');
    const { acceptedAt, revokedAt, expiresAt } = invitation;
    if (acceptedAt || revokedAt || expiresAt <= new Date()) throw dead();
    return invitation;
  }

  private async checkIsThem(
    user: UserRow,
    { password }: InvitationAcceptance,
    caller: Caller,
  ): Promise<void> {
    if (caller.session) {
      if (caller.session.userId === user.id) return;
      throw otherAccount(user.email);
    }
    if (password === undefined)
      throw badInput([{ pointer: '/password', detail: 'Please enter the password of your account.' }]);
    const right = await this.gate.check(user.email, caller.address, user.passwordHash, password);
    if (!right)
      throw badInput([{ pointer: '/password', detail: 'This is not the password of your account.' }]);
  }

  private async join(invitation: KnownInvitation, user: UserRow, caller: Caller): Promise<BegunSession> {
    const now = new Date();
    const { companyId, role } = invitation;
    if (!(await this.invitations.accept(companyId, invitation.id, now))) throw dead();
    await this.memberships.insert(companyId, user.id, role);
    if (!user.emailConfirmedAt) await this.users.update(user.id, { emailConfirmedAt: now });
    return this.sessions.begin(user.id, caller, companyId);
  }
}

const otherAccount = (email: string) =>
  conflict(
    'other-account',
    `This invitation is for ${email}, and you are signed in with another address. Sign out first, then open the link again.`,
  );

function newPerson({ name, password }: InvitationAcceptance): { name: string; password: string } {
  const faults: FieldFault[] = [];
  if (name === undefined) faults.push({ pointer: '/name', detail: 'Please enter your name.' });
  if (password === undefined) faults.push({ pointer: '/password', detail: 'Please choose a password.' });
  if (name === undefined || password === undefined) throw badInput(faults);
  return { name, password };
}
