import assert from 'node:assert/strict';
import { test } from 'node:test';
import { pathToFileURL } from 'node:url';
import { inRoot } from './paths.mjs';
import { run } from './processes.mjs';

/** Runs statements in a process of their own, with what log and processes export. @param {string} body */
const told = (body) => {
  const from = (/** @type {string} */ name) => pathToFileURL(inRoot('scripts/lib', name)).href;
  const imports = `
    import { setTimeout as sleep } from 'node:timers/promises';
    import { afterOthers, say, warn } from '${from('log.mjs')}';
    import { run } from '${from('processes.mjs')}';
    const child = (code) => run(process.execPath, ['-e', code], { output: 'show' });
  `;
  return run(process.execPath, ['--input-type=module', '-e', `${imports}\n${body}`]);
};

test('what runs beside others is told after them in one piece, its children’s words in their places', async () => {
  const { stdout, stderr, code } = await told(`
    const others = (async () => {
      say('first 1');
      await sleep(300);
      await child('console.log("first 2")');
    })();
    await afterOthers(others, async () => {
      say('second 1');
      await child('console.log("second 2"); console.error("second 3")');
      say('second 4');
    });
    say('end');
  `);
  assert.equal(code, 0);
  assert.equal(stdout, 'first 1\nfirst 2\nsecond 1\nsecond 2\nsecond 4\nend\n');
  assert.equal(stderr, 'second 3\n');
});

test('once the others are done it is told as it comes', async () => {
  const { stdout } = await told(`
    const others = sleep(50).then(() => say('first'));
    let goOn;
    const told = new Promise((done) => { goOn = done; });
    const own = afterOthers(others, async () => {
      say('second 1');
      await told;
      await child('console.log("second 2")');
    });
    await others;
    await sleep(50);
    say('elsewhere');
    goOn();
    await own;
  `);
  assert.equal(stdout, 'first\nsecond 1\nelsewhere\nsecond 2\n');
});

test('it is told even when the others break, and breaks by itself', async () => {
  const { stdout, stderr, code } = await told(`
    const others = sleep(50).then(() => { throw new Error('theirs'); });
    const own = afterOthers(others, async () => {
      say('kept');
      throw new Error('ours');
    });
    const ends = await Promise.allSettled([others, own]);
    warn(ends.map(({ reason }) => reason.message).join());
  `);
  assert.equal(code, 0);
  assert.equal(stdout, 'kept\n');
  assert.equal(stderr, 'theirs,ours\n');
});
