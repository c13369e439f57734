import type { CookieOptions } from 'express';
import { type Env, isLocal } from '../config/env.js';

export const SESSION_COOKIE = 'lampwright_session';

/** Options of the session cookie: never readable by scripts, never sent by other sites' requests. */
export const sessionCookieOptions = (env: Env): CookieOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  secure: !isLocal(env),
  path: '/',
});
