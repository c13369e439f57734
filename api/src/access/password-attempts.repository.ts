import { Inject, Injectable } from '@nestjs/common';
import { and, asc, eq, gt, lt, sql } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { signInFailures } from '../database/schema/index.js';

export interface AttemptKeys {
  readonly account: string;
  readonly address: string;
}

const by = ({ account, address }: AttemptKeys) =>
  and(eq(signInFailures.accountKey, account), eq(signInFailures.addressKey, address));

@Injectable()
export class PasswordAttemptsRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** One at a time for these keys, until the running transaction ends. */
  async lock({ account, address }: AttemptKeys): Promise<void> {
    await this.database.queries.execute(
      sql`SELECT pg_advisory_xact_lock(hashtextextended(${`${account}:${address}`}, 0))`,
    );
  }

  /** When the failures after `since` happened, oldest first. */
  async failuresSince(keys: AttemptKeys, since: Date): Promise<Date[]> {
    const rows = await this.database.queries
      .select({ at: signInFailures.at })
      .from(signInFailures)
      .where(and(by(keys), gt(signInFailures.at, since)))
      .orderBy(asc(signInFailures.at));
    return rows.map((row) => row.at);
  }

  async add({ account, address }: AttemptKeys, at: Date): Promise<void> {
    await this.database.queries
      .insert(signInFailures)
      .values({ accountKey: account, addressKey: address, at });
  }

  async clear(keys: AttemptKeys): Promise<void> {
    await this.database.queries.delete(signInFailures).where(by(keys));
  }

  async clearAccount(account: string): Promise<void> {
    await this.database.queries.delete(signInFailures).where(eq(signInFailures.accountKey, account));
  }

  /** Drops what no longer counts, of whatever account. */
  async forgetBefore(time: Date): Promise<void> {
    await this.database.queries.delete(signInFailures).where(lt(signInFailures.at, time));
  }
}
