import { Inject, Injectable } from '@nestjs/common';
import { and, eq, isNull, sql } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { users } from '../database/schema/index.js';

export type UserRow = typeof users.$inferSelect;

export interface NewUser {
  readonly email: string;
  readonly name: string;
  readonly passwordHash: string;
  readonly emailConfirmedAt: Date | null;
}

/** What a deleted person's records are signed with. */
export const FORMER_MEMBER = 'Former member';

/** The address belongs to somebody else by now. */
export class EmailTaken extends Error {}

/** SQLSTATE unique_violation, inside of what the query builder wraps around it. */
const isUniqueViolation = (error: unknown): boolean =>
  error instanceof Error &&
  error.cause instanceof Error &&
  'code' in error.cause &&
  error.cause.code === '23505';

/** People. E-mail addresses come normalised (lower case, trimmed). */
@Injectable()
export class UsersRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async findByEmail(email: string): Promise<UserRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(users)
      .where(and(eq(sql`lower(${users.email})`, email), isNull(users.deletedAt)));
    return row ?? null;
  }

  async find(id: string): Promise<UserRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(users)
      .where(and(eq(users.id, id), isNull(users.deletedAt)));
    return row ?? null;
  }

  /** The same, kept from changing until the running transaction ends. */
  async lock(id: string): Promise<UserRow | null> {
    const [row] = await this.database.queries
      .select()
      .from(users)
      .where(and(eq(users.id, id), isNull(users.deletedAt)))
      .for('update');
    return row ?? null;
  }

  /** Null when the address is taken. */
  async insert(user: NewUser): Promise<UserRow | null> {
    const [row] = await this.database.queries.insert(users).values(user).onConflictDoNothing().returning();
    return row ?? null;
  }

  async update(
    id: string,
    values: Partial<Pick<UserRow, 'name' | 'preferences' | 'passwordHash' | 'emailConfirmedAt'>>,
  ): Promise<void> {
    await this.database.queries
      .update(users)
      .set(values)
      .where(and(eq(users.id, id), isNull(users.deletedAt)));
  }

  /** @throws EmailTaken, which ends the running transaction */
  async setEmail(id: string, email: string, confirmedAt: Date): Promise<void> {
    try {
      await this.database.queries
        .update(users)
        .set({ email, emailConfirmedAt: confirmedAt })
        .where(and(eq(users.id, id), isNull(users.deletedAt)));
    } catch (error) {
      throw isUniqueViolation(error) ? new EmailTaken() : error;
    }
  }

  /** Empties the row of everything personal; what they made keeps pointing at it. */
  async erase(id: string): Promise<void> {
    await this.database.queries
      .update(users)
      .set({
        email: `${id}@deleted.invalid`,
        name: FORMER_MEMBER,
        passwordHash: null,
        preferences: {},
        emailConfirmedAt: null,
        deletedAt: new Date(),
      })
      .where(eq(users.id, id));
  }
}
