import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
import { existsSync, readFileSync, rmSync, statSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { claimDataFolder } from './lib/data-folder.mjs';
import { inRoot } from './lib/paths.mjs';
import { freePort, isPortFree } from './lib/ports.mjs';
import { openCluster } from './lib/postgres.mjs';
import { run } from './lib/processes.mjs';
import { scratchFolder } from './lib/scratch-folder.mjs';
import { Supervisor } from './lib/supervisor.mjs';

const folder = scratchFolder('start');
after(async () => {
  if (existsSync(join(folder, 'state.json'))) await (await openCluster(folder)).destroy();
  rmSync(folder, { recursive: true, force: true });
});

/** @param {NodeJS.ProcessEnv} more */
const environment = (more) => ({ ...process.env, LAMPWRIGHT_MODE: '', LAMPWRIGHT_DATA: folder, ...more });

/** Runs npm start to its end. @param {NodeJS.ProcessEnv} more */
const start = (more) =>
  run(process.execPath, [inRoot('scripts/start.mjs')], { cwd: '/', env: environment(more) });

/** @param {string} text */
const isOneSentence = (text) => assert.match(text, /^[^\n]+\.\n$/);

test('a taken port is told in one sentence', async () => {
  const port = await freePort();
  const squatter = createServer().listen(port, '127.0.0.1');
  try {
    const { code, stderr } = await start({ PORT: String(port) });
    assert.equal(code, 1);
    isOneSentence(stderr);
    assert.match(stderr, new RegExp(`Port ${port} is taken`));
  } finally {
    squatter.close();
  }
});

test('a wrong port, and production mode, are told in one sentence', async () => {
  for (const [more, said] of /** @type {const} */ ([
    [{ PORT: '70000' }, /PORT must be/],
    [{ LAMPWRIGHT_MODE: 'production' }, /node api\/dist\/main\.js/],
  ])) {
    const { code, stderr } = await start(more);
    assert.equal(code, 1);
    isOneSentence(stderr);
    assert.match(stderr, said);
  }
});

test('a second start over the same data folder is told in one sentence', async () => {
  const supervisor = new Supervisor();
  claimDataFolder(folder, supervisor, 'npm start');
  try {
    const { code, stderr } = await start({ PORT: String(await freePort()) });
    assert.equal(code, 1);
    isOneSentence(stderr);
    assert.match(stderr, /is in use \(npm start, process \d+\)/);
  } finally {
    await supervisor.stop();
  }
});

/**
 * Starts the product, waits until it says that it is ready, looks at it, and ends it or waits for its end.
 * @param {(product: { url: string, pid: number }) => Promise<NodeJS.Signals | null>} look gives the signal to end it
 * with, or null when it is to end by itself
 * @param {readonly [string, ...string[]]} command
 */
async function startAndEnd(look, [program, ...args] = [process.execPath, inRoot('scripts/start.mjs')]) {
  const port = await freePort();
  const startedAt = performance.now();
  const child = spawn(program, args, {
    cwd: '/',
    env: environment({ PORT: String(port) }),
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  let said = '';
  child.stderr.setEncoding('utf8').on('data', (text) => {
    said += text;
  });
  const ended = new Promise((done) => child.once('close', done));
  const ready = new Promise((done) => {
    child.stdout.setEncoding('utf8').on('data', (text) => {
      output += text;
      if (/^Lampwright is ready at .*\n/m.test(output)) done(performance.now() - startedAt);
    });
  });
  const early = ended.then((code) => assert.fail(`npm start ended with ${code}:\n${output}${said}`));
  /** @type {number} */
  const readyMs = await Promise.race([ready, early]);
  early.catch(() => {});
  const url = `http://127.0.0.1:${port}`;
  /** @type {NodeJS.Signals | null} */
  let signal = 'SIGKILL';
  try {
    assert.ok(output.endsWith(`Lampwright is ready at ${url}\n`), output);
    signal = await look({ url, pid: child.pid ?? 0 });
  } finally {
    if (signal) child.kill(signal);
  }
  // Closed only when the last process that holds its output has ended.
  const code = await ended;
  if (signal === 'SIGKILL') return { code, readyMs, said };
  const { ports } = JSON.parse(readFileSync(join(folder, 'state.json'), 'utf8'));
  for (const free of [port, ...Object.values(ports)])
    assert.equal(await isPortFree(free), true, `port ${free}`);
  assert.equal((await openCluster(folder)).pid, null);
  return { code, readyMs, said };
}

test('a first start serves the product with the demo, and Ctrl-C stops all of it', async () => {
  const { code } = await startAndEnd(async ({ url }) => {
    const health = await fetch(`${url}/api/health`);
    assert.deepEqual(await health.json(), { status: 'ok', database: 'ok', storage: 'ok', queue: 'ok' });
    const page = await fetch(url);
    assert.match(page.headers.get('content-type') ?? '', /^text\/html/);
    assert.match(await page.text(), /<script type="module"/);
    return 'SIGINT';
  });
  assert.equal(code, 0);
  assert.equal(statSync(join(folder, 'state.json')).mode & 0o777, 0o600);
  assert.equal(JSON.parse(readFileSync(join(folder, 'state.json'), 'utf8')).demoLoaded, true);
});

test('after a kill -9 the next start takes over, in under ten seconds, and SIGTERM to npm stops all', async () => {
  await startAndEnd(async () => 'SIGKILL');
  const { readyMs } = await startAndEnd(async () => {
    const cluster = await openCluster(folder);
    assert.equal(await cluster.sql('select count(*) from companies', 'lampwright'), '1');
    return 'SIGTERM';
  }, ['npm', '--silent', '--prefix', inRoot(), 'start']);
  assert.ok(readyMs < 10_000, `it took ${Math.round(readyMs)} ms`);
});

test('when a part dies the rest stops, and its name is told', async () => {
  const { code, said } = await startAndEnd(async ({ pid }) => {
    const children = readFileSync(`/proc/${pid}/task/${pid}/children`, 'utf8').trim().split(' ');
    const worker = children.find((child) =>
      readFileSync(`/proc/${child}/cmdline`, 'utf8').includes('worker.js'),
    );
    process.kill(Number(worker), 'SIGKILL');
    return null;
  });
  assert.equal(code, 1);
  assert.match(said, /^The worker ended unexpectedly/);
});
