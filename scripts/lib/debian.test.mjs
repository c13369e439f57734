import assert from 'node:assert/strict';
import { test } from 'node:test';
import { cannotInstall, ensurePackages, missingPackages } from './debian.mjs';

test('who may not install is told in one sentence what to run', () => {
  assert.equal(
    cannotInstall(['postgresql', 'poppler-utils']).message,
    'Lampwright needs postgresql poppler-utils for the database and reading PDF plans: run "apt-get install postgresql poppler-utils" as root, then try again.',
  );
});

test('nothing is installed when all is there', async () => {
  // The test command has seen to all of them before any test runs.
  const all = /** @type {const} */ (['postgresql', 'poppler-utils', 'chromium', 'ngspice']);
  assert.deepEqual(missingPackages(all), []);
  await ensurePackages(all);
});
