import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { lockHolder, tryLock, withLock } from './lock.mjs';
import { scratchFolder } from './scratch-folder.mjs';

const folder = scratchFolder('lock');
after(() => rmSync(folder, { recursive: true, force: true }));

test('a held lock names its holder and is free again afterwards', () => {
  const file = join(folder, 'held');
  const lock = tryLock(file, 'testing');
  assert.ok('release' in lock);
  assert.equal(lockHolder(file)?.purpose, 'testing');
  const second = tryLock(file, 'again');
  assert.ok('holder' in second);
  assert.equal(second.holder.pid, process.pid);
  lock.release();
  assert.equal(lockHolder(file), null);
  const third = tryLock(file, 'again');
  assert.ok('release' in third);
  third.release();
});

test('the lock of a killed process is free', async () => {
  const file = join(folder, 'killed');
  const code = `import { tryLock } from '${new URL('./lock.mjs', import.meta.url)}';
    tryLock('${file}', 'dying'); console.log('locked'); setInterval(() => {}, 1000);`;
  const child = spawn(process.execPath, ['--input-type=module', '-e', code]);
  await once(child.stdout, 'data');
  assert.ok('holder' in tryLock(file, 'testing'));
  child.kill('SIGKILL');
  await once(child, 'exit');
  const lock = tryLock(file, 'testing');
  assert.ok('release' in lock);
  lock.release();
});

test('a process that was given the pid of a dead holder does not hold its lock', () => {
  const file = join(folder, 'reused');
  writeFileSync(file, JSON.stringify({ pid: process.pid, birth: '1', purpose: 'long ago' }));
  assert.equal(lockHolder(file), null);
  assert.ok('release' in tryLock(file, 'testing'));
});

test('bodies under one lock never overlap', async () => {
  const file = join(folder, 'queue');
  let inside = 0;
  let most = 0;
  const body = async () => {
    inside += 1;
    most = Math.max(most, inside);
    await new Promise((done) => setTimeout(done, 5));
    inside -= 1;
  };
  await Promise.all([1, 2, 3, 4].map(() => withLock(file, 'queueing', body)));
  assert.equal(most, 1);
});
