import { Inject, Injectable } from '@nestjs/common';
import { and, eq, isNull, lt, sql } from 'drizzle-orm';
import { Database } from '../database/database.js';
import { idempotencyKeys } from '../database/schema/index.js';

/** One request that happens once: who asks, by which key, for what. */
export interface OnceRequest {
  readonly scope: string;
  readonly key: string;
  /** Method and path. */
  readonly route: string;
  readonly bodyHash: string;
}

export interface OnceAnswer {
  readonly status: number;
  /** JSON; null where there is no body. */
  readonly body: unknown;
}

/** How many old answers go with each new one. */
const SWEPT_AT_ONCE = 100;

/** How the scopes of a company's people and links begin. */
export const companyScope = (companyId: string): string => `company ${companyId} `;

/** The answers of requests that happen once. */
@Injectable()
export class OnceRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Holds the key until the running transaction ends; false if somebody else does. */
  async hold({ scope, key }: OnceRequest): Promise<boolean> {
    const { rows } = await this.database.executeSql(
      'SELECT pg_try_advisory_xact_lock(hashtextextended($1, 0)) AS held',
      [`once ${scope} ${key}`],
    );
    return (rows[0] as { held: boolean }).held;
  }

  async find({ scope, key }: OnceRequest) {
    const [row] = await this.database.queries.select().from(idempotencyKeys).where(of(scope, key));
    return row ?? null;
  }

  /** Notes that a request is at work. Null if its key was used before. */
  async begin(request: OnceRequest) {
    const [row] = await this.database.queries
      .insert(idempotencyKeys)
      .values(request)
      .onConflictDoNothing()
      .returning();
    return row ?? null;
  }

  /** Takes over a request that began before a moment and has no answer; false if it has, or is younger. */
  async takeUp({ scope, key }: OnceRequest, begunBefore: Date): Promise<boolean> {
    const taken = await this.database.queries
      .update(idempotencyKeys)
      .set({ createdAt: new Date() })
      .where(and(of(scope, key), isNull(idempotencyKeys.status), lt(idempotencyKeys.createdAt, begunBefore)))
      .returning({ key: idempotencyKeys.key });
    return taken.length > 0;
  }

  async keep(request: OnceRequest, { status, body }: OnceAnswer): Promise<void> {
    await this.database.queries
      .insert(idempotencyKeys)
      .values({ ...request, status, answer: body })
      .onConflictDoUpdate({
        target: [idempotencyKeys.scope, idempotencyKeys.key],
        set: { status, answer: body },
      });
  }

  async forget({ scope, key }: OnceRequest): Promise<void> {
    await this.database.queries
      .delete(idempotencyKeys)
      .where(and(of(scope, key), isNull(idempotencyKeys.status)));
  }

  /** Deletes some of what is older than a moment; nobody waits for anybody. */
  async sweep(before: Date): Promise<void> {
    await this.database.queries.execute(sql`
      DELETE FROM ${idempotencyKeys} WHERE (scope, key) IN (
        SELECT scope, key FROM ${idempotencyKeys} WHERE created_at < ${before}
        ORDER BY created_at LIMIT ${SWEPT_AT_ONCE} FOR UPDATE SKIP LOCKED)`);
  }
}

const of = (scope: string, key: string) =>
  and(eq(idempotencyKeys.scope, scope), eq(idempotencyKeys.key, key));
