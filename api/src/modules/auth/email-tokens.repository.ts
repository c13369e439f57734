import { Inject, Injectable } from '@nestjs/common';
import { and, count, eq, gt, isNull } from 'drizzle-orm';
import { Database } from '../../database/database.js';
import { emailTokens } from '../../database/schema/index.js';

export type EmailTokenRow = typeof emailTokens.$inferSelect;
export type Purpose = EmailTokenRow['purpose'];

/** One-time links sent by mail. */
@Injectable()
export class EmailTokensRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  async insert(
    token: Pick<EmailTokenRow, 'userId' | 'purpose' | 'tokenHash' | 'newEmail' | 'expiresAt'>,
  ): Promise<void> {
    await this.database.queries.insert(emailTokens).values(token);
  }

  /** Uses a token up: it is given back to one caller only, and only while it lasts. */
  async consume(purpose: Purpose, tokenHash: string, now: Date): Promise<EmailTokenRow | null> {
    const [row] = await this.database.queries
      .update(emailTokens)
      .set({ usedAt: now })
      .where(
        and(
          eq(emailTokens.purpose, purpose),
          eq(emailTokens.tokenHash, tokenHash),
          isNull(emailTokens.usedAt),
          gt(emailTokens.expiresAt, now),
        ),
      )
      .returning();
    return row ?? null;
  }

  /** Makes all open links of a person worthless, or those for one purpose. */
  async voidAll(userId: string, purpose?: Purpose): Promise<void> {
    await this.database.queries
      .update(emailTokens)
      .set({ usedAt: new Date() })
      .where(
        and(
          eq(emailTokens.userId, userId),
          isNull(emailTokens.usedAt),
          purpose === undefined ? undefined : eq(emailTokens.purpose, purpose),
        ),
      );
  }

  async countSince(userId: string, purpose: Purpose, since: Date): Promise<number> {
    const [row] = await this.database.queries
      .select({ n: count() })
      .from(emailTokens)
      .where(
        and(
          eq(emailTokens.userId, userId),
          eq(emailTokens.purpose, purpose),
          gt(emailTokens.createdAt, since),
        ),
      );
    return row?.n ?? 0;
  }

  /** Removes a person's links; gives the addresses that some of them would have changed to. */
  async deleteAll(userId: string): Promise<string[]> {
    const rows = await this.database.queries
      .delete(emailTokens)
      .where(eq(emailTokens.userId, userId))
      .returning({ newEmail: emailTokens.newEmail });
    return rows.flatMap(({ newEmail }) => newEmail ?? []);
  }
}
