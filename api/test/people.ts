import { eq } from 'drizzle-orm';
import type { Actor } from '../src/access/actor.js';
import { SESSION_COOKIE } from '../src/access/cookie.js';
import type { Role } from '../src/access/permissions.js';
import { SessionCookie } from '../src/access/session-cookie.js';
import { companies, memberships, sessions, users } from '../src/database/schema/index.js';
import type { Agent, TestApp } from './harness.js';

export interface TestPerson {
  readonly agent: Agent;
  readonly actor: Actor;
  /** For callers that are no supertest agent. */
  readonly cookie: string;
}

/** A company of the test's own, made in the database and empty: no catalogue, no people. */
export async function addCompany(test: TestApp, name = 'Test company'): Promise<string> {
  const [row] = await test.database.queries.insert(companies).values({ name }).returning();
  return row!.id;
}

let count = 0;

/** A signed-in person in a company, without the cost of a password. */
export async function addPerson(test: TestApp, companyId: string, role: Role): Promise<TestPerson> {
  count += 1;
  const { queries } = test.database;
  const [user] = await queries
    .insert(users)
    .values({ email: `someone-${count}@example.org`, name: `Someone ${count}` })
    .returning();
  await queries.insert(memberships).values({ companyId, userId: user!.id, role });
  const [session] = await queries
    .insert(sessions)
    .values({ userId: user!.id, companyId, expiresAt: new Date(Date.now() + 3_600_000) })
    .returning();
  const token = test.app.get(SessionCookie, { strict: false }).sign(session!.id);
  const cookie = `${SESSION_COOKIE}=${token}`;
  const agent = test.agent();
  agent.set('Cookie', cookie);
  return { agent, cookie, actor: { userId: user!.id, sessionId: session!.id, companyId, role } };
}

/** Ends every session of a person. */
export async function endSessions(test: TestApp, person: TestPerson): Promise<void> {
  await test.database.queries
    .update(sessions)
    .set({ revokedAt: new Date() })
    .where(eq(sessions.userId, person.actor.userId));
}
