import { join } from 'node:path';
import { tryLock } from './lock.mjs';
import { Trouble } from './log.mjs';
import { isPortFree } from './ports.mjs';

/** @typedef {import('./supervisor.mjs').Supervisor} Supervisor */

/**
 * Claims a data folder for this process, until the supervisor stops.
 * @param {string} folder
 * @param {Supervisor} supervisor
 * @param {string} purpose
 * @throws {Trouble} when another process uses it
 */
export function claimDataFolder(folder, supervisor, purpose) {
  const lock = tryLock(dataLock(folder), purpose);
  if ('holder' in lock) {
    throw new Trouble(
      `The data folder ${folder} is in use (${lock.holder.purpose}, process ${lock.holder.pid}); stop that first or name another folder in LAMPWRIGHT_DATA.`,
    );
  }
  supervisor.onStop('the lock', async () => lock.release());
}

/** @param {string} folder */
export const dataLock = (folder) => join(folder, 'lock');

/** @param {number} port @throws {Trouble} */
export async function requirePort(port) {
  if (await isPortFree(port)) return;
  throw new Trouble(
    `Port ${port} is taken by another program; stop it or choose another port, as in "PORT=${port + 1} npm start".`,
  );
}
