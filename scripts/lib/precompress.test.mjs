import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { test } from 'node:test';
import { brotliDecompressSync, gunzipSync } from 'node:zlib';
import { listFiles } from './files.mjs';
import { precompress } from './precompress.mjs';

test('text files of some size get copies that say the same; others get none', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'lampwright-precompress-'));
  try {
    mkdirSync(join(folder, 'assets'));
    const text = 'const lamp = "Wörter";\n'.repeat(200);
    const files = { 'index.html': text, 'assets/a.js': text, 'assets/b.css': text, 'assets/c.svg': text };
    for (const [name, content] of Object.entries(files)) writeFileSync(join(folder, name), content);
    writeFileSync(join(folder, 'assets/small.js'), 'export {};');
    writeFileSync(join(folder, 'assets/face.woff2'), Buffer.alloc(5000));

    assert.equal(await precompress(folder), 4);
    for (const name of Object.keys(files)) {
      const br = readFileSync(join(folder, `${name}.br`));
      assert.equal(brotliDecompressSync(br).toString(), text);
      const gz = readFileSync(join(folder, `${name}.gz`));
      assert.equal(gunzipSync(gz).toString(), text);
      assert.ok(Math.max(br.length, gz.length) < text.length / 10);
    }
    assert.equal(listFiles([folder]).length, 6 + 4 * 2);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
});
