// The homeowner's page on a phone with a slow connection: how much script it takes, and when its largest
// part is painted.
import { readFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { extname } from 'node:path';
import { gzipSync } from 'node:zlib';
import { chromium } from '@playwright/test';
import sharp from 'sharp';
import { createServer as createVite } from 'vite';
import { inRoot } from '../lib/paths.mjs';

const ROUNDS = 5;
const AIM_SCRIPT_BYTES = 150_000;
const AIM_PAINT_MS = 2500;

/** A slow fourth-generation network, and a phone a quarter as fast as this machine. */
const NETWORK = { offline: false, latency: 150, downloadThroughput: 1.6e6 / 8, uploadThroughput: 0.75e6 / 8 };
const CPU_SLOWDOWN = 4;
const PHONE = {
  viewport: { width: 390, height: 844 },
  deviceScaleFactor: 3,
  isMobile: true,
  hasTouch: true,
  locale: 'en-US',
};

const CHROMIUM_ARGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

const TYPES = {
  '.js': 'text/javascript',
  '.css': 'text/css',
  '.svg': 'image/svg+xml',
  '.woff2': 'font/woff2',
};

/** @typedef {{ paintMs: number, painted: string, shift: number }} Seen */

/**
 * The built page with a made-up proposal; its picture as the worker makes it of the demo's yard photo.
 * @param {(line: string) => void} print
 * @param {{ signal?: AbortSignal }} context
 */
export async function run(print, context) {
  const shell = await readFile(inRoot('editor/dist/home.html'), 'utf8');
  const scripts = [...shell.matchAll(/(?:src|href)="(\/assets\/[^"]+\.js)"/g)].map(([, path]) => path ?? '');
  const sizes = await Promise.all(scripts.map(async (path) => gzipSync(await asset(path)).length));
  const bytes = sizes.reduce((sum, size) => sum + size, 0);
  print(
    `Script of the first view: ${kilo(bytes)} compressed, in ${scripts.length} files (aim ${kilo(AIM_SCRIPT_BYTES)}).`,
  );

  const proposal = await madeUp();
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_ARGS });
  try {
    print(
      `Largest paint over 1.6 Mbit/s, 150 ms, ${CPU_SLOWDOWN} × slower; median of ${ROUNDS} (aim ${AIM_PAINT_MS} ms):`,
    );
    for (const compressed of [true, false]) {
      const server = await serve({ shell, ...proposal, compressed });
      try {
        /** @type {Seen[]} */
        const seen = [];
        for (let round = 0; round < ROUNDS; round += 1) {
          context.signal?.throwIfAborted();
          seen.push(await look(browser, `${server.url}/p/made-up`));
        }
        seen.sort((a, b) => a.paintMs - b.paintMs);
        const middle = seen[Math.floor(ROUNDS / 2)];
        const how = compressed ? 'behind a proxy that compresses' : 'straight from the server';
        if (middle)
          print(
            `  ${how.padEnd(32)}${middle.paintMs.toFixed(0).padStart(6)} ms  ${middle.painted}; layout shift ${middle.shift.toFixed(3)}`,
          );
      } finally {
        server.close();
      }
    }
  } finally {
    await browser.close();
  }
}

const kilo = (/** @type {number} */ bytes) => `${(bytes / 1000).toFixed(1)} kB`;

const asset = (/** @type {string} */ path) => readFile(inRoot('editor/dist', path.slice(1)));

/** The proposal that the page's own tests use. */
async function madeUp() {
  const vite = await createVite({
    configFile: false,
    root: inRoot('editor'),
    logLevel: 'error',
    server: { middlewareMode: true, hmr: false, watch: null },
    appType: 'custom',
    optimizeDeps: { noDiscovery: true },
  });
  try {
    const { samplePage, sampleLinkId } = await vite.ssrLoadModule('/src/home/home.testkit.ts');
    const picture = await sharp(inRoot('api/src/demo/files/yard-photo.jpg'))
      .resize({ width: 1600, height: 1600, fit: 'inside' })
      .jpeg({ quality: 70, progressive: true, mozjpeg: true })
      .toBuffer();
    return { page: JSON.stringify(samplePage()), linkId: String(sampleLinkId), picture };
  } finally {
    await vite.close();
  }
}

/**
 * @param {{ shell: string, page: string, linkId: string, picture: Buffer, compressed: boolean }} options
 * @returns {Promise<{ url: string, close: () => void }>}
 */
async function serve({ shell, page, linkId, picture, compressed }) {
  const hints = `<meta name="lampwright-link" content="${linkId}"><link rel="preload" as="image" href="/api/share/${linkId}/pictures/photo" fetchpriority="high">`;
  const html = shell.replace('</head>', () => `${hints}</head>`);
  const server = createServer(async (request, response) => {
    const path = new URL(request.url ?? '/', 'http://localhost').pathname;
    /** @param {string} type @param {Buffer | string} body */
    const send = (type, body) => {
      const shrinks = compressed && !/^(image\/jpeg|font)/.test(type);
      const sent = shrinks ? gzipSync(body) : Buffer.from(body);
      response.writeHead(200, {
        'Content-Type': type,
        'Content-Length': sent.length,
        ...(shrinks && { 'Content-Encoding': 'gzip' }),
      });
      response.end(sent);
    };
    if (path.startsWith('/p/')) send('text/html; charset=utf-8', html);
    else if (path.includes('/pictures/')) send('image/jpeg', picture);
    else if (path.startsWith('/api/share/')) send('application/json', page);
    else if (path.startsWith('/assets/')) {
      const type = TYPES[/** @type {keyof typeof TYPES} */ (extname(path))];
      const body = await asset(path).catch(() => null);
      if (body && type) send(type, body);
      else response.writeHead(404).end();
    } else response.writeHead(404).end();
  });
  await new Promise((resolve) => server.listen(0, '127.0.0.1', () => resolve(undefined)));
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('The page has no port.');
  return {
    url: `http://127.0.0.1:${address.port}`,
    close: () => {
      server.closeAllConnections();
      server.close();
    },
  };
}

/** Run in the page, before its own script. */
const WATCH = `
  window.seen = { paintMs: 0, painted: '', shift: 0 };
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) {
      window.seen.paintMs = entry.startTime;
      window.seen.painted = entry.element ? entry.element.tagName.toLowerCase() : '';
    }
  }).observe({ type: 'largest-contentful-paint', buffered: true });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) window.seen.shift += entry.value;
  }).observe({ type: 'layout-shift', buffered: true });
`;

/**
 * One visit, with nothing kept from an earlier one.
 * @param {import('@playwright/test').Browser} browser
 * @param {string} url
 * @returns {Promise<Seen>}
 */
async function look(browser, url) {
  const context = await browser.newContext(PHONE);
  try {
    const page = await context.newPage();
    const session = await context.newCDPSession(page);
    await session.send('Network.enable');
    await session.send('Network.emulateNetworkConditions', NETWORK);
    await session.send('Emulation.setCPUThrottlingRate', { rate: CPU_SLOWDOWN });
    await page.addInitScript(WATCH);
    await page.goto(url, { waitUntil: 'networkidle' });
    await page.getByRole('button', { name: 'Review and approve' }).waitFor();
    // What is painted last is told a little later.
    await page.waitForTimeout(500);
    return await page.evaluate('window.seen');
  } finally {
    await context.close();
  }
}
