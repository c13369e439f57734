import { readdirSync, readFileSync, readlinkSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { isAlive } from './processes.mjs';

/**
 * The server at work on a cluster's folder, judged by the process itself: after a kill -9 the pid file stays
 * behind, and its pid may have been given to another program since.
 * @param {string} folder
 * @returns {{ pid: number, port: number } | null}
 */
export function livePostmaster(folder) {
  const lines = readPidFile(folder);
  const pid = Number(lines?.[0]);
  // The port is the fourth line; it is written some time after the pid.
  const port = Number(lines?.[3]);
  return pid > 0 && port > 0 && isServerOf(pid, folder) ? { pid, port } : null;
}

/** @param {string} folder */
function readPidFile(folder) {
  try {
    return readFileSync(join(folder, 'postmaster.pid'), 'utf8').split('\n');
  } catch {
    return null;
  }
}

/**
 * A server process sits in its cluster's folder.
 * @param {number} pid
 * @param {string} folder
 */
function isServerOf(pid, folder) {
  try {
    if (readFileSync(`/proc/${pid}/comm`, 'utf8').trim() !== 'postgres') return false;
    return readlinkSync(`/proc/${pid}/cwd`) === folder;
  } catch {
    return false;
  }
}

/**
 * Makes a folder ready for a new server after the last one was killed: waits for its orphaned backends, and
 * removes a pid file whose pid now belongs to another program, which the server would take for itself.
 * A pid file of a dead process is left: the server checks the shared memory named in it.
 * @param {string} folder
 */
export async function quietPostmaster(folder) {
  const end = performance.now() + 10_000;
  while (serversOf(folder).length > 0 && performance.now() < end) await sleep(100);
  const pid = Number(readPidFile(folder)?.[0]);
  if (pid > 0 && isAlive(pid) && !isServerOf(pid, folder)) rmSync(join(folder, 'postmaster.pid'));
}

/** @param {string} folder */
function serversOf(folder) {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => isServerOf(Number(pid), folder));
}
