import { chmodSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

/**
 * A new folder for throwaway state, which the database server's user may enter.
 * @param {string} purpose part of its name
 */
export function scratchFolder(purpose) {
  const folder = mkdtempSync(join(tmpdir(), `lampwright-${purpose}-`));
  chmodSync(folder, 0o755);
  return folder;
}
