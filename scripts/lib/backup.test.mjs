import assert from 'node:assert/strict';
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { writeBackup } from './backup.mjs';
import { fakeFolders } from './local-environment.mjs';
import { readState } from './local-state.mjs';
import { openCluster, productDatabase } from './postgres.mjs';
import { mustRun } from './processes.mjs';
import { restoreBackup } from './restore.mjs';
import { incoming, settleRestore } from './restore-swap.mjs';
import { scratchFolder } from './scratch-folder.mjs';
import { Supervisor } from './supervisor.mjs';

const folder = scratchFolder('backup');
const file = join(scratchFolder('backup-file'), 'yard.backup');
const { objects } = fakeFolders(folder);
const cluster = await openCluster(folder);
after(async () => {
  await cluster.destroy();
  for (const path of [folder, join(file, '..')]) rmSync(path, { recursive: true, force: true });
});

/** As the product's own role, which owns what it makes. @param {string} text */
async function product(text) {
  const args = ['-X', '-q', '-A', '-t', '-v', 'ON_ERROR_STOP=1', '-d', cluster.url];
  return (await mustRun(`${cluster.bin}/psql`, args, { input: text })).stdout.trim();
}

/** @template T @param {(supervisor: Supervisor) => Promise<T>} body */
async function supervised(body) {
  const supervisor = new Supervisor();
  try {
    return await body(supervisor);
  } finally {
    await supervisor.stop();
  }
}

/** @template T @param {() => Promise<T>} body */
async function whileRunning(body) {
  await cluster.start();
  try {
    return await body();
  } finally {
    await cluster.stop();
  }
}

test('a round trip brings back database and files exactly', async () => {
  await readState(folder);
  await whileRunning(async () => {
    await cluster.ensureDatabase();
    await product('create schema inner_part; create table inner_part.notes (id serial, says text);');
    await product("insert into inner_part.notes (says) values ('bed lights'), ('älter')");
  });
  const photo = Buffer.from(Array.from({ length: 70_000 }, (_, n) => (n * 7919) % 256));
  mkdirSync(join(objects, 'lampwright', 'sheets'), { recursive: true });
  writeFileSync(join(objects, 'lampwright', 'sheets', 'photo'), photo);

  await supervised((supervisor) => writeBackup(folder, file, supervisor));
  assert.equal(statSync(file).mode & 0o777, 0o600);
  assert.equal(cluster.pid, null, 'the server is stopped again when it was not running before');

  await whileRunning(() => product("update inner_part.notes set says = 'changed'; create table extra ()"));
  writeFileSync(join(objects, 'lampwright', 'sheets', 'photo'), 'changed');
  writeFileSync(join(objects, 'later'), 'later');

  await supervised((supervisor) => restoreBackup(folder, file, supervisor));
  await whileRunning(async () => {
    assert.equal(await product('select id, says from inner_part.notes order by id'), '1|bed lights\n2|älter');
    assert.equal(await product("select to_regclass('extra') is null"), 't');
    assert.equal(await product("insert into inner_part.notes (says) values ('new') returning id"), '3');
    assert.equal(await cluster.sql("select count(*) from pg_database where datname like 'lampwright%'"), '1');
  });
  assert.deepEqual(readFileSync(join(objects, 'lampwright', 'sheets', 'photo')), photo);
  assert.equal(existsSync(join(objects, 'later')), false);
  assert.deepEqual(
    readdirSync(folder).filter((name) => /previous|restore-|backup-/.test(name)),
    [],
  );
});

test('a backup is made while the product runs, without stopping it', async () => {
  await cluster.start();
  const running = new Supervisor();
  const { claimDataFolder } = await import('./data-folder.mjs');
  claimDataFolder(folder, running, 'npm start');
  try {
    await supervised((supervisor) => writeBackup(folder, `${file}.live`, supervisor));
    assert.notEqual(cluster.pid, null);
    await assert.rejects(
      supervised((supervisor) => restoreBackup(folder, file, supervisor)),
      /is in use \(npm start/,
    );
  } finally {
    await running.stop();
    await cluster.stop();
  }
});

test('what is not a whole backup is refused and changes nothing', async () => {
  writeFileSync(`${file}.bad`, 'not a tar');
  writeFileSync(`${file}.cut`, readFileSync(file).subarray(0, 30_000));
  for (const bad of [`${file}.bad`, `${file}.cut`]) {
    await assert.rejects(
      supervised((supervisor) => restoreBackup(folder, bad, supervisor)),
      /is not a whole backup/,
    );
  }
  await whileRunning(async () => assert.equal(await product('select count(*) from inner_part.notes'), '3'));
  assert.ok(existsSync(join(objects, 'lampwright', 'sheets', 'photo')));
});

test('a restore that was killed before the databases were swapped is taken back', async () => {
  await whileRunning(async () => {
    await cluster.sql(`create database ${incoming} owner lampwright`);
    renameSync(objects, `${objects}.previous`);
    mkdirSync(objects);
    writeFileSync(join(objects, 'half'), 'half');
    await settleRestore(folder, cluster);
  });
  assert.deepEqual(readdirSync(objects), ['lampwright']);
  assert.equal(existsSync(`${objects}.previous`), false);
});

test('a restore that was killed after the swap is finished', async () => {
  await whileRunning(async () => {
    await cluster.sql(`drop database if exists ${incoming}`);
    await cluster.sql(`create database ${productDatabase}_previous`);
    mkdirSync(`${objects}.previous`);
    await settleRestore(folder, cluster);
    assert.equal(await cluster.sql("select count(*) from pg_database where datname like 'lampwright%'"), '1');
  });
  assert.deepEqual(readdirSync(objects), ['lampwright']);
  assert.equal(existsSync(`${objects}.previous`), false);
});
