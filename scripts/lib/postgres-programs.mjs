import { existsSync, readdirSync } from 'node:fs';
import { run } from './processes.mjs';

/** @typedef {{ major: number, bin: string }} Installation a server's version and its folder of programs */

const home = '/usr/lib/postgresql';

/** PostgreSQL servers installed from Debian's packages, newest first. @returns {Installation[]} */
export function findInstallations() {
  if (!existsSync(home)) return [];
  return readdirSync(home)
    .filter((name) => /^\d+$/.test(name))
    .map((name) => ({ major: Number(name), bin: `${home}/${name}/bin` }))
    .filter(({ bin }) =>
      ['initdb', 'pg_ctl', 'postgres', 'psql'].every((name) => existsSync(`${bin}/${name}`)),
    )
    .sort((a, b) => b.major - a.major);
}

export const isRoot = () => process.getuid?.() === 0;

/**
 * Runs a server program. PostgreSQL refuses to run as root, so root hands over to the package's own user;
 * from `/`, because that user may not enter the current folder.
 * @param {readonly string[]} command
 * @param {import('./processes.mjs').RunOptions} [options]
 */
export function runAsServer(command, options = {}) {
  const [program = '', ...args] = isRoot() ? ['runuser', '-u', 'postgres', '--', ...command] : command;
  return run(program, args, { cwd: '/', ...options });
}

/**
 * Whether the user that the server runs as may go through a folder.
 * @param {string} folder
 */
export async function serverMayEnter(folder) {
  return (await runAsServer(['test', '-x', folder])).code === 0;
}

/** The numeric ids of the user that the server runs as, when that is not this process's own. */
export async function serverIds() {
  if (!isRoot()) return null;
  const ids = await Promise.all(['-u', '-g'].map((flag) => run('id', [flag, 'postgres'])));
  const [uid, gid] = ids.map(({ stdout }) => Number(stdout.trim()));
  if (!uid || !gid) throw new Error('The user postgres of the package postgresql is missing.');
  return { uid, gid };
}
