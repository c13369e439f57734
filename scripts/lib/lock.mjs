import { linkSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { birthOf } from './processes.mjs';

/** @typedef {{ pid: number, birth: string | null, purpose: string }} Holder */

/** @param {string} file @returns {Holder | null} */
function read(file) {
  try {
    return JSON.parse(readFileSync(file, 'utf8'));
  } catch {
    return null;
  }
}

/**
 * Who holds the lock now; a holder that has died does not count.
 * @param {string} file
 * @returns {Holder | null}
 */
export function lockHolder(file) {
  const holder = read(file);
  return holder && birthOf(holder.pid) === holder.birth ? holder : null;
}

/**
 * Takes the lock if it is free. It frees itself when the process dies, since the file names its holder.
 * @param {string} file
 * @param {string} purpose shown to whoever finds it taken
 * @returns {{ release(): void } | { holder: Holder }}
 */
export function tryLock(file, purpose) {
  mkdirSync(dirname(file), { recursive: true });
  const mine = `${file}.${process.pid}`;
  writeFileSync(mine, JSON.stringify({ pid: process.pid, birth: birthOf(process.pid), purpose }));
  try {
    for (;;) {
      try {
        // A hard link appears whole or not at all, so a reader never sees half a lock.
        linkSync(mine, file);
        return { release: () => rmSync(file, { force: true }) };
      } catch (error) {
        if (/** @type {NodeJS.ErrnoException} */ (error).code !== 'EEXIST') throw error;
      }
      const holder = lockHolder(file);
      if (holder) return { holder };
      discardDead(file);
    }
  } finally {
    rmSync(mine, { force: true });
  }
}

/**
 * Moves a dead holder's lock away first and looks again: had a living one come between, it gets it back.
 * @param {string} file
 */
function discardDead(file) {
  const aside = `${file}.dead.${process.pid}`;
  try {
    renameSync(file, aside);
  } catch (error) {
    if (/** @type {NodeJS.ErrnoException} */ (error).code === 'ENOENT') return;
    throw error;
  }
  if (lockHolder(aside)) linkSync(aside, file);
  rmSync(aside, { force: true });
}

/**
 * Does something while holding the lock, waiting for it as long as its holder lives.
 * @template T
 * @param {string} file
 * @param {string} purpose
 * @param {() => Promise<T>} body
 * @returns {Promise<T>}
 */
export async function withLock(file, purpose, body) {
  for (;;) {
    const lock = tryLock(file, purpose);
    if ('release' in lock) {
      try {
        return await body();
      } finally {
        lock.release();
      }
    }
    await sleep(100);
  }
}
