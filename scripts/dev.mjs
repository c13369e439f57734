// npm run dev: the product with reload on change, over the same data folder as npm start.
import { build } from './lib/build.mjs';
import { claimDataFolder, requirePort } from './lib/data-folder.mjs';
import { ensurePackages } from './lib/debian.mjs';
import { main, report, say } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';
import { dataFolder, inRoot } from './lib/paths.mjs';
import { freePort, readPort, waitForPort } from './lib/ports.mjs';
import { startGround, waitForHealth } from './lib/product.mjs';
import { aborted, Supervisor, stopSignal } from './lib/supervisor.mjs';

const bin = (/** @type {string} */ name) => inRoot('node_modules/.bin', name);

await main(async () => {
  const port = readPort();
  const folder = dataFolder();
  const signal = stopSignal();
  const supervisor = new Supervisor();
  let code = 0;
  try {
    claimDataFolder(folder, supervisor, 'npm run dev');
    await requirePort(port);
    await ensurePackages(['postgresql', 'poppler-utils'], signal);
    await ensureNodeModules(signal);
    await build({ signal });
    const page = await startAll(folder, port, supervisor, signal);
    say(`Lampwright is ready at ${page} (its API at http://127.0.0.1:${port})`);
    await Promise.race([aborted(signal), supervisor.failed]);
  } catch (error) {
    if (!signal.aborted) {
      report(error);
      code = 1;
    }
  }
  await supervisor.stop();
  return code;
});

/**
 * @param {string} folder
 * @param {number} port
 * @param {Supervisor} supervisor
 * @param {AbortSignal} signal
 */
async function startAll(folder, port, supervisor, signal) {
  const editorPort = await freePort(5173);
  const page = `http://127.0.0.1:${editorPort}`;
  // The page of a homeowner's link is filled in by the API: from the source, which vite then makes ready.
  const editorFiles = inRoot('editor');
  const { env } = await startGround({ folder, supervisor, signal, port, publicUrl: page, editorFiles });
  const tool = (/** @type {Parameters<Supervisor['start']>[0]} */ service) =>
    supervisor.start({ ...service, tool: true });

  const watch = [bin('tsc'), '-p', 'geometry/tsconfig.build.json', '--watch', '--preserveWatchOutput'];
  tool({ name: 'The compiler of geometry', args: watch, env });
  tool({ name: 'The API', args: [bin('nest'), 'start', '--watch'], env, cwd: inRoot('api') });
  // The API's compiler empties the folder that the worker runs from when it begins.
  const stopped = AbortSignal.any([signal, supervisor.signal]);
  await waitForHealth(`http://127.0.0.1:${port}`, stopped);
  tool({
    name: 'The worker',
    args: ['--watch', '--watch-preserve-output', inRoot('api/dist/worker.js')],
    env,
  });

  const vite = [bin('vite'), '--port', String(editorPort), '--strictPort', '--clearScreen', 'false'];
  const editorEnv = { ...env, LAMPWRIGHT_API_URL: `http://127.0.0.1:${port}` };
  tool({ name: 'The editor', args: vite, env: editorEnv, cwd: inRoot('editor') });
  await waitForPort(editorPort, { signal: stopped });
  return page;
}
