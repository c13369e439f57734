import assert from 'node:assert/strict';
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { setTimeout as sleep } from 'node:timers/promises';
import { isPortFree } from './ports.mjs';
import { openCluster } from './postgres.mjs';
import { scratchFolder } from './scratch-folder.mjs';

const folder = scratchFolder('postgres');
const cluster = await openCluster(folder);
after(async () => {
  await cluster.destroy();
  rmSync(folder, { recursive: true, force: true });
});

const portOf = (/** @type {import('./postgres.mjs').Cluster} */ { url }) => Number(new URL(url).port);

test('a new cluster keeps its passwords to its owner and listens on loopback alone', async () => {
  const [state = ''] = readdirSync(folder).filter((name) => name.endsWith('.json'));
  assert.equal(statSync(join(folder, state)).mode & 0o777, 0o600);
  assert.equal(await cluster.start(), true);
  assert.equal(await cluster.sql('show listen_addresses'), '127.0.0.1');
  assert.equal(await cluster.sql('show unix_socket_directories'), '');
  assert.equal(await cluster.sql('show fsync'), 'on');
  assert.equal(await cluster.sql('show synchronous_commit'), 'on');
});

test('the product’s role owns its database and nothing more', async () => {
  await cluster.ensureDatabase();
  await cluster.ensureDatabase();
  const owner = "select pg_get_userbyid(datdba) from pg_database where datname = 'lampwright'";
  assert.equal(await cluster.sql(owner), 'lampwright');
  assert.equal(await cluster.sql("select rolsuper from pg_roles where rolname = 'lampwright'"), 'f');
});

test('a running server is taken over as it is', async () => {
  const again = await openCluster(folder);
  assert.equal(await again.start(), false);
  assert.equal(again.pid, cluster.pid);
  assert.equal(again.url, cluster.url);
});

test('after kill -9 it starts again, with what was committed', async () => {
  await cluster.sql('create table kept (n int); insert into kept values (7)');
  process.kill(cluster.pid ?? 0, 'SIGKILL');
  while (cluster.pid !== null) await sleep(5);
  assert.equal(await cluster.start(), true);
  assert.equal(await cluster.sql('select n from kept'), '7');
});

test('a pid file that names another program does not keep it from starting', async () => {
  await cluster.stop();
  writeFileSync(join(cluster.folder, 'postmaster.pid'), `${process.pid}\n${cluster.folder}\n0\n5432\n\n`);
  assert.equal(cluster.pid, null);
  assert.equal(await cluster.start(), true);
});

test('a throwaway one saves itself the waiting for the disk, for as long as it runs', async () => {
  await cluster.stop();
  const careless = await openCluster(folder, { throwaway: true });
  await careless.start();
  for (const name of ['fsync', 'synchronous_commit', 'full_page_writes'])
    assert.equal(await careless.sql(`show ${name}`), 'off');
  await careless.stop();
  await cluster.start();
  assert.equal(await cluster.sql('show fsync'), 'on');
});

test('it moves to another port when its own is taken, and remembers that', async () => {
  await cluster.stop();
  const before = portOf(cluster);
  const squatter = createServer().listen(before, '127.0.0.1');
  await new Promise((done) => squatter.once('listening', done));
  try {
    await cluster.start();
    assert.notEqual(portOf(cluster), before);
    assert.equal((await openCluster(folder)).url, cluster.url);
  } finally {
    await new Promise((done) => squatter.close(done));
  }
});

test('stopping ends the server', async () => {
  await cluster.stop();
  assert.equal(cluster.pid, null);
  assert.equal(await isPortFree(portOf(cluster)), true);
  assert.match(readFileSync(join(cluster.folder, 'server.log'), 'utf8'), /database system is shut down/);
});

test('a cluster whose passwords were removed is kept aside, and a new one made', async () => {
  const [state = ''] = readdirSync(folder).filter((name) => name.endsWith('.json'));
  rmSync(join(folder, state));
  const fresh = await openCluster(folder);
  assert.ok(existsSync(`${cluster.folder}.left-1`));
  await fresh.start();
  assert.equal(await fresh.sql("select to_regclass('kept') is null"), 't');
});
