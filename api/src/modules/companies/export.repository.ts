import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';

/** Rows fetched at a time, so that a table of any length passes through little memory. */
const ROWS_AT_A_TIME = 500;

/** Not the company's, although they name it: where its members are signed in belongs to them. */
const LEFT_OUT = ['sessions'];
/** Secrets, addresses by which whoever knows them may act, and what only had a meaning for its recipient. */
const HIDDEN_COLUMNS: Readonly<Record<string, readonly string[]>> = {
  invitations: ['token_hash'],
  mail_messages: ['text', 'html'],
  payments: ['checkout_url'],
  proposal_links: ['token_hash', 'sealed_token'],
};

const MEMBERS = `SELECT jsonb_build_object('user_id', u.id, 'name', u.name, 'email', u.email, 'role', m.role, 'since', m.created_at)::text AS row
  FROM memberships m JOIN users u ON u.id = m.user_id WHERE m.company_id = $1 ORDER BY m.created_at, u.id`;
const COMPANY = 'SELECT to_jsonb(c)::text AS row FROM companies c WHERE c.id = $1';

/**
 * Reads everything that belongs to one company. Tables are found by their company_id, so that a new one is in
 * the export from its first day.
 */
@Injectable()
export class ExportRepository {
  constructor(@Inject(Database) private readonly database: Database) {}

  /** Makes the running transaction see one moment of the database, and change nothing. */
  async freeze(): Promise<void> {
    await this.database.executeSql('SET TRANSACTION ISOLATION LEVEL REPEATABLE READ, READ ONLY');
  }

  async tables(): Promise<string[]> {
    const { rows } = await this.database.executeSql(
      `SELECT table_name AS name FROM information_schema.columns
       WHERE table_schema = 'public' AND column_name = 'company_id' ORDER BY table_name`,
    );
    const names = (rows as { name: string }[]).map(({ name }) => name);
    return [
      ...names.filter((name) => !LEFT_OUT.includes(name) && name !== 'memberships'),
      'company',
      'members',
    ];
  }

  /** The rows of a table that are the company's, as JSON text. Needs a running transaction. */
  async *rows(companyId: string, table: string): AsyncGenerator<string> {
    const query = table === 'company' ? COMPANY : table === 'members' ? MEMBERS : await this.selectAll(table);
    await this.database.executeSql(`DECLARE exported NO SCROLL CURSOR FOR ${query}`, [companyId]);
    for (;;) {
      const { rows } = await this.database.executeSql(`FETCH ${ROWS_AT_A_TIME} FROM exported`);
      for (const { row } of rows as { row: string }[]) yield row;
      if (rows.length < ROWS_AT_A_TIME) break;
    }
    await this.database.executeSql('CLOSE exported');
  }

  private async selectAll(table: string): Promise<string> {
    const { rows } = await this.database.executeSql(
      `SELECT quote_ident(a.attname) AS name FROM pg_index i
       JOIN pg_attribute a ON a.attrelid = i.indrelid AND a.attnum = ANY (i.indkey)
       WHERE i.indrelid = quote_ident($1)::regclass AND i.indisprimary
       ORDER BY array_position(i.indkey::int[], a.attnum::int)`,
      [table],
    );
    const order = (rows as { name: string }[]).map(({ name }) => `t.${name}`).join(', ');
    const hidden = (HIDDEN_COLUMNS[table] ?? []).map((column) => ` - '${column}'`).join('');
    return `SELECT (to_jsonb(t)${hidden})::text AS row FROM "${table}" t WHERE t.company_id = $1 ORDER BY ${order}`;
  }
}
