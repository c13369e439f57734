import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import { chromium } from '@playwright/test';
import { build } from 'vite';
import { inRoot } from '../lib/paths.mjs';

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
 * Builds the page of the night bench, opens it in a browser of its own, and tidies up after `use`.
 * @template T
 * @param {(page: import('@playwright/test').Page) => Promise<T>} use
 * @returns {Promise<T>}
 */
export async function onNightPage(use) {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-night-'));
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_ARGS });
  try {
    return await use(await nightPage(browser, folder));
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
