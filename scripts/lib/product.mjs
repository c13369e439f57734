import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { fakeFolders, fakesEnvironment, productEnvironment } from './local-environment.mjs';
import { readState, writeState } from './local-state.mjs';
import { say, Trouble } from './log.mjs';
import { inRoot } from './paths.mjs';
import { waitForPort } from './ports.mjs';
import { openCluster } from './postgres.mjs';
import { run } from './processes.mjs';
import { settleRestore } from './restore-swap.mjs';

/** @typedef {import('./supervisor.mjs').Supervisor} Supervisor */

const readyTimeoutMs = 60_000;

/**
 * The services that everything else needs: database (migrated) and fakes, and the demo in a new database.
 * @param {object} options
 * @param {string} options.folder a claimed data folder
 * @param {Supervisor} options.supervisor
 * @param {AbortSignal} options.signal
 * @param {number} options.port of the API
 * @param {string} [options.publicUrl]
 * @param {string} [options.editorFiles] another build of the editor than the product's own
 * @param {boolean} [options.throwaway] the data need not outlive a crash of the machine
 */
export async function startGround({ folder, supervisor, signal, port, publicUrl, editorFiles, throwaway }) {
  const cluster = await openCluster(folder, { throwaway });
  supervisor.onStop('the database', () => cluster.stop());
  await cluster.start();
  signal.throwIfAborted();
  await cluster.ensureDatabase();
  await settleRestore(folder, cluster);
  let state = await readState(folder);
  await startFakes({ folder, state, port, supervisor, signal });
  const env = productEnvironment({ state, port, databaseUrl: cluster.url, publicUrl, editorFiles });
  await runStep('Migrating the database', 'api/dist/database/migrate.js', env, signal);
  if (!state.demoLoaded) {
    say('Loading the demo company …');
    await runStep('Loading the demo company', 'api/dist/demo/load.js', env, signal);
    state = { ...state, demoLoaded: true };
    writeState(folder, state);
  }
  return { cluster, env, state };
}

/**
 * @param {object} options
 * @param {string} options.folder
 * @param {import('./local-state.mjs').LocalState} options.state
 * @param {number} options.port of the API
 * @param {Supervisor} options.supervisor
 * @param {AbortSignal} options.signal
 */
async function startFakes({ folder, state, port, supervisor, signal }) {
  for (const path of Object.values(fakeFolders(folder))) mkdirSync(path, { recursive: true, mode: 0o700 });
  supervisor.start({
    name: 'The local storage, mail and card service',
    args: [inRoot('api/dist/ports/fakes.js')],
    env: fakesEnvironment(folder, state, port),
    logFile: join(folder, 'logs', 'fakes.log'),
  });
  const stopped = AbortSignal.any([signal, supervisor.signal]);
  const up = await Promise.all(
    Object.values(state.ports).map((port) => waitForPort(port, { signal: stopped })),
  );
  if (up.includes(false)) throw new Trouble(`The local services did not start; see ${folder}/logs.`);
}

/**
 * @param {string} what
 * @param {string} script
 * @param {NodeJS.ProcessEnv} env
 * @param {AbortSignal} signal
 */
async function runStep(what, script, env, signal) {
  const result = await run(process.execPath, [inRoot(script)], { cwd: inRoot(), env, signal });
  if (result.code !== 0) throw new Trouble(`${what} failed:\n${`${result.stdout}\n${result.stderr}`.trim()}`);
}

/**
 * Starts the built product over a claimed data folder and waits until it is ready.
 * @param {object} options
 * @param {string} options.folder
 * @param {number} options.port
 * @param {Supervisor} options.supervisor
 * @param {AbortSignal} options.signal
 * @param {string} [options.editorFiles] another build of the editor than the product's own
 * @param {boolean} [options.throwaway] the data need not outlive a crash of the machine
 */
export async function startProduct({ folder, port, supervisor, signal, editorFiles, throwaway }) {
  const { cluster, env } = await startGround({ folder, supervisor, signal, port, editorFiles, throwaway });
  const url = `http://127.0.0.1:${port}`;
  const service = (/** @type {string} */ script) => ({
    args: [inRoot(`api/dist/${script}.js`)],
    env,
    logFile: join(folder, 'logs', `${script === 'main' ? 'api' : script}.log`),
  });
  supervisor.start({ name: 'The API', ...service('main') });
  await waitForHealth(url, AbortSignal.any([signal, supervisor.signal]));
  // Stopped first no more requests, then no more work, then what both stand on.
  supervisor.start({ name: 'The worker', ...service('worker'), stopAfter: 'The API' });
  return { url, cluster, env };
}

/**
 * @param {string} url
 * @param {AbortSignal} signal
 * @throws {Trouble} when it is not healthy in time
 */
export async function waitForHealth(url, signal) {
  const end = performance.now() + readyTimeoutMs;
  let last = 'no answer';
  while (performance.now() < end) {
    signal.throwIfAborted();
    try {
      const response = await fetch(`${url}/api/health`, { signal: AbortSignal.timeout(5000) });
      if (response.ok) return;
      last = `${response.status} ${await response.text()}`;
    } catch (error) {
      last = error instanceof Error ? error.message : String(error);
    }
    await sleep(100);
  }
  throw new Trouble(`The API did not become ready in ${readyTimeoutMs / 1000} s: ${last}`);
}
