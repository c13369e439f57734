// Time of the night picture's steps in Chromium without a GPU, by both renderers, and how far their pictures differ.
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import { chromium } from '@playwright/test';
import { build } from 'vite';
import { inRoot } from '../lib/paths.mjs';

const SIZES = [60, 200];
const ROUNDS = 60;
const KINDS = ['webgl', 'canvas'];
const STEPS = /** @type {const} */ ([
  ['build', 'first picture'],
  ['drag', 'one fixture dragged'],
  ['group', 'group switched'],
  ['evening', 'evening moved on'],
  ['bare', 'bare picture'],
]);

/** WebGL by software, as there is no graphics card here. */
const CHROMIUM_ARGS = [
  '--no-sandbox',
  '--use-angle=swiftshader',
  '--enable-unsafe-swiftshader',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

const ADDRESS = 'http://night.example';
const TYPES = { '.html': 'text/html', '.js': 'text/javascript', '.css': 'text/css' };

/**
 * @param {(line: string) => void} print
 * @param {{ signal?: AbortSignal }} context
 */
export async function run(print, context) {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-night-bench-'));
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_ARGS });
  try {
    const page = await nightPage(browser, folder);
    print('Milliseconds from the change to the picture: map 720 px, picture 1200 × 800 px.');
    print('bare: a ready picture of that size put on the canvas, or up as a texture, and nothing else.');
    print(`${'renderer  fixtures  step'.padEnd(42)}   median      p95`);
    for (const kind of KINDS)
      for (const fixtures of SIZES) {
        context.signal?.throwIfAborted();
        /** @type {Record<string, number[]>} */
        const times = await page.evaluate(`window.benchNight('${kind}', ${fixtures}, ${ROUNDS})`);
        for (const [name, words] of STEPS) {
          const sorted = (times[name] ?? []).toSorted((a, b) => a - b);
          const at = (/** @type {number} */ share) => sorted[Math.floor((sorted.length - 1) * share)] ?? 0;
          print(
            `${kind.padEnd(8)} ${String(fixtures).padStart(9)}  ${words.padEnd(22)} ${at(0.5).toFixed(1).padStart(8)} ${at(0.95).toFixed(1).padStart(8)}`,
          );
        }
      }
    print('\nThe two pictures, in steps of 255:');
    for (const altitude of [-12, -4, 2]) {
      /** @type {import('../../editor/bench/night').NightDifference} */
      const d = await page.evaluate(`window.compareNight(${altitude})`);
      print(
        `sun at ${altitude}°: mean ${d.mean.toFixed(4)}, over 1: ${((100 * d.over1) / d.values).toFixed(4)} %, over 3: ${((100 * d.over3) / d.values).toFixed(4)} %, most ${d.most}`,
      );
    }
  } finally {
    await browser.close();
    await rm(folder, { recursive: true, force: true });
  }
}

/**
 * A page that has the night bench, built into a folder.
 * @param {import('@playwright/test').Browser} browser
 * @param {string} folder
 */
async function nightPage(browser, folder) {
  await build({
    root: inRoot('editor'),
    configFile: inRoot('editor/vite.config.ts'),
    logLevel: 'error',
    build: {
      outDir: folder,
      emptyOutDir: true,
      rollupOptions: { input: inRoot('editor/bench/night.html') },
    },
  });
  const page = await browser.newPage({ viewport: { width: 1280, height: 900 } });
  await page.route(`${ADDRESS}/**`, async (route) => {
    const path = normalize(new URL(route.request().url()).pathname);
    try {
      const body = await readFile(join(folder, path));
      const contentType =
        TYPES[/** @type {keyof typeof TYPES} */ (extname(path))] ?? 'application/octet-stream';
      await route.fulfill({ body, contentType });
    } catch {
      await route.fulfill({ status: 404 });
    }
  });
  await page.goto(`${ADDRESS}/bench/night.html`);
  await page.waitForFunction("typeof window.compareNight === 'function'");
  return page;
}
