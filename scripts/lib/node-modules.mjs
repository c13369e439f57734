import { existsSync, readFileSync } from 'node:fs';
import { say, Trouble } from './log.mjs';
import { inRoot, root } from './paths.mjs';
import { run } from './processes.mjs';

/**
 * @typedef {{ version?: string, link?: boolean, optional?: boolean, peer?: boolean, devOptional?: boolean }} LockEntry
 * @typedef {{ packages?: Record<string, LockEntry> }} Lockfile
 */

/** @param {string} path @returns {Record<string, LockEntry>} */
const entries = (path) => /** @type {Lockfile} */ (JSON.parse(readFileSync(path, 'utf8'))).packages ?? {};

/**
 * Whether what npm says it installed is what the lockfile asks for. Compared by content: a checkout gives
 * files new times, and a moved branch may leave an older install behind.
 * @param {Record<string, LockEntry>} wanted
 * @param {Record<string, LockEntry>} installed
 */
export function isInstalled(wanted, installed) {
  return Object.entries(wanted).every(([path, entry]) => {
    if (!path.startsWith('node_modules/') && !path.includes('/node_modules/')) return true;
    const found = installed[path];
    // Optional packages are for other platforms as often as not.
    if (!found) return Boolean(entry.optional || entry.devOptional || entry.peer);
    return found.version === entry.version && Boolean(found.link) === Boolean(entry.link);
  });
}

function isUpToDate() {
  const hidden = inRoot('node_modules/.package-lock.json');
  return existsSync(hidden) && isInstalled(entries(inRoot('package-lock.json')), entries(hidden));
}

/**
 * Runs `npm ci` when node_modules is missing or not what package-lock.json asks for.
 * @param {AbortSignal} [signal]
 */
export async function ensureNodeModules(signal) {
  if (isUpToDate()) return;
  say('Installing npm packages (about a minute) …');
  const result = await run('npm', ['ci', '--no-fund', '--no-audit'], { cwd: root, signal });
  if (result.code !== 0)
    throw new Trouble(`"npm ci" failed:\n${result.stderr.trim() || result.stdout.trim()}`);
}
