// npm run bench [-- NAME …]: prints tables of measurements; asserts nothing.
// A bench is scripts/bench/NAME.mjs with `export async function run(print, context)`.
import { existsSync, readdirSync, rmSync } from 'node:fs';
import { cpus, totalmem } from 'node:os';
import { build } from './lib/build.mjs';
import { claimDataFolder } from './lib/data-folder.mjs';
import { ensurePackages } from './lib/debian.mjs';
import { main, report, say, since, Trouble } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';
import { inRoot } from './lib/paths.mjs';
import { freePort } from './lib/ports.mjs';
import { startProduct } from './lib/product.mjs';
import { scratchFolder } from './lib/scratch-folder.mjs';
import { Supervisor, stopSignal } from './lib/supervisor.mjs';

/**
 * What a bench may use; the product is started when first asked for, over a throwaway data folder with the
 * demo company in it, and serves all benches of the run.
 * @typedef {object} BenchContext
 * @property {() => Promise<string>} baseUrl
 * @property {() => Promise<string>} databaseUrl as the product's own role
 * @property {AbortSignal} signal
 *
 * @typedef {(print: (line: string) => void, context: BenchContext) => Promise<void>} Bench
 */

await main(async () => {
  const names = choose(process.argv.slice(2));
  const signal = stopSignal();
  const supervisor = new Supervisor();
  let code = 0;
  try {
    await ensurePackages(['postgresql', 'poppler-utils', 'chromium'], signal);
    await ensureNodeModules(signal);
    await build({ signal });
    const [cpu] = cpus();
    const memory = Math.round(totalmem() / 2 ** 30);
    say(`Machine: ${cpu?.model.trim()}, ${cpus().length} cores, ${memory} GiB; Node ${process.version}`);
    const context = makeContext(supervisor, signal);
    for (const name of names) {
      say(`\n━━ ${name}`);
      const startedAt = performance.now();
      /** @type {{ run: Bench }} */
      const bench = await import(inRoot('scripts/bench', `${name}.mjs`));
      await bench.run(say, context);
      say(`(${since(startedAt)})`);
    }
  } catch (error) {
    if (!signal.aborted) report(error);
    code = 1;
  }
  await supervisor.stop();
  return code;
});

/** @param {readonly string[]} asked */
function choose(asked) {
  const folder = inRoot('scripts/bench');
  const files = existsSync(folder) ? readdirSync(folder).sort() : [];
  // Helpers and tests lie beside the benches: name.kit.mjs, name.test.mjs.
  const all = files.filter((name) => /^[^.]+\.mjs$/.test(name)).map((name) => name.slice(0, -4));
  for (const name of asked) {
    if (!all.includes(name)) throw new Trouble(`There is no bench "${name}"; there are: ${all.join(', ')}.`);
  }
  return asked.length > 0 ? asked : all;
}

/** @param {Supervisor} supervisor @param {AbortSignal} signal @returns {BenchContext} */
function makeContext(supervisor, signal) {
  /** @type {ReturnType<typeof startProduct> | undefined} */
  let started;
  const product = () => {
    started ??= start(supervisor, signal);
    return started;
  };
  return {
    signal,
    baseUrl: async () => (await product()).url,
    databaseUrl: async () => (await product()).cluster.url,
  };
}

/** @param {Supervisor} supervisor @param {AbortSignal} signal */
async function start(supervisor, signal) {
  const folder = scratchFolder('bench');
  supervisor.onStop('the data folder', async () => rmSync(folder, { recursive: true, force: true }));
  claimDataFolder(folder, supervisor, 'npm run bench');
  return startProduct({ folder, port: await freePort(), supervisor, signal });
}
