// The homeowner's page on a phone with a slow connection: how much script it takes, when its largest part is
// painted, and when its evening is drawn.
import { randomUUID } from 'node:crypto';
import { cpus, loadavg } from 'node:os';
import { setTimeout as sleep } from 'node:timers/promises';
import { chromium } from '@playwright/test';

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

const JOB = 'Harrow Bank';
const DESIGNER = { email: 'designer@fernhollow.example', password: 'fernhollow-demo' };

/**
 * @typedef {{ paintMs: number, painted: string, shift: number, eveningMs: number, bytes: Record<string, number>, pictures: string[] }} Seen
 */

/**
 * The page of a proposal of the demo company, by its link, from the product's own server.
 * @param {(line: string) => void} print
 * @param {{ baseUrl: () => Promise<string>, signal?: AbortSignal }} context
 */
export async function run(print, context) {
  const link = await sentProposal(await context.baseUrl(), context.signal);
  const { first, later } = await gzippedScripts(link);
  const size = sum(first) + sum(later);
  print(
    `Script, gzipped: ${kilo(sum(first))} in ${first.length} files for the first view, then ${kilo(sum(later))} in ${later.length} for the evening; together ${kilo(size)} (aim ${kilo(AIM_SCRIPT_BYTES)}).`,
  );
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: CHROMIUM_ARGS });
  try {
    /** @type {Seen[]} */
    const seen = [];
    for (let round = 0; round < ROUNDS; round += 1) {
      context.signal?.throwIfAborted();
      seen.push(await look(browser, link));
    }
    seen.sort((a, b) => a.paintMs - b.paintMs);
    const middle = seen[Math.floor(ROUNDS / 2)];
    if (!middle) return;
    const all = seen.map(({ paintMs }) => paintMs.toFixed(0)).join(', ');
    print(
      `Largest paint over 1.6 Mbit/s, 150 ms, ${CPU_SLOWDOWN} × slower: median ${middle.paintMs.toFixed(0)} ms of ${all} (aim ${AIM_PAINT_MS} ms); ${middle.painted}; layout shift ${middle.shift.toFixed(3)}.`,
    );
    const evenings = seen.map(({ eveningMs }) => eveningMs).sort((a, b) => a - b);
    print(
      `The evening is drawn at a median of ${evenings[Math.floor(ROUNDS / 2)]?.toFixed(0)} ms of ${evenings.map((ms) => ms.toFixed(0)).join(', ')}, the same way.`,
    );
    const sent = Object.entries(middle.bytes).map(([type, bytes]) => `${type.toLowerCase()} ${kilo(bytes)}`);
    print(`Sent to it: ${sent.join(', ')}; pictures: ${middle.pictures.join(', ')}.`);
    const load = loadavg()[0] ?? 0;
    print(`Processes that ran or waited for one of ${cpus().length} cores at the end: ${load.toFixed(1)}.`);
  } finally {
    await browser.close();
  }
}

const kilo = (/** @type {number} */ bytes) => `${(bytes / 1000).toFixed(1)} kB`;

const sum = (/** @type {number[]} */ parts) => parts.reduce((all, part) => all + part, 0);

/** Names of scripts in scripts and in the page, as the build writes them. */
const SCRIPT = /["'`](?:\.?\/)?((?:assets\/)?[\w.-]+\.js)["'`]/g;

/**
 * What a browser that knows no newer encoding is sent, file by file: what the page names itself, and what those
 * files ask for later.
 * @param {string} link
 */
async function gzippedScripts(link) {
  /** @type {Map<string, number>} */
  const sizes = new Map();
  /** @param {string} text @returns {Promise<number[]>} */
  const follow = async (text) => {
    const found = [...text.matchAll(SCRIPT)].map(([, name = '']) => `/assets/${name.replace('assets/', '')}`);
    const fresh = [...new Set(found)].filter((path) => !sizes.has(path));
    const headers = { 'Accept-Encoding': 'gzip' };
    for (const path of fresh) {
      const response = await fetch(new URL(path, link), { method: 'HEAD', headers });
      sizes.set(path, Number(response.headers.get('content-length')));
    }
    const texts = await Promise.all(fresh.map(async (path) => (await fetch(new URL(path, link))).text()));
    scripts.push(...texts);
    return fresh.map((path) => sizes.get(path) ?? 0);
  };
  /** @type {string[]} */
  const scripts = [];
  const first = await follow(await (await fetch(link)).text());
  const later = [];
  for (let text = scripts.shift(); text !== undefined; text = scripts.shift())
    later.push(...(await follow(text)));
  return { first, later };
}

/**
 * Makes and sends a proposal of a job of the demo company, as its designer would.
 * @param {string} baseUrl
 * @param {AbortSignal} [signal]
 * @returns {Promise<string>} the link in its mail
 */
async function sentProposal(baseUrl, signal) {
  let cookie = '';
  /** @param {string} path @param {unknown} [body] @returns {Promise<any>} */
  const ask = async (path, body) => {
    const response = await fetch(`${baseUrl}${path}`, {
      method: body === undefined ? 'GET' : 'POST',
      headers: { cookie, 'Content-Type': 'application/json', 'Idempotency-Key': randomUUID() },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const text = await response.text();
    if (!response.ok) throw new Error(`${path} answered ${response.status}: ${text}`);
    const cookies = response.headers.getSetCookie().map((line) => line.split(';')[0]);
    if (cookies.length > 0) cookie = cookies.join('; ');
    return text === '' ? null : JSON.parse(text);
  };
  await ask('/api/auth/sign-in', DESIGNER);
  const { items } = await ask(`/api/jobs?search=${encodeURIComponent(JOB)}`);
  const job = `/api/jobs/${items[0].id}`;
  for (const { key, message, acceptance } of (await ask(`${job}/quote`)).faults)
    if (!acceptance)
      await ask(`${job}/fault-acceptances`, { faultKey: key, message, reason: 'To measure the page.' });
  const { id } = await ask(`${job}/proposal/revisions`, {});
  const ready = async () => {
    const { revisions } = await ask(`${job}/proposal`);
    return revisions.some((/** @type {any} */ one) => one.id === id && one.progress === 100);
  };
  await until(ready, signal);
  const email = `${randomUUID()}@example.com`;
  const recipients = [{ name: 'Ida Fairweather', email }];
  await ask(`${job}/proposal/revisions/${id}/send`, { recipients, message: '' });
  return until(async () => {
    const { items: mails } = await ask('/dev/mail/messages.json');
    const mail = mails.find((/** @type {any} */ one) => one.to.includes(email));
    return mail?.text.match(/https?:\/\/\S+\/p\/\S+/)?.[0];
  }, signal);
}

/**
 * @template T
 * @param {() => Promise<T>} look
 * @param {AbortSignal} [signal]
 * @returns {Promise<NonNullable<T>>} what it finds
 */
async function until(look, signal) {
  const end = performance.now() + 120_000;
  while (performance.now() < end) {
    signal?.throwIfAborted();
    const found = await look();
    if (found) return found;
    await sleep(300);
  }
  throw new Error('What was waited for did not come in two minutes.');
}

/** Run in the page, before its own script. */
const WATCH = `
  window.seen = { paintMs: 0, painted: '', shift: 0, eveningMs: 0 };
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) {
      window.seen.paintMs = entry.startTime;
      window.seen.painted = entry.element ? entry.element.tagName.toLowerCase() : '';
    }
  }).observe({ type: 'largest-contentful-paint', buffered: true });
  new PerformanceObserver((list) => {
    for (const entry of list.getEntries()) window.seen.shift += entry.value;
  }).observe({ type: 'layout-shift', buffered: true });
  const look = () => {
    if (document.querySelector('[data-drawn]')) window.seen.eveningMs = performance.now();
    else requestAnimationFrame(look);
  };
  look();
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
    /** @type {Record<string, number>} */
    const bytes = {};
    /** @type {Map<string, { type: string, url: string }>} */
    const asked = new Map();
    /** @type {string[]} */
    const pictures = [];
    session.on('Network.responseReceived', ({ requestId, type, response }) =>
      asked.set(requestId, { type, url: response.url }),
    );
    session.on('Network.loadingFinished', ({ requestId, encodedDataLength }) => {
      const { type, url } = asked.get(requestId) ?? { type: 'Other', url: '' };
      bytes[type] = (bytes[type] ?? 0) + encodedDataLength;
      if (url.includes('/pictures/')) pictures.push(new URL(url).search || 'whole');
    });
    await page.addInitScript(WATCH);
    await page.goto(url, { waitUntil: 'networkidle' });
    await page.getByRole('button', { name: 'Review and approve' }).waitFor();
    await page.locator('[data-drawn]').waitFor({ timeout: 60_000 });
    // What is painted last is told a little later.
    await page.waitForTimeout(500);
    return { ...(await page.evaluate('window.seen')), bytes, pictures };
  } finally {
    await context.close();
  }
}
