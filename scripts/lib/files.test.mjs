import assert from 'node:assert/strict';
import { mkdirSync, renameSync, rmSync, utimesSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { after, test } from 'node:test';
import { hashFiles, listFiles } from './files.mjs';
import { scratchFolder } from './scratch-folder.mjs';

const folder = scratchFolder('files');
after(() => rmSync(folder, { recursive: true, force: true }));
mkdirSync(join(folder, 'src', 'deep'), { recursive: true });
mkdirSync(join(folder, 'dist'));
for (const name of ['src/b.ts', 'src/deep/a.ts', 'src/deep/a.spec.ts', 'dist/b.js']) {
  writeFileSync(join(folder, name), name);
}

const hash = () => hashFiles(folder, listFiles([folder]));

test('files are listed in order, without what is not kept and without missing paths', () => {
  const keep = (/** @type {string} */ path) => !/\.spec\.ts$|\/dist$/.test(path);
  assert.deepEqual(
    listFiles([folder, join(folder, 'missing')], keep),
    ['src/b.ts', 'src/deep/a.ts'].map((name) => join(folder, name)),
  );
});

test('the hash follows contents and names, not times', () => {
  const before = hash();
  utimesSync(join(folder, 'src/b.ts'), 1, 1);
  assert.equal(hash(), before);
  renameSync(join(folder, 'src/b.ts'), join(folder, 'src/c.ts'));
  const renamed = hash();
  assert.notEqual(renamed, before);
  writeFileSync(join(folder, 'src/c.ts'), 'other');
  assert.notEqual(hash(), renamed);
});
