import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { companies, memberships, users } from '../database/schema/index.js';
import type { Role } from './permissions.js';

export interface MemberRow {
  readonly userId: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
  readonly since: Date;
}

export interface CompanyOfPerson {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
}

/** Who belongs to which company, as what. */
@Injectable()
export class MembershipsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /**
   * Keeps the company's members from changing in another transaction until the running one ends, without
   * holding up whoever adds records to the company. False when there is no such company.
   */
  async lockCompany(companyId: string): Promise<boolean> {
    const rows = await this.database.queries
      .select({ id: companies.id })
      .from(companies)
      .where(eq(companies.id, companyId))
      .for('no key update');
    return rows.length > 0;
  }

  async listOfCompany(companyId: string): Promise<MemberRow[]> {
    return this.database.queries
      .select({
        userId: users.id,
        name: users.name,
        email: users.email,
        role: memberships.role,
        since: memberships.createdAt,
      })
      .from(memberships)
      .innerJoin(users, eq(users.id, memberships.userId))
      .where(eq(memberships.companyId, companyId))
      .orderBy(asc(memberships.createdAt), asc(users.id));
  }

  /** The companies of a person, the one joined first on top. */
  async listOfUser(userId: string): Promise<CompanyOfPerson[]> {
    return this.database.queries
      .select({ id: companies.id, name: companies.name, role: memberships.role })
      .from(memberships)
      .innerJoin(companies, eq(companies.id, memberships.companyId))
      .where(eq(memberships.userId, userId))
      .orderBy(asc(memberships.createdAt), asc(companies.id));
  }

  async roleOf(companyId: string, userId: string): Promise<Role | null> {
    const [row] = await this.database.queries
      .select({ role: memberships.role })
      .from(memberships)
      .where(and(eq(memberships.companyId, companyId), eq(memberships.userId, userId)));
    return row?.role ?? null;
  }

  /** Somebody who is a member already keeps the role that they have. */
  async insert(companyId: string, userId: string, role: Role): Promise<void> {
    await this.database.queries.insert(memberships).values({ companyId, userId, role }).onConflictDoNothing();
  }

  async setRole(companyId: string, userId: string, role: Role): Promise<void> {
    await this.database.queries
      .update(memberships)
      .set({ role })
      .where(and(eq(memberships.companyId, companyId), eq(memberships.userId, userId)));
  }

  async delete(companyId: string, userId: string): Promise<void> {
    await this.database.queries
      .delete(memberships)
      .where(and(eq(memberships.companyId, companyId), eq(memberships.userId, userId)));
  }
}
