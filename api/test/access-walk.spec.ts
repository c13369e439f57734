import { randomUUID } from 'node:crypto';
import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { hashPassword } from '../src/access/password.js';
import { type Role, roles } from '../src/access/permissions.js';
import { writeShell } from '../src/modules/share/share.testkit.js';
import { type MailCatcher, startMailCatcher } from '../src/ports/mail/catcher.js';
import { type FakeS3, startFakeS3 } from '../src/ports/storage/fake-s3.js';
import { type Audience, hiddenElsewhere, type RouteCase, type ValidRequest } from './access/route-case.js';
import { serverRoutes } from './access/server-routes.js';
import {
  guestOf,
  MARK,
  makeWorld,
  otherGuest,
  PASSWORD,
  type World,
  walkCardService,
} from './access/world.js';
import { type Agent, startTestApp, type TestApp } from './harness.js';
import type { TestPerson } from './people.js';

/** Each module's own table: a file NAME.routes.ts in ./access that exports `routes`. */
async function readTables(): Promise<RouteCase[]> {
  const folder = fileURLToPath(new URL('./access', import.meta.url));
  const files = (await readdir(folder)).filter((name) => name.endsWith('.routes.ts')).sort();
  const tables = await Promise.all(
    files.map(async (file) => {
      const { routes } = (await import(join(folder, file))) as { routes: readonly RouteCase[] };
      return routes;
    }),
  );
  return tables.flat();
}

const callers = [
  'signed out',
  'no company',
  'owner',
  'designer',
  'crew',
  'owner elsewhere',
  'designer elsewhere',
  'crew elsewhere',
  'guest of another link',
] as const;
type Caller = (typeof callers)[number];

const rolesOf: Readonly<Record<Exclude<Audience, 'anyone' | 'signed-in' | 'link'>, readonly Role[]>> = {
  everyone: ['owner', 'designer', 'crew'],
  planners: ['owner', 'designer'],
  owners: ['owner'],
};

/** The role of a caller, and whether it is one of our company or of another; null for no role at all. */
function standing(caller: Caller): { role: Role; elsewhere: boolean } | null {
  const role = roles.find((one) => caller.startsWith(one));
  return role ? { role, elsewhere: caller.endsWith('elsewhere') } : null;
}

/** Those who came by the link that a route names. Null: they are answered as the route says. */
const holders = [
  { link: 'the live link', status: null },
  { link: 'the link, expired', status: 410 },
  { link: 'the link, revoked', status: 410 },
] as const;

/** Ends a link as its name says, and gives a browser that came by it before. */
async function end(test: TestApp, link: (typeof holders)[number]['link'], linkId: string): Promise<Agent> {
  const set = (column: string) =>
    test.database.executeSql(
      `UPDATE proposal_links SET ${column} = now() - interval '1 second' WHERE id = $1`,
      [linkId],
    );
  switch (link) {
    case 'the live link':
      break;
    case 'the link, expired':
      await set('expires_at');
      break;
    case 'the link, revoked':
      await set('revoked_at');
      break;
  }
  return guestOf(test, linkId).agent;
}

type Expectation = 'allowed' | 'not signed in' | 'not allowed' | 'hidden';

/** What a route must answer to a caller, by its table entry alone. */
function expected(route: RouteCase, caller: Caller): Expectation {
  const { audience } = route;
  if (audience === 'anyone') return 'allowed';
  // Who does not hold the link is not told whether there is one.
  if (audience === 'link') return 'hidden';
  if (caller === 'signed out' || caller === 'guest of another link') return 'not signed in';
  const stands = standing(caller);
  const mayUse = audience === 'signed-in' || (stands !== null && rolesOf[audience].includes(stands.role));
  if (!mayUse) return 'not allowed';
  const ours = stands !== null && !stands.elsewhere;
  return !ours && hiddenElsewhere(route) ? 'hidden' : 'allowed';
}

type Someone = Pick<TestPerson, 'agent' | 'cookie'>;

async function personOf(world: World, caller: Caller): Promise<TestPerson | null> {
  if (caller === 'signed out' || caller === 'guest of another link') return null;
  const stands = standing(caller);
  if (!stands) return world.nobody;
  return stands.elsewhere ? world.other(stands.role) : world.members[stands.role];
}

const routeCases = await readTables();

describe('the access walk', () => {
  let test: TestApp;
  let dir: string;
  let storage: FakeS3;
  let catcher: MailCatcher;
  let passwordHash: string;

  beforeAll(async () => {
    dir = await mkdtemp(join(tmpdir(), 'lampwright-walk-'));
    storage = await startFakeS3({
      port: 0,
      dir: join(dir, 'objects'),
      bucket: 'lampwright',
      accessKeyId: 'test',
      secretAccessKey: 'test',
    });
    catcher = await startMailCatcher({ smtpPort: 0, httpPort: 0, dir: join(dir, 'mail') });
    await writeShell(join(dir, 'editor'));
    test = await startTestApp({
      EDITOR_FILES: join(dir, 'editor'),
      S3_ENDPOINT: storage.endpoint,
      SMTP_URL: catcher.smtpUrl,
      MAIL_VIEWER_URL: catcher.httpUrl,
      ...walkCardService,
    });
    passwordHash = await hashPassword(PASSWORD);
  });
  afterAll(async () => {
    await test.close();
    await Promise.all([storage.close(), catcher.close()]);
    await rm(dir, { recursive: true, force: true });
  });

  it('knows every route of the running server, and no other', () => {
    const known = routeCases.map(({ route }) => route);
    expect(known.filter((route, index) => known.indexOf(route) !== index)).toEqual([]);
    expect([...known].sort()).toEqual(serverRoutes(test.app));
  });

  describe.each(routeCases)('$route', (route) => {
    it.each(callers)('for %s', async (caller) => {
      const expectation = expected(route, caller);
      const { world, request, person: known } = await prepare(route, caller, expectation);
      const person: Someone | null = caller === 'guest of another link' ? await otherGuest(world) : known;
      const answer = route.endless
        ? await begin(test.url, person, addressOf(route.route, request))
        : await send(person?.agent ?? test.agent(), route.route, request);
      const told = `${answer.status} ${answer.text ?? ''}`;
      switch (expectation) {
        case 'allowed':
          if (route.answers === undefined) expect(answer.status, told).toBeLessThan(300);
          else expect(answer.status, told).toBe(route.answers);
          break;
        case 'not signed in':
          expect(answer.status, told).toBe(401);
          break;
        case 'not allowed':
          expect(answer.status, told).toBe(403);
          break;
        case 'hidden':
          expect(answer.status, told).toBe(404);
          break;
      }
      if (caller === 'no company' || caller.endsWith('elsewhere') || caller.endsWith('link'))
        expectNothingOfOurs(route, world, answer);
    });

    if (route.audience === 'link')
      it.each(holders)('for whoever holds $link', async ({ link, status }) => {
        const world = await makeWorld(test, passwordHash);
        const request = (await route.request?.(world, null)) ?? {};
        const { linkId = '' } = request.params ?? {};
        const answer = await send(await end(test, link, linkId), route.route, request);
        expect(answer.status, `${answer.status} ${answer.text}`).toBe(status ?? route.answers);
        if (status !== null) expectNothingOfOurs(route, world, answer);
      });

    if (!route.route.startsWith('GET '))
      it('for another site’s page', async () => {
        const { world, request } = await prepare(route, 'owner', 'not allowed');
        const { linkId } = request.params ?? {};
        const { agent } =
          route.audience === 'link' && linkId !== undefined ? guestOf(test, linkId) : world.members.owner;
        const answer = await send(agent, route.route, request, { 'Sec-Fetch-Site': 'cross-site' });
        expect(answer.status).toBe(403);
        expect(answer.body.code).toBe('cross-site');
      });
  });

  /** Those who are refused leave everything as it was, so that they can share what their requests are about. */
  const untouched = new Map<RouteCase, Promise<{ world: World; request: ValidRequest }>>();

  async function prepare(route: RouteCase, caller: Caller, expectation: Expectation) {
    if (expectation === 'allowed') {
      const world = await makeWorld(test, passwordHash);
      const person = await personOf(world, caller);
      return { world, person, request: (await route.request?.(world, person)) ?? {} };
    }
    const make = async () => {
      const world = await makeWorld(test, passwordHash);
      return { world, request: (await route.request?.(world, null)) ?? {} };
    };
    const shared = untouched.get(route) ?? make();
    untouched.set(route, shared);
    const { world, request } = await shared;
    return { world, request, person: await personOf(world, caller) };
  }
});

/** What a stranger is answered holds no trace of our company; an invited one is told whose letter it is. */
function expectNothingOfOurs(route: RouteCase, world: World, answer: Answer): void {
  if (route.audience === 'anyone') return;
  const text = answer.text ?? JSON.stringify(answer.body);
  expect(text).not.toContain(MARK);
  expect(text).not.toContain(world.companyId);
  for (const { actor } of Object.values(world.members)) expect(text).not.toContain(actor.userId);
}

interface Answer {
  readonly status: number;
  readonly text?: string;
  readonly body: unknown;
}

/** Waits for the beginning of an answer, and leaves if it is one without an end. */
async function begin(url: string, person: Someone | null, address: string): Promise<Answer> {
  const leave = new AbortController();
  const answer = await fetch(url + address, {
    headers: person ? { Cookie: person.cookie } : {},
    signal: leave.signal,
  });
  const streams = answer.headers.get('Content-Type')?.startsWith('text/event-stream') ?? false;
  const text = streams ? '' : await answer.text();
  leave.abort();
  return { status: answer.status, text, body: {} };
}

function addressOf(route: string, { params = {} }: ValidRequest): string {
  const [, path = ''] = route.split(' ');
  return path.replace(/:(\w+)/g, (_, name: string) => {
    const value = params[name];
    if (value === undefined)
      throw new Error(`The entry of ${route} gives no value for its parameter ${name}.`);
    return encodeURIComponent(value);
  });
}

async function send(
  agent: Agent,
  route: string,
  request: ValidRequest,
  headers: Record<string, string> = {},
): Promise<Answer & { body: { code?: string } }> {
  const [method = ''] = route.split(' ');
  const { query = {}, body, file, fields = {} } = request;
  const call = agent[verb(method)](addressOf(route, request))
    .query(query)
    .set({ 'Idempotency-Key': randomUUID(), ...request.headers, ...headers });
  if (!file) return body === undefined ? call : call.send(body);
  for (const [name, value] of Object.entries(fields)) call.field(name, value);
  return call.attach('file', file.content, file.name);
}

const verbs = ['get', 'post', 'put', 'patch', 'delete'] as const;
function verb(method: string): (typeof verbs)[number] {
  const found = verbs.find((name) => name === method.toLowerCase());
  if (!found) throw new Error(`The walk can't send ${method} yet.`);
  return found;
}
