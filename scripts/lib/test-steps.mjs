import { cpSync, existsSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { build } from './build.mjs';
import { claimDataFolder } from './data-folder.mjs';
import { listFiles } from './files.mjs';
import { report, say, warn } from './log.mjs';
import { journalFaults } from './migration-order.mjs';
import { inRoot, root } from './paths.mjs';
import { freePort } from './ports.mjs';
import { run } from './processes.mjs';
import { startProduct } from './product.mjs';
import { scratchFolder } from './scratch-folder.mjs';
import { Supervisor } from './supervisor.mjs';
import { nodeTestCounts, oneOf, playwrightCounts, sum, vitestCounts } from './test-counts.mjs';

/**
 * @typedef {import('./test-counts.mjs').Counts} Counts
 *
 * @typedef {object} TestContext
 * @property {string} scratch a folder for reports
 * @property {AbortSignal} signal
 * @property {() => Promise<string>} testDatabase starts the run's own database server when first asked
 * @property {number} cores that the step may keep busy
 *
 * @typedef {object} Step
 * @property {string} name
 * @property {string} title
 * @property {boolean} [aside] needs nothing of the others and takes long: it may run beside them
 * @property {(context: TestContext) => Promise<Counts>} run
 */

/** With CI set, `.only` is refused and snapshots are not written; it also makes some tools colour a file. */
const env = { ...process.env, CI: '1', ...(process.stdout.isTTY ? {} : { NO_COLOR: '1' }) };

/**
 * @param {string} tool
 * @param {readonly string[]} args
 * @param {TestContext} context
 * @param {import('./processes.mjs').RunOptions} [options]
 */
const show = async (tool, args, { signal }, options) =>
  (await run(inRoot('node_modules/.bin', tool), args, { cwd: root, env, output: 'show', signal, ...options }))
    .code;

/** @param {TestContext} context */
async function lint(context) {
  // It takes CI for a terminal with colours.
  const colors = process.stdout.isTTY ? [] : ['--colors=off'];
  return oneOf((await show('biome', ['ci', ...colors], context)) === 0);
}

/** @param {TestContext} context */
async function types({ signal, cores }) {
  const projects = ['api', 'editor', 'geometry', 'e2e', 'scripts'].filter((name) =>
    existsSync(inRoot(name, 'tsconfig.json')),
  );
  const tsc = inRoot('node_modules/.bin/tsc');
  /** @type {Counts[]} */
  const results = [];
  const checkNext = async () => {
    for (let project = projects.shift(); project !== undefined; project = projects.shift()) {
      const args = ['-p', join(project, 'tsconfig.json'), '--noEmit', '--pretty', 'false'];
      const { code, stdout, stderr } = await run(tsc, args, { cwd: root, env, signal });
      say(`${project}: ${code === 0 ? 'ok' : `\n${stdout}${stderr}`}`);
      results.push(oneOf(code === 0));
    }
  };
  await Promise.all(Array.from({ length: cores }, checkNext));
  return sum(results);
}

/** @param {TestContext} context */
async function rules(context) {
  const folders = ['geometry/src', 'api/src', 'editor/src'].filter((folder) => existsSync(inRoot(folder)));
  return oneOf(
    (await show('depcruise', ['--config', 'scripts/dependency-rules.cjs', ...folders], context)) === 0,
  );
}

/** @param {TestContext} context */
async function generated({ signal }) {
  const args = [inRoot('scripts/generate.mjs'), '--check'];
  return oneOf((await run(process.execPath, args, { cwd: root, env, output: 'show', signal })).code === 0);
}

/** @param {TestContext} context */
const buildAll = (context) => buildSome(context);

/**
 * @param {TestContext} context
 * @param {readonly string[]} [only]
 */
async function buildSome({ signal }, only) {
  try {
    const built = await build(only ? { signal, only } : { signal });
    say(built.length === 0 ? 'Already built.' : `Built ${built.join(', ')}.`);
    return oneOf(true);
  } catch (error) {
    report(error);
    return oneOf(false);
  }
}

async function migrations() {
  const faults = journalFaults(inRoot('drizzle/meta/_journal.json'));
  for (const fault of faults) warn(fault);
  if (faults.length === 0) say('Migrations are dated in their order.');
  return oneOf(faults.length === 0);
}

/** @param {TestContext} context */
async function scripts({ scratch, signal }) {
  const files = listFiles([inRoot('scripts')]).filter((file) => file.endsWith('.test.mjs'));
  const tap = join(scratch, 'scripts.tap');
  const reporters = [
    ['--test-reporter=spec', '--test-reporter-destination=stdout'],
    ['--test-reporter=tap', `--test-reporter-destination=${tap}`],
  ];
  const args = ['--test', ...reporters.flat(), ...files];
  const { code } = await run(process.execPath, args, { cwd: root, env, output: 'show', signal });
  return nodeTestCounts(tap, code);
}

/**
 * @param {string} workspace
 * @param {TestContext} context
 * @param {NodeJS.ProcessEnv} [more]
 */
async function vitest(workspace, context, more) {
  const file = join(context.scratch, `${workspace}.json`);
  const reports = ['--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const args = ['run', `--maxWorkers=${context.cores}`, ...reports];
  const code = await show('vitest', args, context, { cwd: inRoot(workspace), env: { ...env, ...more } });
  return vitestCounts(file, code);
}

/** @param {TestContext} context */
async function unit(context) {
  return sum([await vitest('geometry', context), await vitest('editor', context)]);
}

/** @param {TestContext} context */
const api = async (context) => vitest('api', context, { TEST_DATABASE_URL: await context.testDatabase() });

/** Against the built product over a data folder of its own. @param {TestContext} context */
async function e2e(context) {
  if ((await buildSome(context, ['geometry', 'api', 'editor-for-tests'])).failed > 0) {
    warn('There is nothing to test end to end without a build.');
    return oneOf(false);
  }
  const folder = scratchFolder('e2e');
  const logs = inRoot('test-results/server-logs');
  rmSync(logs, { recursive: true, force: true });
  const supervisor = new Supervisor();
  let counts = oneOf(false);
  try {
    claimDataFolder(folder, supervisor, 'npm test');
    const port = await freePort();
    const editorFiles = inRoot('e2e/dist');
    const { url } = await startProduct({
      folder,
      port,
      supervisor,
      signal: context.signal,
      editorFiles,
      throwaway: true,
    });
    const file = join(context.scratch, 'e2e.json');
    const more = { LAMPWRIGHT_URL: url, PLAYWRIGHT_JSON_OUTPUT_FILE: file };
    const args = ['test', '-c', 'e2e/playwright.config.ts'];
    // Without its server there is nothing more to see: the tests end with it.
    const signal = AbortSignal.any([context.signal, supervisor.signal]);
    const code = await show('playwright', args, context, { env: { ...env, ...more }, signal });
    counts = playwrightCounts(file, code);
  } catch (error) {
    if (context.signal.aborted) throw error;
    report(supervisor.signal.aborted ? supervisor.signal.reason : error);
  } finally {
    await supervisor.stop();
    if (counts.failed > 0 && existsSync(join(folder, 'logs'))) {
      cpSync(join(folder, 'logs'), logs, { recursive: true });
      say(`The server's logs are in ${logs}.`);
    }
    rmSync(folder, { recursive: true, force: true });
  }
  return counts;
}

/** In the order in which they run and are told: the quick and telling ones first. @type {Step[]} */
export const steps = [
  { name: 'lint', title: 'Format and lint', run: lint },
  { name: 'types', title: 'Types', run: types },
  { name: 'rules', title: 'Import rules', run: rules },
  { name: 'migrations', title: 'Order of migrations', run: migrations },
  { name: 'generated', title: 'Generated files', run: generated },
  { name: 'build', title: 'Build', run: buildAll },
  { name: 'unit', title: 'Unit tests', run: unit },
  { name: 'scripts', title: 'Tests of the commands', run: scripts },
  { name: 'api', title: 'API tests', run: api },
  { name: 'e2e', title: 'End-to-end tests', aside: true, run: e2e },
];
