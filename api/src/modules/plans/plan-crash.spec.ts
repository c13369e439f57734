import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import {
  apply,
  type Change,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  type PlanRecord,
  placeNote,
  planOf,
} from '@lampwright/geometry/plan';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { countedIds, must, seeded } from '../../../../geometry/src/plan/plan.testkit.js';
import { migrateDatabase } from '../../database/migrations.js';

/** What this needs of the scripts that run the product; they are plain JavaScript. */
interface Scripts {
  build(options: { only: readonly string[] }): Promise<unknown>;
  openCluster(folder: string): Promise<Cluster>;
}
interface Cluster {
  readonly url: string;
  /** Null while it is not running. */
  readonly pid: number | null;
  keeperUrl(): string;
  start(): Promise<unknown>;
  ensureDatabase(): Promise<void>;
  destroy(): Promise<void>;
}
async function loadScripts(): Promise<Scripts> {
  const load = (name: string): Promise<Partial<Scripts>> =>
    import(new URL(`../../../../scripts/lib/${name}`, import.meta.url).href);
  const { build } = await load('build.mjs');
  const { openCluster } = await load('postgres.mjs');
  if (!build || !openCluster) throw new Error('The scripts no longer hold what this test needs.');
  return { build, openCluster };
}

const SEED = 61;
const SAVES = 200;
/** Of the saves under way at these, something is killed: the API, or the database with all its children. */
const API_KILLS = new Set([23, 82, 164]);
const DATABASE_KILLS = new Set([47, 131]);

/** A client without agents: it has to bear a server that dies in mid-request. */
class Caller {
  cookie = '';
  constructor(private readonly url: string) {}

  async call(method: string, path: string, body?: unknown): Promise<{ status: number; body: never }> {
    const response = await fetch(`${this.url}${path}`, {
      method,
      headers: { 'Content-Type': 'application/json', Cookie: this.cookie },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
      signal: AbortSignal.timeout(10_000),
    });
    const cookie = response.headers.get('set-cookie');
    if (cookie) this.cookie = cookie.split(';')[0] ?? '';
    return { status: response.status, body: JSON.parse((await response.text()) || 'null') as never };
  }
}

/** Its own cluster and its own API process, since both get killed. */
describe('a plan saved while processes are killed', () => {
  const folder = mkdtempSync(join(tmpdir(), 'lampwright-crash-'));
  let cluster: Cluster;
  let api: ChildProcess | null = null;
  let port: number;

  async function startApi(): Promise<void> {
    const child = spawn(process.execPath, ['dist/main.js'], {
      cwd: new URL('../../..', import.meta.url),
      stdio: 'ignore',
      env: {
        PATH: process.env.PATH,
        LAMPWRIGHT_MODE: 'local',
        PUBLIC_URL: `http://127.0.0.1:${port}`,
        PORT: String(port),
        DATABASE_URL: cluster.url,
        SESSION_SECRET: 'a secret that only this test of crashes uses',
        S3_BUCKET: 'lampwright',
        S3_ACCESS_KEY_ID: 'test',
        S3_SECRET_ACCESS_KEY: 'test',
        S3_ENDPOINT: 'http://127.0.0.1:9',
        SMTP_URL: 'smtp://127.0.0.1:9',
        MAIL_FROM: 'Lampwright <post@example.com>',
        LOG_LEVEL: 'silent',
      },
    });
    api = child;
    await waitUntil(
      () => 'the API answers',
      async () => {
        if (child.exitCode !== null) throw new Error(`the API ended with ${child.exitCode}`);
        const answer = await fetch(`http://127.0.0.1:${port}/api/auth/me`).catch(() => null);
        return answer !== null && answer.status < 500;
      },
    );
  }

  async function killApi(): Promise<void> {
    const child = api;
    if (!child || child.exitCode !== null) return;
    child.kill('SIGKILL');
    if (child.exitCode === null && child.signalCode === null) await once(child, 'exit');
  }

  /** Kills the postmaster and every process that it started, as a power cut would. */
  async function killDatabase(): Promise<void> {
    const { pid } = cluster;
    if (pid === null) throw new Error('there is no database to kill');
    const client = new pg.Client({ connectionString: cluster.keeperUrl() });
    client.on('error', () => undefined);
    await client.connect();
    const { rows } = await client.query<{ pid: number }>('SELECT pid FROM pg_stat_activity');
    for (const victim of [pid, ...rows.map((row) => row.pid)]) {
      try {
        process.kill(victim, 'SIGKILL');
      } catch {
        // It has gone with another.
      }
    }
    await client.end().catch(() => undefined);
    await waitUntil(
      () => 'the database is gone',
      async () => cluster.pid === null,
    );
  }

  beforeAll(async () => {
    const { build, openCluster } = await loadScripts();
    await build({ only: ['geometry', 'api'] });
    cluster = await openCluster(folder);
    await cluster.start();
    await cluster.ensureDatabase();
    await migrateDatabase(cluster.url);
    port = await freePort();
    await startApi();
  }, 240_000);
  afterAll(async () => {
    await killApi();
    await cluster?.destroy();
    rmSync(folder, { recursive: true, force: true });
  }, 60_000);

  it(`seed ${SEED}: loses none of ${SAVES} saves that it acknowledged, and makes none twice`, async () => {
    const random = seeded(SEED);
    const ids = countedIds('crash-');
    const caller = new Caller(`http://127.0.0.1:${port}`);
    const person = {
      companyName: 'Crash',
      name: 'Ada',
      email: 'ada@example.com',
      password: 'a long enough password',
    };
    expect((await caller.call('POST', '/api/auth/sign-up', person)).status).toBe(201);
    const job = { name: 'Job', client: { name: 'Ida' }, property: { name: 'Front', address: '1 Weir Walk' } };
    const made = await caller.call('POST', '/api/jobs', job);
    const path = `/api/jobs/${(made.body as { id: string }).id}/plan`;
    const first = await getPlan(caller, path);
    const sheet = sheetChange(ids());
    let version = await save(caller, path, first.version, sheet, null);
    let plan = apply(first.plan, sheet);
    const acknowledged = new Map<string, number>();
    let interrupted = 0;
    for (let i = 0; i < SAVES; i += 1) {
      const note = { sheetId: 'sheet1', at: { x: i, y: Math.floor(random() * 100) }, text: `note ${i}` };
      const change = must(placeNote(plan, note, ids));
      const kill = API_KILLS.has(i) ? killApi : DATABASE_KILLS.has(i) ? killDatabase : null;
      const restart = async () => {
        interrupted += 1;
        const before = cluster.url;
        if (cluster.pid === null) await cluster.start();
        // The port may not be free again at once; the database then comes back on another.
        if (cluster.url !== before) await killApi();
        if (api === null || api.exitCode !== null || api.signalCode !== null) await startApi();
      };
      version = await save(caller, path, version, change, kill && { kill, restart, afterMs: random() * 12 });
      acknowledged.set(change.id, version);
      plan = apply(plan, change);
    }
    expect(interrupted).toBeGreaterThanOrEqual(API_KILLS.size + DATABASE_KILLS.size);

    const client = new pg.Client({ connectionString: cluster.url });
    await client.connect();
    const { rows } = await client.query<{ change_id: string; version: number; put: Change['put'] }>(
      'SELECT change_id, version, put FROM plan_changes ORDER BY version',
    );
    await client.end();
    const kept = new Map(rows.map((row) => [row.change_id, row.version]));
    expect(kept.size).toBe(rows.length);
    expect(rows.map((row) => row.version)).toEqual(rows.map((_, i) => i + 1));
    for (const [id, at] of acknowledged) expect(kept.get(id), `change ${id}`).toBe(at);
    // Beginning, sheet, and the saves: nothing that nobody asked for.
    expect(rows.length).toBe(SAVES + 2);
    const replayed = rows.reduce(
      (doc, { put }) => apply(doc, { put, remove: [] }),
      planOf([]) as PlanDocument,
    );
    const present = await getPlan(caller, path);
    expect(Object.fromEntries(present.plan)).toEqual(Object.fromEntries(replayed));
    expect(Object.fromEntries(present.plan)).toEqual(Object.fromEntries(plan));
  }, 180_000);
});

interface Interruption {
  readonly kill: () => Promise<void>;
  readonly restart: () => Promise<void>;
  readonly afterMs: number;
}

/** Saves until it is acknowledged, as the editor's outbox does. Answers the version of the change. */
async function save(
  caller: Caller,
  path: string,
  baseVersion: number,
  change: Change,
  interruption: Interruption | null,
): Promise<number> {
  const body = { session: 'crash', baseVersion, changes: [change] };
  const attempt = () => caller.call('POST', `${path}/changes`, body).catch(() => null);
  let answer: Awaited<ReturnType<typeof attempt>>;
  if (interruption) {
    const [got] = await Promise.all([
      attempt(),
      new Promise((resolve) => setTimeout(resolve, interruption.afterMs)).then(interruption.kill),
    ]);
    answer = got;
    await interruption.restart();
    // Whether it was acknowledged or not: asked again, the answer must be the same.
    if (answer?.status === 200) {
      const again = await until(attempt);
      expect(again.body).toMatchObject({ applied: (answer.body as { applied: unknown }).applied });
    }
  } else answer = await attempt();
  const done = answer?.status === 200 ? answer : await until(attempt);
  const { applied } = done.body as { applied: { id: string; version: number }[] };
  expect(applied.map(({ id }) => id)).toEqual([change.id]);
  return applied[0]?.version ?? 0;
}

async function until<T extends { status: number }>(attempt: () => Promise<T | null>): Promise<T> {
  let last: T | null = null;
  let told = '';
  await waitUntil(
    () => `a save goes through (${told})`,
    async () => {
      last = await attempt();
      told = last === null ? 'no answer' : JSON.stringify(last);
      if (last && last.status < 500 && last.status !== 200)
        throw new Error(`refused: ${JSON.stringify(last)}`);
      return last?.status === 200;
    },
  );
  return last as unknown as T;
}

async function getPlan(caller: Caller, path: string): Promise<{ version: number; plan: PlanDocument }> {
  const { status, body } = await caller.call('GET', path);
  expect(status).toBe(200);
  const { version, records } = body as { version: number; records: PlanRecord[] };
  return { version, plan: planOf(records) };
}

function sheetChange(id: string): Change {
  const sheet = {
    kind: 'sheet' as const,
    id: 'sheet1',
    name: 'Plot',
    order: 0,
    widthPx: 1000,
    heightPx: 1000,
    view: 'plan' as const,
    pixelsPerPaperMeter: null,
    references: [],
    groundMetersPerPaperMeter: null,
    whiteLux: null,
  };
  return { id, schema: PLAN_SCHEMA_VERSION, put: { sheet1: sheet }, remove: [] };
}

async function waitUntil(what: () => string, done: () => Promise<boolean>): Promise<void> {
  for (let i = 0; i < 1200; i += 1) {
    if (await done()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error(`waited too long until ${what()}`);
}

async function freePort(): Promise<number> {
  const server = createServer().listen(0, '127.0.0.1');
  await once(server, 'listening');
  const address = server.address();
  server.close();
  await once(server, 'close');
  return typeof address === 'object' && address ? address.port : 0;
}
