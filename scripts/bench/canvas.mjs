// Frame time of the plan page's drawing beside a bare 2D canvas that draws all of the same anew each frame.
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { extname, join, normalize } from 'node:path';
import { chromium } from '@playwright/test';
import { build } from 'vite';
import { inRoot } from '../lib/paths.mjs';

const SIZES = [100, 500, 2000];

/** Without a frame limit the time from frame to frame is the time that a frame takes. */
const CHROMIUM_ARGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-frame-rate-limit',
  '--disable-gpu-vsync',
];

const TYPES = { '.html': 'text/html', '.js': 'text/javascript', '.css': 'text/css' };

/**
 * @param {(line: string) => void} print
 * @param {{ signal?: AbortSignal }} context
 */
export async function run(print, context) {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-canvas-bench-'));
  /** @type {import('node:http').Server | undefined} */
  let server;
  /** @type {import('@playwright/test').Browser | undefined} */
  let browser;
  try {
    await build({
      root: inRoot('editor'),
      configFile: inRoot('editor/vite.config.ts'),
      logLevel: 'error',
      build: {
        outDir: folder,
        emptyOutDir: true,
        rollupOptions: { input: inRoot('editor/bench/canvas.html') },
      },
    });
    server = await serve(folder);
    const address = server.address();
    if (address === null || typeof address === 'string') throw new Error('The bench page has no port.');
    browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_ARGS });
    const page = await browser.newPage({ viewport: { width: 1200, height: 700 } });
    await page.goto(`http://127.0.0.1:${address.port}/bench/canvas.html`);
    await page.waitForFunction("typeof window.benchCanvas === 'function'");
    print('Milliseconds a frame; bare: one 2D canvas on which everything is drawn anew each frame.');
    print('fixtures     bare      pan  × bare   drag 50  × bare');
    for (const fixtures of SIZES) {
      context.signal?.throwIfAborted();
      /** @type {{ pan: number, drag: number, bare: number }} */
      const t = await page.evaluate(`window.benchCanvas(${fixtures})`);
      const ratio = (/** @type {number} */ ms) => (ms / t.bare).toFixed(2);
      print(
        `${String(fixtures).padStart(8)} ${t.bare.toFixed(2).padStart(8)} ${t.pan.toFixed(2).padStart(8)} ${ratio(t.pan).padStart(7)} ${t.drag.toFixed(2).padStart(9)} ${ratio(t.drag).padStart(7)}`,
      );
    }
  } finally {
    await browser?.close();
    server?.close();
    await rm(folder, { recursive: true, force: true });
  }
}

/** @param {string} folder */
async function serve(folder) {
  const server = createServer(async (request, response) => {
    const path = normalize(new URL(request.url ?? '/', 'http://localhost').pathname);
    try {
      const body = await readFile(join(folder, path));
      const type = TYPES[/** @type {keyof typeof TYPES} */ (extname(path))] ?? 'application/octet-stream';
      response.writeHead(200, { 'Content-Type': type }).end(body);
    } catch {
      response.writeHead(404).end();
    }
  });
  await new Promise((resolve) => server.listen(0, '127.0.0.1', () => resolve(undefined)));
  return server;
}
