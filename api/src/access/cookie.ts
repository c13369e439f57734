import type { CookieOptions } from 'express';
import { type Env, isLocal } from '../config/env.js';

export const SESSION_COOKIE = 'lampwright_session';

/** The longest that browsers keep a cookie. The session's own end is in the database, and moves on with use. */
const KEEP_DAYS = 400;

/** Options of the session cookie: never readable by scripts, never sent by other sites' requests. */
export const sessionCookieOptions = (env: Env): CookieOptions => ({
  httpOnly: true,
  sameSite: 'lax',
  secure: !isLocal(env),
  path: '/',
  maxAge: KEEP_DAYS * 86_400_000,
});
