import { randomUUID } from 'node:crypto';
import type { RouteCase } from './route-case.js';
import { PASSWORD } from './world.js';

export const routes: readonly RouteCase[] = [
  {
    route: 'PATCH /api/account',
    audience: 'signed-in',
    answers: 200,
    request: () => ({ body: { name: 'Another Name', preferences: { theme: 'dark' } } }),
  },
  {
    route: 'POST /api/account/password',
    audience: 'signed-in',
    answers: 204,
    request: () => ({ body: { current: PASSWORD, next: 'a password just chosen' } }),
  },
  {
    route: 'POST /api/account/email',
    audience: 'signed-in',
    answers: 202,
    request: () => ({ body: { password: PASSWORD, email: `next-${randomUUID()}@example.com` } }),
  },
  { route: 'GET /api/account/sessions', audience: 'signed-in', answers: 200 },
  {
    // A session belongs to its person: not even the owner of their company may end it.
    route: 'DELETE /api/account/sessions/:id',
    audience: 'signed-in',
    elsewhere: 'own',
    answers: 204,
    request: async ({ members }, caller) => {
      const { sessionId } = (caller ?? members.owner).actor;
      return { params: { id: sessionId } };
    },
  },
  {
    route: 'DELETE /api/account',
    audience: 'signed-in',
    answers: 204,
    request: async ({ test, otherOwner, members }) => {
      // Owners may go once somebody else owns their company.
      await test.database.executeSql(
        `INSERT INTO memberships (company_id, user_id, role) VALUES ($1, $2, 'owner')
         ON CONFLICT (company_id, user_id) DO UPDATE SET role = 'owner'`,
        [otherOwner.actor.companyId, members.crew.actor.userId],
      );
      await test.database.executeSql("UPDATE memberships SET role = 'owner' WHERE user_id = $1", [
        members.designer.actor.userId,
      ]);
      return { body: { password: PASSWORD } };
    },
  },
];
