// node scripts/test-database.mjs up | down
// A database server for running single spec files by hand; it stays up between runs.
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { ensurePackages } from './lib/debian.mjs';
import { withLock } from './lib/lock.mjs';
import { main, say, Trouble } from './lib/log.mjs';
import { folderHash, root } from './lib/paths.mjs';
import { openCluster } from './lib/postgres.mjs';

const folder = `/var/tmp/lampwright-dev-${folderHash(`${root} ${process.getuid?.()}`)}`;

async function prepare() {
  mkdirSync(folder, { recursive: true, mode: 0o755 });
  await ensurePackages(['postgresql']);
  return openCluster(folder, { throwaway: true });
}

/** Several test runs may ask at the same moment. @template T @param {() => Promise<T>} body */
const alone = (body) => withLock(join(folder, 'lock'), 'starting the test database', body);

/**
 * The address of a running server, as a superuser who may make databases: TEST_DATABASE_URL when set,
 * else this checkout's own developer cluster, started when it is not running.
 * @returns {Promise<string>}
 */
export async function ensureTestDatabase() {
  const given = process.env.TEST_DATABASE_URL;
  if (given) return given;
  return alone(async () => {
    const cluster = await prepare();
    await cluster.start();
    return cluster.keeperUrl();
  });
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) {
  await main(async () => {
    const [command] = process.argv.slice(2);
    if (command === 'up') say(`TEST_DATABASE_URL=${await ensureTestDatabase()}`);
    else if (command === 'down') await alone(async () => (await prepare()).stop());
    else throw new Trouble('Use: node scripts/test-database.mjs up, or down.');
  });
}
