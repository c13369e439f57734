import type { Database } from '../../database/database.js';

export interface WrittenLetter {
  readonly subject: string;
  readonly text: string;
}

/** The letters written to an address, oldest first; a sent one has lost its text. */
export async function lettersTo(database: Database, address: string): Promise<WrittenLetter[]> {
  const { rows } = await database.executeSql(
    'SELECT subject, text FROM mail_messages WHERE "to" = $1 ORDER BY created_at',
    [address],
  );
  return rows as WrittenLetter[];
}

/** The secret in the newest letter to an address. */
export async function tokenFor(database: Database, address: string): Promise<string> {
  const letter = (await lettersTo(database, address)).at(-1);
  const token = /#token=([\w-]+)/.exec(letter?.text ?? '')?.[1];
  if (!token) throw new Error(`There is no link in the newest letter to ${address}.`);
  return token;
}
