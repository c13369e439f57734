// npm run generate [-- --name what_changes]: writes the committed generated files anew.
// npm run generate -- --check: tells which of them are stale, and changes nothing.
import { join } from 'node:path';
import {
  generateFiles,
  generateMigrations,
  isStale,
  scratch,
  staleMigrations,
  write,
} from './lib/generated.mjs';
import { withLock } from './lib/lock.mjs';
import { main, say, Trouble, warn } from './lib/log.mjs';
import { ensureNodeModules } from './lib/node-modules.mjs';

const usage = 'Use: npm run generate [-- --name what_changes], or npm run generate -- --check';

await main(async () => {
  const args = process.argv.slice(2);
  const check = args[0] === '--check';
  const name = args[0] === '--name' ? args[1] : undefined;
  if (args.length > (check ? 1 : 2) || (args.length > 0 && !check && !name)) throw new Trouble(usage);
  await ensureNodeModules();
  return withLock(join(scratch, 'lock'), 'generating', () => (check ? checkAll() : generateAll(name)));
});

async function checkAll() {
  const faults = (await generateFiles()).filter(isStale).map(({ path }) => `${path} is stale`);
  const migrations = await staleMigrations();
  if (migrations) faults.push(migrations);
  for (const fault of faults) warn(`${fault}; run "npm run generate" and commit the result.`);
  if (faults.length === 0) say('Generated files are current.');
  return faults.length === 0 ? 0 : 1;
}

/** @param {string} [name] of a new migration */
async function generateAll(name) {
  if (!(await generateMigrations(name))) throw new Trouble('drizzle-kit could not generate the migration.');
  for (const file of await generateFiles()) {
    if (!isStale(file)) continue;
    write(file);
    say(`Wrote ${file.path}.`);
  }
  return 0;
}
