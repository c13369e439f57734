import { spawn } from 'node:child_process';
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, renameSync, statSync } from 'node:fs';
import { dirname } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { Trouble, warn } from './log.mjs';
import { inRoot } from './paths.mjs';

const guard = inRoot('scripts/lib/orphan-guard.mjs');
/** Longer than the API's own grace for requests under way; tools have nothing to finish. */
const graceMs = 15_000;
const toolGraceMs = 3_000;
const maxLogBytes = 10_000_000;

/**
 * @typedef {object} Service
 * @property {string} name
 * @property {number | undefined} pid
 * @property {Promise<number>} ended resolves to the exit code
 * @property {() => Promise<void>} stop
 */

/**
 * Node processes that belong to one command, and what else must be undone: stopped in the reverse order of
 * their start, if not told otherwise. A service that ends by itself ends the whole.
 */
export class Supervisor {
  /** @type {{ name: string, undo: () => Promise<void> }[]} */
  #undo = [];
  #stopping = false;
  #failure = new AbortController();

  /** Aborts, with the trouble as its reason, when a service ends that nobody stopped. */
  signal = this.#failure.signal;

  /** Rejects when a service ends that nobody stopped; never resolves. @type {Promise<never>} */
  failed = aborted(this.signal).then(() => {
    throw this.signal.reason;
  });

  constructor() {
    // Whoever waits for it sees the rejection; not waiting must not end the process.
    this.failed.catch(() => {});
  }

  /**
   * Something to undo at the end.
   * @param {string} name
   * @param {() => Promise<void>} undo
   */
  onStop(name, undo) {
    this.#undo.push({ name, undo });
  }

  /**
   * Starts a Node program in a process group of its own, so that Ctrl-C reaches it through us, in order.
   * @param {object} service
   * @param {string} service.name
   * @param {readonly string[]} service.args for node
   * @param {NodeJS.ProcessEnv} service.env
   * @param {string} [service.cwd]
   * @param {string} [service.logFile] its output goes here, else to the terminal
   * @param {string} [service.stopAfter] the name of an earlier service that is to be stopped before this one
   * @param {boolean} [service.tool] a development tool with processes of its own, all to be stopped at once
   * @returns {Service}
   */
  start({ name, args, env, cwd = inRoot(), logFile, stopAfter, tool = false }) {
    const output = logFile ? openLog(logFile) : 'inherit';
    const child = spawn(process.execPath, ['--import', guard, ...args], {
      cwd,
      env: { ...env, LAMPWRIGHT_SUPERVISED: '1' },
      stdio: ['ignore', output, output, 'ipc'],
      detached: true,
    });
    if (typeof output === 'number') closeSync(output);
    let stopped = false;
    /** @type {Promise<number>} */
    const ended = new Promise((done) => {
      child.once('exit', (code) => done(code ?? 128));
      child.once('error', () => done(127));
    });
    ended.then((code) => {
      if (stopped || this.#stopping) return;
      const told = `${name} ended unexpectedly (exit code ${code}).${lastWords(logFile)}`;
      this.#failure.abort(new Trouble(told));
    });
    const end = (/** @type {NodeJS.Signals} */ signal) => {
      if (!tool || !child.pid) return child.kill(signal);
      // Its group holds what it has started, and may outlive it.
      try {
        process.kill(-child.pid, signal);
      } catch {
        // The whole group has ended.
      }
    };
    const stop = async () => {
      stopped = true;
      end('SIGTERM');
      const inTime = await Promise.race([ended, sleep(tool ? toolGraceMs : graceMs, null, { ref: false })]);
      if (inTime !== null) return;
      if (!tool) warn(`${name} did not stop in ${graceMs / 1000} s and was ended.`);
      end('SIGKILL');
      await ended;
    };
    const earlier = this.#undo.findIndex((one) => one.name === stopAfter);
    this.#undo.splice(earlier < 0 ? this.#undo.length : earlier, 0, { name, undo: stop });
    return { name, pid: child.pid, ended, stop };
  }

  /** Stops everything, the last started first; goes on past a failure and tells of it. */
  async stop() {
    if (this.#stopping) return;
    this.#stopping = true;
    for (const { name, undo } of this.#undo.reverse()) {
      try {
        await undo();
      } catch (error) {
        warn(`Stopping ${name}: ${error instanceof Error ? error.message : error}`);
      }
    }
  }
}

/** @param {string} file */
function openLog(file) {
  mkdirSync(dirname(file), { recursive: true });
  if (existsSync(file) && statSync(file).size > maxLogBytes) renameSync(file, `${file}.1`);
  return openSync(file, 'a', 0o600);
}

/** @param {string} [logFile] */
function lastWords(logFile) {
  if (!logFile) return '';
  const lines = readFileSync(logFile, 'utf8').trimEnd().split('\n').slice(-6).join('\n');
  return `${lines ? `\n${lines}` : ''}\nIts log is ${logFile}.`;
}

/** How often to look whether npm is still there. */
const lookMs = 250;

/**
 * Aborts at Ctrl-C, SIGTERM or a closed terminal. Repeated signals (npm passes on what the terminal has
 * already sent) change nothing.
 * @returns {AbortSignal}
 */
export function stopSignal() {
  const controller = new AbortController();
  for (const name of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
    process.on(name, () => controller.abort(name));
  }
  // A SIGTERM to npm ends the shell between npm and this process, which itself hears nothing of it.
  if (process.env.npm_lifecycle_event) {
    const parent = process.ppid;
    const look = () => process.ppid === parent || controller.abort('npm ended');
    setInterval(look, lookMs).unref();
  }
  return controller.signal;
}

/** @param {AbortSignal} signal @returns {Promise<void>} */
export const aborted = (signal) =>
  new Promise((done) => {
    if (signal.aborted) done();
    else signal.addEventListener('abort', () => done(), { once: true });
  });
