import { existsSync, mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { hashFiles, listFiles } from './files.mjs';
import { withLock } from './lock.mjs';
import { say, since, Trouble } from './log.mjs';
import { inRoot, root } from './paths.mjs';
import { precompress } from './precompress.mjs';
import { run } from './processes.mjs';

/**
 * @typedef {object} Part
 * @property {string} name
 * @property {string[]} inputs files and folders that the output depends on, relative to the checkout
 * @property {string} output a file that a finished build has
 * @property {string[]} command run with npx
 * @property {string} folder where it runs
 * @property {string} [compressed] a built folder whose text files get compressed copies
 * @property {boolean} [onlyWhenNamed] no part of the product
 * @property {NodeJS.ProcessEnv} [env] settings of its own
 */

const everywhere = ['package-lock.json', 'tsconfig.base.json'];

const editorInputs = [...everywhere, 'geometry/src', 'fonts', 'editor', 'scripts/lib/precompress.mjs'];

/** In the order in which they need one another. @type {Part[]} */
export const parts = [
  {
    name: 'geometry',
    inputs: [...everywhere, 'geometry/package.json', 'geometry/tsconfig.build.json', 'geometry/src'],
    output: 'geometry/dist/units/index.js',
    command: ['tsc', '-p', 'geometry/tsconfig.build.json'],
    folder: '.',
  },
  {
    name: 'api',
    inputs: [
      ...everywhere,
      ...['package.json', 'nest-cli.json', '.swcrc', 'tsconfig.json', 'src'].map((name) => `api/${name}`),
    ],
    output: 'api/dist/main.js',
    command: ['nest', 'build'],
    folder: 'api',
  },
  {
    name: 'editor',
    inputs: editorInputs,
    output: 'editor/dist/index.html',
    command: ['vite', 'build'],
    folder: 'editor',
    compressed: 'editor/dist',
  },
  {
    // The same with the handle through which tests see the canvas; beside the product's own, which may be running.
    name: 'editor-for-tests',
    inputs: editorInputs,
    output: 'e2e/dist/index.html',
    command: ['vite', 'build', '--outDir', '../e2e/dist', '--emptyOutDir'],
    folder: 'editor',
    onlyWhenNamed: true,
    env: { VITE_TEST_HANDLE: '1' },
  },
];

const cache = inRoot('node_modules/.cache/lampwright-build');

/** Tests don't go into a build; outputs are not inputs. @param {string} path */
const isInput = (path) => !/\.(spec|testkit)\.tsx?$|\/(dist|node_modules|test)$|\.tsbuildinfo$/.test(path);

/** @param {Part} part */
const inputHash = (part) =>
  hashFiles(
    root,
    listFiles(
      part.inputs.map((input) => inRoot(input)),
      isInput,
    ),
  );

/** @param {Part} part @param {string} hash */
function isFresh(part, hash) {
  const stamp = join(cache, part.name);
  return existsSync(inRoot(part.output)) && existsSync(stamp) && readFileSync(stamp, 'utf8') === hash;
}

/**
 * Builds the parts whose inputs changed since their last build.
 * @param {{ signal?: AbortSignal, only?: readonly string[] }} [options]
 * @returns {Promise<string[]>} the names of the parts that were built
 * @throws {Trouble} with the tool's own words when one fails
 */
export function build({ signal, only } = {}) {
  return withLock(join(cache, 'lock'), 'building', async () => {
    const built = [];
    for (const part of parts) {
      if (only ? !only.includes(part.name) : part.onlyWhenNamed) continue;
      const hash = inputHash(part);
      if (isFresh(part, hash)) continue;
      await buildPart(part, signal);
      // The hash from before: an edit during the build makes the next one build again.
      writeFileSync(join(cache, part.name), hash);
      built.push(part.name);
    }
    return built;
  });
}

/** @param {Part} part @param {AbortSignal} [signal] */
async function buildPart(part, signal) {
  const startedAt = performance.now();
  const wallClock = Date.now();
  rmSync(join(cache, part.name), { force: true });
  mkdirSync(cache, { recursive: true });
  const env = { ...process.env, NODE_ENV: 'production', NO_COLOR: '1', ...part.env };
  const [tool = '', ...args] = part.command;
  const program = inRoot('node_modules/.bin', tool);
  const result = await run(program, args, { cwd: inRoot(part.folder), env, signal });
  if (result.code !== 0 || !existsSync(inRoot(part.output))) {
    throw new Trouble(`Building ${part.name} failed:\n${`${result.stdout}\n${result.stderr}`.trim()}`);
  }
  if (part.compressed !== undefined) await precompress(inRoot(part.compressed));
  if (part.name === 'geometry') removeOlder(inRoot('geometry/dist'), wallClock);
  say(`Built ${part.name} in ${since(startedAt)}.`);
}

/**
 * tsc leaves the outputs of deleted sources behind. Emptying the folder first would pull it from under
 * whoever is running from it.
 * @param {string} folder
 * @param {number} wallClock files older than this were not written by the build
 */
function removeOlder(folder, wallClock) {
  // File times are coarser than the clock.
  for (const file of listFiles([folder])) if (statSync(file).mtimeMs < wallClock - 1000) rmSync(file);
}
