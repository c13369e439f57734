import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { type MemberRow, MembershipsRepository } from '../../access/memberships.repository.js';
import type { Role } from '../../access/permissions.js';
import { SessionRepository } from '../../access/session.repository.js';
import { Database } from '../../database/database.js';
import { conflict, notFound } from '../../http/app-error.js';
import type { Member, MemberList } from './members.dto.js';

/** Who works in the company, and as what. */
@Injectable()
export class MembersService {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(MembershipsRepository) private readonly memberships: MembershipsRepository,
    @Inject(SessionRepository) private readonly sessions: SessionRepository,
  ) {}

  async list(actor: Actor): Promise<MemberList> {
    demand(actor, 'members.read');
    return { items: (await this.memberships.listOfCompany(actor.companyId)).map(memberOf) };
  }

  async setRole(actor: Actor, userId: string, role: Role): Promise<Member> {
    demand(actor, 'members.edit');
    return this.database.transaction(async () => {
      const member = await this.lockMember(actor, userId, role);
      await this.memberships.setRole(actor.companyId, userId, role);
      return memberOf({ ...member, role });
    });
  }

  /** Their sessions move on to another company of theirs, if there is one. */
  async remove(actor: Actor, userId: string): Promise<void> {
    demand(actor, 'members.edit');
    await this.database.transaction(async () => {
      await this.lockMember(actor, userId, null);
      await this.memberships.delete(actor.companyId, userId);
      const [next] = await this.memberships.listOfUser(userId);
      await this.sessions.moveOff(userId, actor.companyId, next?.id ?? null);
    });
  }

  /**
   * One change of members at a time, so that two owners can't remove each other at the same moment.
   * @throws AppError 404 for a stranger, 409 when no owner would be left
   */
  private async lockMember(actor: Actor, userId: string, nextRole: Role | null): Promise<MemberRow> {
    await this.memberships.lockCompany(actor.companyId);
    const members = await this.memberships.listOfCompany(actor.companyId);
    const member = members.find((one) => one.userId === userId);
    if (!member) throw notFound('This member');
    const owners = members.filter(({ role }) => role === 'owner');
    if (member.role === 'owner' && nextRole !== 'owner' && owners.length === 1)
      throw conflict(
        'last-owner',
        'A company needs an owner, and this is the last one. Make another member an owner first.',
      );
    return member;
  }
}

function memberOf({ userId, name, email, role, since }: MemberRow): Member {
  return { userId, name, email, role, since: since.toISOString() };
}
