import { mkdir, readdir, readFile, rename, writeFile } from 'node:fs/promises';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';
import { transformFile } from '@swc/core';

const api = fileURLToPath(new URL('../../', import.meta.url));

/**
 * Builds the decoding child the way the product is built, so that specs run what will run, in its own
 * process, and never a stale build of it.
 */
export async function buildDecodingChild(): Promise<void> {
  const folder = join(api, 'src/media/child');
  const sources = (await readdir(folder)).filter((name) => !/\.(spec|testkit)\.ts$/.test(name));
  for (const source of [...sources.map((name) => join(folder, name)), join(api, 'src/media/limits.ts')]) {
    const { code } = await transformFile(source, { configFile: join(api, '.swcrc'), sourceMaps: false });
    const target = join(api, 'dist', relative(join(api, 'src'), source)).replace(/\.ts$/, '.js');
    if ((await readFile(target, 'utf8').catch(() => null)) === code) continue;
    await mkdir(dirname(target), { recursive: true });
    await writeFile(`${target}.${process.pid}`, code);
    await rename(`${target}.${process.pid}`, target);
  }
}
