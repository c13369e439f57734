import { setTimeout as sleep } from 'node:timers/promises';
import { pathToFileURL } from 'node:url';
import { medianMicroseconds, metersOf, requestOf, shapes, sizes } from './solver.kit.mjs';
import { bareSweep, sparseLu } from './solver-references.kit.mjs';

/** As the product runs it; types come from its source. */
const BUILT_CIRCUIT = new URL('../../api/dist/circuit/index.js', import.meta.url).href;
const SERVER_ROUNDS = 60;
const SERVER_FIXTURES = 200;

/**
 * Microseconds of a whole estimate, from request to answer, by shape and size; in the same run one linear solution
 * of the same network by mathjs' sparse LU, and for trees a bare sweep. With a running product also the server's
 * own time of a request of 200 fixtures.
 * @param {(line: string) => void} print
 * @param {{ baseUrl?: () => Promise<string> }} [context]
 */
export async function run(print, context = {}) {
  const { solveEstimate, loopOhms } = /** @type {typeof import('../../api/src/circuit/index.js')} */ (
    await import(BUILT_CIRCUIT)
  );
  const { normalizeEstimateRequest } = await import('@lampwright/geometry/estimate');
  const { celsius, meters, ohms } = await import('@lampwright/geometry/units');
  const columns = [
    'shape',
    'fixtures',
    'estimate µs',
    'µs/fixture',
    'factorised',
    'mathjs LU µs',
    'bare sweep µs',
  ];
  print(columns.map((name) => name.padStart(14)).join(''));
  for (const shape of shapes) {
    /** @type {number[]} */
    const times = [];
    for (const count of sizes) {
      const request = normalizeEstimateRequest(/** @type {never} */ (requestOf(shape, count)));
      const statistics = { iterations: 0 };
      solveEstimate(request, statistics);
      const took = medianMicroseconds(() => solveEstimate(request));
      times.push(took);
      const siemens = 1 / loopOhms({ awg: 10 }, meters(metersOf(shape, count)), ohms(0), celsius(25));
      const va = 150 / 0.95 / count;
      const lu = medianMicroseconds(sparseLu(shape, count, siemens, 13, va));
      const sweep = shape === 'mesh' ? null : medianMicroseconds(bareSweep(shape, count, siemens, 13, va));
      const cells = [shape, count, took.toFixed(0), (took / count).toFixed(2), statistics.iterations];
      const references = [lu, sweep].map((time) => (time === null ? '–' : time.toFixed(0)));
      print([...cells, ...references].map((cell) => String(cell).padStart(14)).join(''));
    }
    const [, hundred = 1, thousand = 1, fiveThousand = 1] = times;
    const middle = Math.log(thousand / hundred) / Math.log(10);
    const upper = Math.log(fiveThousand / thousand) / Math.log(5);
    print(
      `${shape.padStart(14)}  grows as fixtures^${middle.toFixed(2)} from 100 to 1000, ^${upper.toFixed(2)} from there to 5000`,
    );
  }
  if (!context.baseUrl) return;
  const baseUrl = await context.baseUrl();
  // The tables held this process up for long: let it notice which idle connections the server closed meanwhile.
  await sleep(100);
  await measureServer(print, baseUrl);
}

/** @param {(line: string) => void} print @param {string} baseUrl */
async function measureServer(print, baseUrl) {
  const body = JSON.stringify(requestOf('tree', SERVER_FIXTURES));
  const cookie = await signUp(baseUrl);
  /** @type {Map<string, number[]>} */
  const parts = new Map();
  const note = (/** @type {string} */ name, /** @type {number} */ took) =>
    parts.set(name, [...(parts.get(name) ?? []), took]);
  for (let round = -10; round < SERVER_ROUNDS; round += 1) {
    const start = performance.now();
    const response = await fetch(`${baseUrl}/api/estimates`, {
      method: 'POST',
      headers: { cookie, 'content-type': 'application/json' },
      body,
    });
    await response.arrayBuffer();
    if (!response.ok) throw new Error(`The estimate answered ${response.status}.`);
    if (round >= 0) {
      let inServer = 0;
      for (const [, name, took] of (response.headers.get('server-timing') ?? '').matchAll(
        /(\w+);dur=([\d.]+)/g,
      )) {
        note(String(name), Number(took));
        inServer += Number(took);
      }
      note('these together', inServer);
      note('round trip', performance.now() - start);
    }
    // Stay under what one person may ask in a second.
    await new Promise((resolve) => setTimeout(resolve, 25));
  }
  print(
    `\nPOST /api/estimates, ${SERVER_FIXTURES} fixtures, ${(body.length / 1024).toFixed(0)} KiB: milliseconds`,
  );
  for (const [name, times] of parts) {
    times.sort((a, b) => a - b);
    const at = (/** @type {number} */ share) => (times[Math.floor(times.length * share)] ?? 0).toFixed(2);
    print(`${name.padStart(16)}  median ${at(0.5).padStart(7)}  p95 ${at(0.95).padStart(7)}`);
  }
}

/** @param {string} baseUrl */
async function signUp(baseUrl) {
  const response = await fetch(`${baseUrl}/api/auth/sign-up`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({
      companyName: 'Bench',
      name: 'Bench',
      email: `solver-bench-${Date.now()}@example.com`,
      password: 'a long enough password',
    }),
  });
  const cookie = response.headers.getSetCookie()[0]?.split(';')[0];
  if (!response.ok || !cookie) throw new Error(`Signing up answered ${response.status}.`);
  return cookie;
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await run((line) => console.log(line));
