import { existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import { fakeFolders } from './local-environment.mjs';
import { productDatabase } from './postgres.mjs';

/** @typedef {import('./postgres.mjs').Cluster} Cluster */

/** The databases of a restore under way: the one being filled, and the one just replaced. */
export const incoming = `${productDatabase}_restored`;
export const outgoing = `${productDatabase}_previous`;

/** @param {string} folder */
const previousObjects = (folder) => `${fakeFolders(folder).objects}.previous`;

/**
 * Puts the restored database and files in the place of the present ones.
 * @param {string} folder
 * @param {Cluster} cluster
 * @param {string} newObjects
 */
export async function swap(folder, cluster, newObjects) {
  const { objects } = fakeFolders(folder);
  mkdirSync(objects, { recursive: true });
  renameSync(objects, previousObjects(folder));
  try {
    renameSync(newObjects, objects);
    // Both names change in one transaction: that is the moment from which the backup counts.
    await cluster.sql(
      `begin; alter database ${productDatabase} rename to ${outgoing}; alter database ${incoming} rename to ${productDatabase}; commit;`,
    );
  } finally {
    await settleRestore(folder, cluster);
  }
}

/**
 * Brings an interrupted restore to one end or the other: forward when the databases were swapped, else back.
 * @param {string} folder
 * @param {Cluster} cluster
 */
export async function settleRestore(folder, cluster) {
  const { objects } = fakeFolders(folder);
  const previous = previousObjects(folder);
  if (!existsSync(previous)) return;
  const swapped = (await cluster.sql(`select 1 from pg_database where datname = '${outgoing}'`)) !== '';
  if (swapped) {
    rmSync(previous, { recursive: true, force: true });
    await cluster.sql(`drop database if exists ${outgoing}`);
  } else {
    rmSync(objects, { recursive: true, force: true });
    renameSync(previous, objects);
  }
}
