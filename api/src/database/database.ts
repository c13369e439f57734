import { AsyncLocalStorage } from 'node:async_hooks';
import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import pg from 'pg';
import * as schema from './schema/index.js';

export type Queries = NodePgDatabase<typeof schema>;

interface Running {
  readonly client: pg.PoolClient;
  readonly queries: Queries;
}

/**
 * The one way to the database. Repositories read `queries`: inside `transaction()` that is the transaction,
 * so nothing can query the pool from within one by mistake.
 */
export class Database {
  readonly pool: pg.Pool;
  private readonly outside: Queries;
  private readonly running = new AsyncLocalStorage<Running>();

  constructor(connectionString: string, options: { max?: number } = {}) {
    this.pool = new pg.Pool({ connectionString, max: options.max ?? 10, application_name: 'lampwright' });
    // An idle connection that breaks (a database restart) must not take the process down.
    this.pool.on('error', () => undefined);
    this.outside = drizzle(this.pool, { schema });
  }

  get queries(): Queries {
    return this.running.getStore()?.queries ?? this.outside;
  }

  /** Runs `work` in one transaction; a call inside another joins it. Rolled back if `work` throws. */
  async transaction<T>(work: () => Promise<T>): Promise<T> {
    if (this.running.getStore()) return work();
    const client = await this.pool.connect();
    let broken = false;
    try {
      await client.query('BEGIN');
      const queries = drizzle(client, { schema });
      const result = await this.running.run({ client, queries }, work);
      await client.query('COMMIT');
      return result;
    } catch (error) {
      await client.query('ROLLBACK').catch(() => {
        broken = true;
      });
      throw error;
    } finally {
      client.release(broken);
    }
  }

  /** One plain SQL statement on the running transaction, or on the pool outside of one. */
  async executeSql(text: string, values: unknown[] = []): Promise<{ rows: unknown[] }> {
    const target = this.running.getStore()?.client ?? this.pool;
    return target.query(text, values);
  }

  async close(): Promise<void> {
    await this.pool.end();
  }
}
