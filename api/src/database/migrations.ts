import { readFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import pg from 'pg';

/** Any number that nobody else locks on. */
const MIGRATION_LOCK = 7_263_041;
const MIGRATIONS_FOLDER = fileURLToPath(new URL('../../../drizzle', import.meta.url));

/**
 * Brings the database to the newest schema, one process at a time.
 * Drizzle passes over a migration older than the newest applied one and still reports success, so the count
 * of applied migrations is compared with the journal afterwards.
 * @throws Error when fewer migrations are applied than the journal lists
 */
export async function migrateDatabase(connectionString: string): Promise<{ applied: number }> {
  const client = new pg.Client({ connectionString, application_name: 'lampwright-migrate' });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await client.query('SET client_min_messages TO warning');
    await migrate(drizzle(client), { migrationsFolder: MIGRATIONS_FOLDER });
    const journal = JSON.parse(await readFile(`${MIGRATIONS_FOLDER}/meta/_journal.json`, 'utf8')) as {
      entries: unknown[];
    };
    const counted = await client.query<{ n: number }>(
      'SELECT count(*)::int AS n FROM drizzle.__drizzle_migrations',
    );
    const applied = counted.rows[0]?.n ?? 0;
    if (applied !== journal.entries.length)
      throw new Error(
        `The database has ${applied} migrations applied where the journal lists ${journal.entries.length}.`,
      );
    return { applied };
  } finally {
    await client.end();
  }
}
