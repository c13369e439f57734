import assert from 'node:assert/strict';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { setTimeout as sleep } from 'node:timers/promises';
import { pathToFileURL } from 'node:url';
import { inRoot } from './paths.mjs';
import { run } from './processes.mjs';
import { scratchFolder } from './scratch-folder.mjs';
import { Supervisor } from './supervisor.mjs';

const folder = scratchFolder('supervisor');
after(() => rmSync(folder, { recursive: true, force: true }));
const order = join(folder, 'order');

/** A service that notes when it was started and stopped. @param {string} name */
function service(name) {
  const script = join(folder, `${name}.mjs`);
  writeFileSync(
    script,
    `import { appendFileSync } from 'node:fs';
     const note = (text) => appendFileSync(${JSON.stringify(order)}, text + ' ${name}\\n');
     process.on('SIGTERM', () => { note('stop'); process.exit(0); });
     setInterval(() => {}, 1000);
     note('start');`,
  );
  return { name, args: [script], env: process.env };
}

/** @param {() => boolean} condition */
async function until(condition) {
  while (!condition()) await sleep(10);
}

const notes = () => (existsSync(order) ? readFileSync(order, 'utf8').trim().split('\n') : []);

test('services are stopped in the reverse order of their start, or as told, one after the other', async () => {
  const supervisor = new Supervisor();
  for (const [n, name] of ['ground', 'fakes', 'api', 'worker'].entries()) {
    supervisor.start({ ...service(name), stopAfter: name === 'worker' ? 'api' : undefined });
    await until(() => notes().length === n + 1);
  }
  await supervisor.stop();
  assert.deepEqual(notes().slice(4), ['stop api', 'stop worker', 'stop fakes', 'stop ground']);
});

test('a service that ends by itself is named, with its last words', async () => {
  const supervisor = new Supervisor();
  const script = join(folder, 'dies.mjs');
  writeFileSync(script, "console.error('out of yard'); process.exit(3);");
  const logFile = join(folder, 'dies.log');
  supervisor.start({ name: 'The gardener', args: [script], env: process.env, logFile });
  await assert.rejects(supervisor.failed, (/** @type {Error} */ error) => {
    assert.match(error.message, /^The gardener ended unexpectedly \(exit code 3\)\.\nout of yard\n/);
    return true;
  });
  await supervisor.stop();
});

test('stopping goes on past a failure', async () => {
  const supervisor = new Supervisor();
  let reached = false;
  supervisor.onStop('the first', async () => {
    reached = true;
  });
  supervisor.onStop('the second', () => Promise.reject(new Error('stuck')));
  await supervisor.stop();
  assert.equal(reached, true);
});

test('services stop by themselves when their starter was killed', async () => {
  rmSync(order, { force: true });
  const { args } = service('orphan');
  const starter = `import { Supervisor } from '${pathToFileURL(inRoot('scripts/lib/supervisor.mjs'))}';
    import { existsSync } from 'node:fs';
    new Supervisor().start({ name: 'orphan', args: ${JSON.stringify(args)}, env: process.env });
    setInterval(() => { if (existsSync(${JSON.stringify(order)})) process.kill(process.pid, 'SIGKILL'); }, 20);`;
  const { code } = await run(process.execPath, ['--input-type=module', '-e', starter], { output: 'ignore' });
  assert.equal(code, 128);
  await until(() => notes().length === 2);
  assert.deepEqual(notes(), ['start orphan', 'stop orphan']);
});

test('a service that comes up when its starter is dead already stops too', async () => {
  const { args } = service('late');
  const starter = `import { Supervisor } from '${pathToFileURL(inRoot('scripts/lib/supervisor.mjs'))}';
    import { writeSync } from 'node:fs';
    const { pid } = new Supervisor().start({ name: 'late', args: ${JSON.stringify(args)}, env: process.env, logFile: '/dev/null' });
    writeSync(1, String(pid));
    process.kill(process.pid, 'SIGKILL');`;
  const { stdout } = await run(process.execPath, ['--input-type=module', '-e', starter]);
  const pid = Number(stdout);
  assert.ok(pid > 0);
  // An ended process that nobody has asked after yet has no command line any more.
  const command = () =>
    existsSync(`/proc/${pid}/cmdline`) ? readFileSync(`/proc/${pid}/cmdline`, 'utf8') : '';
  await until(() => !command().includes('late.mjs'));
});
