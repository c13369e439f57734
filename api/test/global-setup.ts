import { randomBytes } from 'node:crypto';
import pg from 'pg';
import type { TestProject } from 'vitest/node';
import { ensureTestDatabase } from '../../scripts/test-database.mjs';
import { migrateDatabase } from '../src/database/migrations.js';

declare module 'vitest' {
  export interface ProvidedContext {
    /** Superuser address of the cluster, and the migrated database that every spec file copies. */
    adminUrl: string;
    templateDatabase: string;
  }
}

/** Makes one migrated template database for this run; specs copy it in a few milliseconds. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const adminUrl = process.env.TEST_DATABASE_URL ?? (await ensureTestDatabase());
  const templateDatabase = `template_${randomBytes(6).toString('hex')}`;
  await admin(adminUrl, `CREATE DATABASE ${templateDatabase}`);
  await migrateDatabase(databaseUrl(adminUrl, templateDatabase));
  project.provide('adminUrl', adminUrl);
  project.provide('templateDatabase', templateDatabase);
  return () => admin(adminUrl, `DROP DATABASE IF EXISTS ${templateDatabase} WITH (FORCE)`);
}

export async function admin(adminUrl: string, statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: adminUrl });
  await client.connect();
  try {
    await client.query(statement);
  } finally {
    await client.end();
  }
}

export function databaseUrl(adminUrl: string, name: string): string {
  const url = new URL(adminUrl);
  url.pathname = `/${name}`;
  return url.href;
}
