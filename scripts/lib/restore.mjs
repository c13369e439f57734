import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { dumpName, unpack } from './backup.mjs';
import { claimDataFolder } from './data-folder.mjs';
import { readState, writeState } from './local-state.mjs';
import { say } from './log.mjs';
import { openCluster, productRole } from './postgres.mjs';
import { mustRun } from './processes.mjs';
import { incoming, outgoing, settleRestore, swap } from './restore-swap.mjs';

/**
 * Replaces the database and files of a data folder by those of a backup. The present ones stay until the new
 * ones are in their place.
 * @param {string} folder the data folder; may be new
 * @param {string} file
 * @param {import('./supervisor.mjs').Supervisor} supervisor
 */
export async function restoreBackup(folder, file, supervisor) {
  mkdirSync(folder, { recursive: true });
  claimDataFolder(folder, supervisor, 'npm run restore');
  const work = mkdtempSync(join(folder, 'restore-'));
  supervisor.onStop('the unpacked backup', async () => rmSync(work, { recursive: true, force: true }));
  await unpack(file, work);
  const cluster = await openCluster(folder);
  supervisor.onStop('the database', () => cluster.stop());
  await cluster.start();
  await cluster.ensureDatabase();
  await settleRestore(folder, cluster);
  for (const left of [incoming, outgoing]) await cluster.sql(`drop database if exists ${left}`);
  await cluster.sql(`create database ${incoming} owner ${productRole}`);
  const how = ['--exit-on-error', '--single-transaction', '--no-owner', '--no-privileges'];
  await mustRun(`${cluster.bin}/pg_restore`, [...how, '-d', cluster.urlOf(incoming), join(work, dumpName)]);
  await swap(folder, cluster, join(work, 'objects'));
  // The backup brings its own company; a demo on top of it is not wanted.
  writeState(folder, { ...(await readState(folder)), demoLoaded: true });
  say('Restored.');
}
