import {
  chmodSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { basename, dirname, join, resolve } from 'node:path';
import { claimDataFolder, dataLock } from './data-folder.mjs';
import { fakeFolders } from './local-environment.mjs';
import { lockHolder } from './lock.mjs';
import { say, Trouble } from './log.mjs';
import { openCluster } from './postgres.mjs';
import { mustRun, run } from './processes.mjs';

/**
 * A backup is a tar of a manifest, a dump of the database, and the stored files.
 * @typedef {{ format: 1, madeAt: string, postgres: string }} Manifest
 */

const manifestName = 'manifest.json';
export const dumpName = 'database.dump';

/**
 * The file a person named, relative to where they called npm from.
 * @param {string | undefined} name
 * @param {string} usage
 */
export function fileArgument(name, usage) {
  if (!name) throw new Trouble(usage);
  return resolve(process.env.INIT_CWD ?? process.cwd(), name);
}

/**
 * Writes a backup of a data folder, whether Lampwright runs on it or not.
 * @param {string} folder the data folder
 * @param {string} file
 * @param {import('./supervisor.mjs').Supervisor} supervisor
 */
export async function writeBackup(folder, file, supervisor) {
  if (!existsSync(join(folder, 'state.json'))) throw new Trouble(`There is nothing to back up in ${folder}.`);
  if (!existsSync(dirname(file))) throw new Trouble(`The folder ${dirname(file)} does not exist.`);
  const cluster = await reachCluster(folder, supervisor);
  const work = mkdtempSync(join(folder, 'backup-'));
  const part = `${file}.part`;
  try {
    // The database first: a file stored after its dump is only an extra, one missing would be a loss.
    await mustRun(`${cluster.bin}/pg_dump`, ['-Fc', '-f', join(work, dumpName), '-d', cluster.url]);
    const version = await cluster.sql('show server_version');
    /** @type {Manifest} */
    const manifest = { format: 1, madeAt: new Date().toISOString(), postgres: version };
    writeFileSync(join(work, manifestName), JSON.stringify(manifest));
    // It holds people's addresses and photos of their homes: for its owner only.
    writeFileSync(part, '', { mode: 0o600 });
    chmodSync(part, 0o600);
    const { objects } = fakeFolders(folder);
    mkdirSync(objects, { recursive: true });
    const what = ['-C', work, manifestName, dumpName, '-C', dirname(objects), basename(objects)];
    const tar = await run('tar', ['-cf', part, ...what]);
    // 1: a file changed while it was read, so it was not yet in the dump either.
    if (tar.code > 1) throw new Error(`tar failed:\n${tar.stderr}`);
    renameSync(part, file);
  } finally {
    rmSync(work, { recursive: true, force: true });
    rmSync(part, { force: true });
  }
}

/**
 * @param {string} folder
 * @param {import('./supervisor.mjs').Supervisor} supervisor
 */
async function reachCluster(folder, supervisor) {
  if (lockHolder(dataLock(folder))) {
    const cluster = await openCluster(folder);
    if (cluster.pid === null) {
      throw new Trouble('Lampwright is starting or stopping just now; try again in a moment.');
    }
    return cluster;
  }
  claimDataFolder(folder, supervisor, 'npm run backup');
  const cluster = await openCluster(folder);
  supervisor.onStop('the database', () => cluster.stop());
  await cluster.start();
  return cluster;
}

/**
 * Unpacks a backup and checks that it is one.
 * @param {string} file
 * @param {string} into an empty folder
 * @returns {Promise<Manifest>}
 */
export async function unpack(file, into) {
  if (!existsSync(file)) throw new Trouble(`There is no file ${file}.`);
  const tar = await run('tar', ['-xf', file, '-C', into, '--no-same-owner', '--no-same-permissions']);
  const whole = [manifestName, dumpName, 'objects'].every((name) => existsSync(join(into, name)));
  if (tar.code !== 0 || !whole) throw new Trouble(`${file} is not a whole backup of Lampwright.`);
  /** @type {Manifest} */
  const manifest = JSON.parse(readFileSync(join(into, manifestName), 'utf8'));
  if (manifest.format !== 1) {
    throw new Trouble(`${file} has format ${manifest.format}, which this version of Lampwright can't read.`);
  }
  say(`Backup of ${manifest.madeAt}, PostgreSQL ${manifest.postgres}.`);
  return manifest;
}
