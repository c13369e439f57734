import { randomUUID } from 'node:crypto';
import type { Database } from '../../database/database.js';

interface Column {
  readonly name: string;
  readonly type: string;
  readonly optional: boolean;
  readonly labels: readonly string[] | null;
}
interface Reference {
  readonly to: string;
  readonly columns: readonly string[];
  readonly theirs: readonly string[];
}
type Row = Readonly<Record<string, unknown>>;

/** Every table that names a company. */
export async function tablesOfCompanies(database: Database): Promise<string[]> {
  const { rows } = await database.executeSql(
    `SELECT table_name AS name FROM information_schema.columns
     WHERE table_schema = 'public' AND column_name = 'company_id' ORDER BY table_name`,
  );
  return (rows as { name: string }[]).map(({ name }) => name);
}

/**
 * Gives a company a row in every table where it has none, whatever its columns are: a table made tomorrow is
 * filled too. Its texts say where they stand, as `table.column`; those that were written are given back.
 */
export async function fillEveryTable(database: Database, companyId: string): Promise<string[]> {
  const written: string[] = [];
  const tables = await tablesOfCompanies(database);

  async function rowOf(table: string): Promise<Row> {
    const mine = tables.includes(table) ? 'WHERE t.company_id = $1' : 'WHERE $1::text IS NOT NULL';
    const find = `SELECT to_jsonb(t) AS row FROM "${table}" t ${mine} LIMIT 1`;
    const found = await database.executeSql(find, [companyId]);
    const [present] = found.rows as { row: Row }[];
    if (present) return present.row;
    const columns = await columnsOf(database, table);
    const values: Record<string, unknown> = tables.includes(table) ? { company_id: companyId } : {};
    for (const { name, type, optional, labels } of columns) {
      if (type === 'text') values[name] = `${table}.${name}`;
      else if (!optional) values[name] = labels?.[0] ?? exampleOf(type);
    }
    for (const { to, columns: own, theirs } of await referencesOf(database, table)) {
      if (own.some((column) => columns.find(({ name }) => name === column)?.optional)) continue;
      const parent = to === 'companies' ? { id: companyId } : await rowOf(to);
      own.forEach((column, i) => {
        values[column] = (parent as Row)[theirs[i] ?? ''];
      });
    }
    const names = Object.keys(values)
      .map((name) => `"${name}"`)
      .join(', ');
    await database.executeSql(
      `INSERT INTO "${table}" (${names}) SELECT ${names} FROM jsonb_populate_record(NULL::"${table}", $1)`,
      [JSON.stringify(values)],
    );
    written.push(
      ...columns
        .filter(({ name, type }) => type === 'text' && values[name] === `${table}.${name}`)
        .map(({ name }) => `${table}.${name}`),
    );
    const made = await database.executeSql(find, [companyId]);
    return (made.rows as { row: Row }[])[0]!.row;
  }

  for (const table of tables) await rowOf(table);
  return written;
}

async function columnsOf(database: Database, table: string): Promise<Column[]> {
  const { rows } = await database.executeSql(
    `SELECT a.attname AS name, t.typname AS type, (NOT a.attnotnull OR a.atthasdef) AS optional,
       (SELECT jsonb_agg(e.enumlabel ORDER BY e.enumsortorder) FROM pg_enum e WHERE e.enumtypid = t.oid) AS labels
     FROM pg_attribute a JOIN pg_type t ON t.oid = a.atttypid
     WHERE a.attrelid = quote_ident($1)::regclass AND a.attnum > 0 AND NOT a.attisdropped AND a.attgenerated = ''
       AND a.attidentity = ''`,
    [table],
  );
  return rows as Column[];
}

async function referencesOf(database: Database, table: string): Promise<Reference[]> {
  const named = (keys: string, relation: string) =>
    `(SELECT jsonb_agg(a.attname ORDER BY k.place) FROM unnest(c.${keys}) WITH ORDINALITY k(number, place)
      JOIN pg_attribute a ON a.attrelid = c.${relation} AND a.attnum = k.number)`;
  const { rows } = await database.executeSql(
    `SELECT r.relname AS to, ${named('conkey', 'conrelid')} AS columns, ${named('confkey', 'confrelid')} AS theirs
     FROM pg_constraint c JOIN pg_class r ON r.oid = c.confrelid
     WHERE c.contype = 'f' AND c.conrelid = quote_ident($1)::regclass`,
    [table],
  );
  return rows as Reference[];
}

function exampleOf(type: string): unknown {
  switch (type) {
    case 'uuid':
      return randomUUID();
    case 'int4':
    case 'int8':
    case 'float8':
      return 1;
    case 'bool':
      return false;
    case 'jsonb':
      return {};
    case 'timestamptz':
    case 'date':
      return new Date().toISOString();
    case '_text':
      return [];
    default:
      throw new Error(`No value is known for a column of the type ${type}.`);
  }
}
