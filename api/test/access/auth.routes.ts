import { randomUUID } from 'node:crypto';
import { newToken } from '../../src/access/one-time-token.js';
import type { RouteCase } from './route-case.js';
import { PASSWORD, type World } from './world.js';

const freshAddress = () => `fresh-${randomUUID()}@example.com`;

async function link(
  { test, members }: World,
  purpose: 'reset-password' | 'change-email',
): Promise<{ token: string }> {
  const { token, tokenHash } = newToken();
  await test.database.executeSql(
    `INSERT INTO email_tokens (user_id, purpose, token_hash, new_email, expires_at)
     VALUES ($1, $2, $3, $4, now() + interval '1 hour')`,
    [members.crew.actor.userId, purpose, tokenHash, freshAddress()],
  );
  return { token };
}

export const routes: readonly RouteCase[] = [
  {
    route: 'POST /api/auth/sign-up',
    audience: 'anyone',
    answers: 201,
    request: () => ({
      body: { companyName: 'New', name: 'Somebody New', email: freshAddress(), password: PASSWORD },
    }),
  },
  {
    route: 'POST /api/auth/sign-in',
    audience: 'anyone',
    answers: 200,
    request: async (world) => ({ body: { email: await world.email(world.nobody), password: PASSWORD } }),
  },
  { route: 'POST /api/auth/sign-out', audience: 'anyone', answers: 204 },
  { route: 'POST /api/auth/sign-out-everywhere', audience: 'signed-in', answers: 204 },
  {
    route: 'POST /api/auth/forgot-password',
    audience: 'anyone',
    answers: 202,
    request: async (world) => ({ body: { email: await world.email(world.members.crew) } }),
  },
  {
    route: 'POST /api/auth/reset-password',
    audience: 'anyone',
    answers: 204,
    request: async (world) => ({
      body: { ...(await link(world, 'reset-password')), password: 'a password just chosen' },
    }),
  },
  {
    route: 'POST /api/auth/confirm-email',
    audience: 'anyone',
    answers: 204,
    request: async (world) => ({ body: await link(world, 'change-email') }),
  },
  { route: 'GET /api/auth/me', audience: 'signed-in', answers: 200 },
  {
    route: 'POST /api/auth/active-company',
    audience: 'signed-in',
    elsewhere: 'hidden',
    request: ({ companyId }) => ({ body: { companyId } }),
  },
];
