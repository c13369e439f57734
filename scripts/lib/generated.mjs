import { cpSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { build } from './build.mjs';
import { hashFiles, listFiles } from './files.mjs';
import { inRoot, root } from './paths.mjs';
import { mustRun, run } from './processes.mjs';

/** Scratch inside the checkout: drizzle-kit takes output folders relative to it. */
export const scratch = inRoot('node_modules/.cache/lampwright-generate');

const openapi = 'api/openapi.json';
const client = 'editor/src/lib/api/generated/schema.ts';

/** @param {string} tool @param {readonly string[]} args @param {string} [input] */
const tool = (tool, args, input) => mustRun(inRoot('node_modules/.bin', tool), args, { cwd: root, input });

/**
 * Makes the generated files anew in the scratch folder.
 * @returns {Promise<{ path: string, content: string }[]>} path relative to the checkout
 */
export async function generateFiles() {
  await build({ only: ['geometry', 'api'] });
  mkdirSync(scratch, { recursive: true });
  const document = join(scratch, 'openapi.json');
  await mustRun(process.execPath, [inRoot('api/dist/openapi.js'), document], { cwd: root });
  const types = join(scratch, 'schema.ts');
  await tool('openapi-typescript', [document, '-o', types, '--default-non-nullable=false']);
  const raw = readFileSync(document, 'utf8');
  const { stdout } = await tool('biome', ['format', `--stdin-file-path=${openapi}`], raw);
  return [
    { path: openapi, content: stdout },
    { path: client, content: readFileSync(types, 'utf8') },
  ];
}

/** @param {{ path: string, content: string }} file */
export function isStale({ path, content }) {
  return !existsSync(inRoot(path)) || readFileSync(inRoot(path), 'utf8') !== content;
}

/** @param {{ path: string, content: string }} file */
export function write({ path, content }) {
  mkdirSync(dirname(inRoot(path)), { recursive: true });
  writeFileSync(inRoot(path), content);
}

/** @param {string} out relative to the checkout @param {string} [name] */
const drizzleArguments = (out, name) => [
  'generate',
  '--dialect=postgresql',
  '--schema=./api/src/database/schema/*.ts',
  `--out=./${out}`,
  ...(name ? [`--name=${name}`] : []),
];

/**
 * Whether the database schema in the code says more than the migrations do, found by generating into a copy.
 * @returns {Promise<string | null>} what is wrong
 */
export async function staleMigrations() {
  const copy = join(scratch, 'drizzle');
  rmSync(copy, { recursive: true, force: true });
  cpSync(inRoot('drizzle'), copy, { recursive: true });
  const before = hashFiles(copy, listFiles([copy]));
  // A renamed column makes it ask; without a terminal it then fails, which also means that it is stale.
  const result = await run(inRoot('node_modules/.bin/drizzle-kit'), drizzleArguments(relative(root, copy)), {
    cwd: root,
  });
  const changed = hashFiles(copy, listFiles([copy])) !== before;
  rmSync(copy, { recursive: true, force: true });
  if (!changed && result.code === 0 && /nothing to migrate/.test(result.stdout)) return null;
  const said = changed ? '' : `\n${`${result.stdout}\n${result.stderr}`.trim()}`;
  return `drizzle/ lacks a migration for the schema in api/src/database/schema${said}`;
}

/**
 * Writes the migration that is lacking, if any; asks in the terminal when a rename is possible.
 * @param {string} [name]
 * @returns {Promise<boolean>} false when drizzle-kit failed
 */
export async function generateMigrations(name) {
  const args = drizzleArguments('drizzle', name);
  return (await run('npx', ['drizzle-kit', ...args], { cwd: root, output: 'show' })).code === 0;
}
