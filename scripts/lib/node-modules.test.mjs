import assert from 'node:assert/strict';
import { test } from 'node:test';
import { isInstalled } from './node-modules.mjs';

const wanted = {
  '': {},
  geometry: { version: '0.1.0' },
  'node_modules/@lampwright/geometry': { link: true },
  'node_modules/zod': { version: '4.6.7' },
  'editor/node_modules/plugin': { version: '1.0.0' },
  'node_modules/for-another-platform': { version: '1.0.0', optional: true },
};
const installed = {
  'node_modules/@lampwright/geometry': { link: true },
  'node_modules/zod': { version: '4.6.7' },
  'editor/node_modules/plugin': { version: '1.0.0' },
};

test('an install without the other platforms’ packages is complete', () => {
  assert.equal(isInstalled(wanted, installed), true);
});

test('another version asks for a new install', () => {
  assert.equal(isInstalled(wanted, { ...installed, 'node_modules/zod': { version: '4.6.6' } }), false);
});

test('a missing package asks for a new install, in a workspace too', () => {
  const { 'editor/node_modules/plugin': _, ...rest } = installed;
  assert.equal(isInstalled(wanted, rest), false);
});

test('a workspace installed as a copy asks for a new install', () => {
  const copied = { ...installed, 'node_modules/@lampwright/geometry': { link: false } };
  assert.equal(isInstalled(wanted, copied), false);
});
