import assert from 'node:assert/strict';
import { rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { scratchFolder } from './scratch-folder.mjs';
import { nodeTestCounts, playwrightCounts, sum, verdict, vitestCounts } from './test-counts.mjs';

const folder = scratchFolder('counts');
after(() => rmSync(folder, { recursive: true, force: true }));

/** @param {string} name @param {unknown} content */
function report(name, content) {
  const file = join(folder, name);
  writeFileSync(file, typeof content === 'string' ? content : JSON.stringify(content));
  return file;
}

/** @param {string[]} statuses */
const assertions = (...statuses) => statuses.map((status) => ({ status }));

test('vitest: tests are counted, a file that does not load is one failure', () => {
  const file = report('vitest.json', {
    testResults: [
      { status: 'passed', assertionResults: assertions('passed', 'passed', 'pending') },
      { status: 'failed', assertionResults: assertions('passed', 'failed') },
      { status: 'failed', assertionResults: [] },
    ],
  });
  assert.deepEqual(vitestCounts(file, 1), { passed: 3, failed: 2, skipped: 1 });
});

test('vitest: an error outside the tests fails a run whose tests all passed', () => {
  const file = report('outside.json', {
    testResults: [{ status: 'passed', assertionResults: assertions('passed') }],
  });
  assert.deepEqual(vitestCounts(file, 1), { passed: 1, failed: 1, skipped: 0 });
  assert.deepEqual(vitestCounts(file, 0), { passed: 1, failed: 0, skipped: 0 });
});

test('a runner without a report, or without tests, has failed', () => {
  const missing = join(folder, 'missing');
  for (const count of [vitestCounts, playwrightCounts, nodeTestCounts]) {
    assert.equal(count(missing, 0).failed, 1);
  }
  assert.equal(vitestCounts(report('none.json', { testResults: [] }), 0).failed, 1);
});

test('playwright: a flaky test is a failure', () => {
  const file = report('playwright.json', { stats: { expected: 5, unexpected: 1, flaky: 2, skipped: 3 } });
  assert.deepEqual(playwrightCounts(file, 1), { passed: 5, failed: 3, skipped: 3 });
});

test('node: the totals of the TAP report count', () => {
  const tap = '# tests 9\n# suites 2\n# pass 4\n# fail 2\n# cancelled 1\n# skipped 1\n# todo 1\n';
  assert.deepEqual(nodeTestCounts(report('node.tap', tap), 1), { passed: 4, failed: 3, skipped: 2 });
});

test('the verdict adds up, and nothing run is no success', () => {
  const all = sum([
    { passed: 3, failed: 0, skipped: 1 },
    { passed: 2, failed: 1, skipped: 0 },
  ]);
  assert.deepEqual(verdict(all), { line: '5 passed, 1 failed', code: 1 });
  assert.deepEqual(verdict({ ...all, failed: 0 }), { line: '5 passed, 0 failed', code: 0 });
  assert.equal(verdict({ passed: 0, failed: 0, skipped: 4 }).code, 1);
});
