import { randomUUID } from 'node:crypto';
import { newToken } from '../../src/access/one-time-token.js';
import type { RouteCase } from './route-case.js';
import { PASSWORD, type World } from './world.js';

/** An invitation of our company that waits, sent long enough ago to be sent again. */
async function invitation(
  { test, companyId, members }: World,
  email = `invited-${randomUUID()}@example.com`,
) {
  const { token, tokenHash } = newToken();
  const { rows } = await test.database.executeSql(
    `INSERT INTO invitations (company_id, email, role, token_hash, invited_by, expires_at)
     VALUES ($1, $2, 'crew', $3, $4, now() + interval '6 days') RETURNING id`,
    [companyId, email, tokenHash, members.owner.actor.userId],
  );
  return { token, id: (rows[0] as { id: string }).id };
}

const ofCrew = ({ members }: World) => ({ userId: members.crew.actor.userId });

export const routes: readonly RouteCase[] = [
  { route: 'GET /api/members', audience: 'everyone', answers: 200 },
  {
    route: 'PATCH /api/members/:userId',
    audience: 'owners',
    answers: 200,
    request: (world) => ({ params: ofCrew(world), body: { role: 'designer' } }),
  },
  {
    route: 'DELETE /api/members/:userId',
    audience: 'owners',
    answers: 204,
    request: (world) => ({ params: ofCrew(world) }),
  },
  {
    route: 'GET /api/invitations',
    audience: 'owners',
    answers: 200,
    request: async (world) => {
      await invitation(world);
      return {};
    },
  },
  {
    route: 'POST /api/invitations',
    audience: 'owners',
    answers: 201,
    request: () => ({ body: { email: `invited-${randomUUID()}@example.com`, role: 'crew' } }),
  },
  {
    route: 'POST /api/invitations/:id/resend',
    audience: 'owners',
    answers: 200,
    request: async (world) => ({ params: { id: (await invitation(world)).id } }),
  },
  {
    route: 'DELETE /api/invitations/:id',
    audience: 'owners',
    answers: 204,
    request: async (world) => ({ params: { id: (await invitation(world)).id } }),
  },
  {
    route: 'POST /api/invitations/look',
    audience: 'anyone',
    answers: 200,
    request: async (world) => ({ body: { token: (await invitation(world)).token } }),
  },
  {
    route: 'POST /api/invitations/accept',
    audience: 'anyone',
    answers: 200,
    request: async (world, caller) => {
      const email = caller ? await world.email(caller) : undefined;
      const { token } = await invitation(world, email);
      return { body: { token, name: 'Somebody Invited', password: PASSWORD } };
    },
  },
];
