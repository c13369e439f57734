// How long the plan page's night picture takes to follow a fixture that is dragged: from the pointer's move to the
// picture with that move on the screen, in Chromium without a GPU, over the demo company's yard photo.
import { randomUUID } from 'node:crypto';
import { cpus, loadavg } from 'node:os';
import { setTimeout as sleep } from 'node:timers/promises';
import { chromium } from '@playwright/test';

/** The smaller first: the garden only grows. */
const SIZES = [60, 200];
const STEPS = 40;
/** Pointer moves of a hand that doesn't wait for the picture: so many, at so many a second. */
const STREAM_MOVES = 90;
const STREAM_RATE = 60;
const AIM_MS = 100;

/** Browsers without a GPU have WebGL by software, or none at all. */
/** @type {readonly { name: string, args: string[] }[]} */
const BROWSERS = [
  { name: 'webgl', args: ['--disable-gpu', '--enable-unsafe-swiftshader'] },
  { name: 'none', args: ['--disable-gpu'] },
];
const CHROMIUM_ARGS = [
  '--no-sandbox',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

const JOB = 'Harrow Bank';
const DESIGNER = { email: 'designer@fernhollow.example', password: 'fernhollow-demo' };
/** The form that records are written in today. */
const PLAN_FORM = 2;

/**
 * @typedef {{ x: number, y: number }} Point
 * @typedef {Record<string, any>} PlanRecord
 * @typedef {{ camera: { x: number, y: number, width: number, height: number }, shownAt: number[], movedAt: number, darkAt: number }} Watched
 */

/**
 * @param {(line: string) => void} print
 * @param {{ baseUrl: () => Promise<string>, signal?: AbortSignal }} context
 */
export async function run(print, context) {
  const baseUrl = await context.baseUrl();
  print('Milliseconds from a pointer move to the picture with that move on the screen, one fixture dragged:');
  print(`median and p95 of ${STEPS} moves, each made when the picture of the last was there.`);
  print(`stream: pictures a second while the pointer moves ${STREAM_RATE} times a second without waiting.`);
  print('WebGL    fixtures    first   median      p95   stream  at rest   load');
  for (const fixtures of SIZES)
    for (const { name, args } of BROWSERS) {
      context.signal?.throwIfAborted();
      const browser = await chromium.launch({
        executablePath: '/usr/bin/chromium',
        args: [...CHROMIUM_ARGS, ...args],
      });
      try {
        const seen = await drag(browser, baseUrl, fixtures);
        const sorted = seen.steps.toSorted((a, b) => a - b);
        const at = (/** @type {number} */ share) => sorted[Math.floor((sorted.length - 1) * share)] ?? 0;
        const cells = [seen.firstMs, at(0.5), at(0.95), seen.stream, seen.restMs].map((n) =>
          n.toFixed(0).padStart(8),
        );
        const load = (loadavg()[0] ?? 0).toFixed(1).padStart(6);
        print(`${name.padEnd(8)} ${String(fixtures).padStart(8)} ${cells.join(' ')} ${load}`);
      } finally {
        await browser.close();
      }
    }
  print(`first: from the press on "Night" to its picture; at rest: from letting go to the fine picture.`);
  print(
    `The aim is ${AIM_MS} ms a move for 60 fixtures; load: processes that ran or waited for ${cpus().length} cores.`,
  );
}

/** Run in the page, before its own script: when the sheet is drawn, where, and when the pointer has moved. */
const WATCH = `
  window.watched = { camera: null, shownAt: [], movedAt: 0, light: 0, darkAt: 0 };
  const draw = CanvasRenderingContext2D.prototype.drawImage;
  const small = Object.assign(document.createElement('canvas'), { width: 8, height: 8 });
  const few = small.getContext('2d', { willReadFrequently: true });
  const lightOf = (image) => {
    draw.call(few, image, 0, 0, 8, 8);
    return few.getImageData(0, 0, 8, 8).data.reduce((sum, value) => sum + value, 0);
  };
  let waits = false;
  CanvasRenderingContext2D.prototype.drawImage = function (image, ...place) {
    draw.call(this, image, ...place);
    if (place.length !== 4 || this.canvas !== document.querySelector('[data-testid="plan-canvas"] canvas')) return;
    const [x, y, width, height] = place;
    window.watched.camera = { x, y, width, height };
    if (waits) return;
    waits = true;
    let isFirstDark = false;
    if (window.watched.darkAt === 0) {
      const light = lightOf(image);
      isFirstDark = light < 0.75 * window.watched.light;
      window.watched.light = Math.max(window.watched.light, light);
    }
    // On the screen by the time that the next frame begins.
    requestAnimationFrame(() => {
      waits = false;
      const now = performance.now();
      window.watched.shownAt.push(now);
      if (isFirstDark) window.watched.darkAt = now;
    });
  };
  addEventListener('pointermove', (event) => { window.watched.movedAt = event.timeStamp; }, true);
`;

/**
 * @param {import('@playwright/test').Browser} browser
 * @param {string} baseUrl
 * @param {number} fixtures
 */
async function drag(browser, baseUrl, fixtures) {
  const context = await browser.newContext({
    baseURL: baseUrl,
    viewport: { width: 1440, height: 900 },
    // For what is asked of the page from here.
    bypassCSP: true,
  });
  try {
    const page = await context.newPage();
    const garden = await gardenOf(page.request, fixtures);
    await page.addInitScript(WATCH);
    await page.goto(`/jobs/${garden.jobId}/plan`);
    await page.waitForFunction('window.watched.camera !== null', null, { timeout: 60_000 });
    await quiet(page);
    const pressedAt = await now(page);
    await page.getByRole('button', { name: 'Night' }).click();
    await page.waitForFunction('window.watched.darkAt > 0', null, { timeout: 60_000 });
    const firstMs = (await watched(page)).darkAt - pressedAt;
    await quiet(page);
    const camera = (await watched(page)).camera;
    const frame = await page.getByTestId('plan-canvas').boundingBox();
    if (!frame) throw new Error('The plan has no drawing.');
    const from = {
      x: frame.x + camera.x + (garden.at.x * camera.width) / garden.sheet.widthPx,
      y: frame.y + camera.y + (garden.at.y * camera.height) / garden.sheet.heightPx,
    };
    await page.mouse.move(from.x, from.y);
    await page.mouse.down();
    // Far enough to be a drag and no click; the first step also makes what moving pictures are drawn on.
    await page.mouse.move(from.x + 12, from.y);
    await quiet(page);
    const steps = [];
    for (let i = 0; i < STEPS; i += 1) {
      const count = await shown(page);
      await page.mouse.move(...place(from, i));
      const shownAt = await shownAfter(page, count);
      steps.push(shownAt - (await watched(page)).movedAt);
      await sleep(20);
    }
    const count = await shown(page);
    const streamFrom = await now(page);
    for (let i = 0; i < STREAM_MOVES; i += 1) {
      await page.mouse.move(...place(from, STEPS + i));
      const ahead = streamFrom + ((i + 1) * 1000) / STREAM_RATE - (await now(page));
      if (ahead > 0) await sleep(ahead);
    }
    const stream = (((await shown(page)) - count) * 1000) / ((await now(page)) - streamFrom);
    const letGoAt = await now(page);
    await page.mouse.up();
    await quiet(page);
    const restMs = ((await watched(page)).shownAt.at(-1) ?? letGoAt) - letGoAt;
    return { firstMs, steps, stream, restMs };
  } finally {
    await context.close();
  }
}

/** A way to and fro over the lawn. @param {Point} from @param {number} i @returns {[number, number]} */
const place = (from, i) => [from.x + 12 + 60 * Math.sin(i / 9), from.y - 20 * Math.sin(i / 5)];

const watched = (/** @type {import('@playwright/test').Page} */ page) =>
  /** @type {Promise<Watched>} */ (page.evaluate('window.watched'));
const shown = (/** @type {import('@playwright/test').Page} */ page) =>
  /** @type {Promise<number>} */ (page.evaluate('window.watched.shownAt.length'));
const now = (/** @type {import('@playwright/test').Page} */ page) =>
  /** @type {Promise<number>} */ (page.evaluate('performance.now()'));

/** When the first picture after so many was there. @param {import('@playwright/test').Page} page @param {number} count */
async function shownAfter(page, count) {
  await page.waitForFunction(`window.watched.shownAt.length > ${count}`, null, { timeout: 60_000 });
  return /** @type {Promise<number>} */ (page.evaluate(`window.watched.shownAt[${count}]`));
}

/** Waits until no picture has come for a while. @param {import('@playwright/test').Page} page */
async function quiet(page) {
  let count = -1;
  for (let next = await shown(page); next !== count; next = await shown(page)) {
    count = next;
    await sleep(1500);
  }
}

/**
 * The demo company's garden on a photo, with so many fixtures: its own, and more of them on the lawn, wired.
 * @param {import('@playwright/test').APIRequestContext} request
 * @param {number} fixtures
 */
async function gardenOf(request, fixtures) {
  /** @param {string} path @param {unknown} [data] @returns {Promise<any>} */
  const ask = async (path, data) => {
    const answer = await (data === undefined ? request.get(path) : request.post(path, { data }));
    if (!answer.ok()) throw new Error(`${path} answered ${answer.status()}: ${await answer.text()}`);
    return answer.json();
  };
  await ask('/api/auth/sign-in', DESIGNER);
  const { items } = await ask(`/api/jobs?search=${encodeURIComponent(JOB)}`);
  const jobId = items[0].id;
  const { version, records } = await ask(`/api/jobs/${jobId}/plan`);
  const sheet = records.find((/** @type {PlanRecord} */ one) => one.kind === 'sheet');
  /** @type {PlanRecord[]} */
  const own = records.filter(
    (/** @type {PlanRecord} */ one) => one.kind === 'fixture' && one.sheetId === sheet.id,
  );
  const wire = records.find(
    (/** @type {PlanRecord} */ one) => one.kind === 'cable' && own.some(({ id }) => id === one.toId),
  );
  const [dragged] = own;
  if (!dragged || !wire || own.length > fixtures)
    throw new Error(`The garden has ${own.length} fixtures, for a bench of ${fixtures}.`);
  const at = { x: sheet.widthPx * 0.45, y: sheet.heightPx * 0.78 };
  /** @type {Record<string, PlanRecord>} */
  const put = { [dragged.id]: { ...dragged, at } };
  for (let i = own.length; i < fixtures; i += 1) {
    const id = randomUUID();
    const place = {
      x: sheet.widthPx * (0.08 + (0.84 * ((i * 7) % 23)) / 22),
      y: sheet.heightPx * (0.6 + (0.34 * ((i * 5) % 17)) / 16),
    };
    put[id] = { ...own[i % own.length], id, at: place, aim: null, number: i + 1 };
    const cable = randomUUID();
    put[cable] = { ...wire, id: cable, toId: id, via: [] };
  }
  await ask(`/api/jobs/${jobId}/plan/changes`, {
    baseVersion: version,
    changes: [{ id: randomUUID(), schema: PLAN_FORM, put, remove: [] }],
  });
  return { jobId, sheet, at };
}
