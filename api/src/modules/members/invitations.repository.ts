import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { companies, invitations, users } from '../../database/schema/index.js';

export type InvitationRow = typeof invitations.$inferSelect;

const waiting = () => and(isNull(invitations.acceptedAt), isNull(invitations.revokedAt));

@Injectable()
export class InvitationsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Invitations that were neither accepted nor taken back, with the name of who invited. */
  async listWaiting(companyId: string): Promise<(InvitationRow & { inviter: string })[]> {
    const rows = await this.database.queries
      .select({ invitation: invitations, inviter: users.name })
      .from(invitations)
      .innerJoin(users, eq(users.id, invitations.invitedBy))
      .where(and(eq(invitations.companyId, companyId), waiting()))
      .orderBy(asc(invitations.createdAt), asc(invitations.id));
    return rows.map(({ invitation, inviter }) => ({ ...invitation, inviter }));
  }

  async insert(
    invitation: Pick<InvitationRow, 'companyId' | 'email' | 'role' | 'tokenHash' | 'invitedBy' | 'expiresAt'>,
  ): Promise<InvitationRow> {
    const [row] = await this.database.queries.insert(invitations).values(invitation).returning();
    return row!;
  }

  /** Gives a waiting invitation another secret: the former link dies with it. */
  async renew(
    companyId: string,
    id: string,
    values: Pick<InvitationRow, 'tokenHash' | 'expiresAt'>,
  ): Promise<InvitationRow | null> {
    const [row] = await this.database.queries
      .update(invitations)
      .set(values)
      .where(and(eq(invitations.companyId, companyId), eq(invitations.id, id), waiting()))
      .returning();
    return row ?? null;
  }

  async revoke(companyId: string, id: string): Promise<boolean> {
    const rows = await this.database.queries
      .update(invitations)
      .set({ revokedAt: new Date() })
      .where(and(eq(invitations.companyId, companyId), eq(invitations.id, id), waiting()))
      .returning({ id: invitations.id });
    return rows.length > 0;
  }

  /** By its secret, dead or alive: the one look-up that no company bounds, since the secret names it. */
  async findByToken(tokenHash: string): Promise<(InvitationRow & { companyName: string }) | null> {
    const [row] = await this.database.queries
      .select({ invitation: invitations, companyName: companies.name })
      .from(invitations)
      .innerJoin(companies, eq(companies.id, invitations.companyId))
      .where(eq(invitations.tokenHash, tokenHash));
    return row ? { ...row.invitation, companyName: row.companyName } : null;
  }

  /** Uses it up; false when somebody was faster, or it was taken back or has run out meanwhile. */
  async accept(companyId: string, id: string, now: Date): Promise<boolean> {
    const rows = await this.database.queries
      .update(invitations)
      .set({ acceptedAt: now })
      .where(
        and(
          eq(invitations.companyId, companyId),
          eq(invitations.id, id),
          waiting(),
          sql`${invitations.expiresAt} > ${now}`,
        ),
      )
      .returning({ id: invitations.id });
    return rows.length > 0;
  }

  /** Forgets every invitation of an address, in whatever company: its owner's account is being deleted. */
  async deleteFor(email: string): Promise<void> {
    await this.database.queries.delete(invitations).where(eq(invitations.email, email));
  }
}
