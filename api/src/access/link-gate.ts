import { Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type { CookieOptions, Request, Response } from 'express';
import { z } from 'zod';
import { ENV } from '../config/config.module.js';
import { type Env, isLocal } from '../config/env.js';
import { AppError, notFound } from '../http/app-error.js';
import type { Guest } from './guest.js';
import { LinkThrottle } from './link-throttle.js';
import { type LinkRow, LinksRepository } from './links.repository.js';
import { hashToken } from './one-time-token.js';

export const LINK_COOKIE = 'lampwright_link';

/** 32 bytes in base64url. */
const tokenSchema = z.string().regex(/^[A-Za-z0-9_-]{43}$/);
const cookieSchema = z.object({ lid: z.uuid() });

const unknown = () => notFound('This proposal');
const gone = () =>
  new AppError(410, 'link-gone', 'This link is no longer valid. Please ask the company for a new one.');

/**
 * Lets homeowners in by their link. The token is swapped for a cookie that is sent to this link's addresses
 * only, so that several proposals can be open in one browser; revoking the link ends both.
 */
@Injectable()
export class LinkGate {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(JwtService) private readonly jwt: JwtService,
    @Inject(LinksRepository) private readonly links: LinksRepository,
    @Inject(LinkThrottle) private readonly throttle: LinkThrottle,
  ) {}

  /**
   * @param address the caller's, by which wrong tokens are counted
   * @throws AppError 404 for a token that was never given, 410 for one that was revoked or has expired, 429 for
   * an address that was wrong too often
   */
  async byToken(token: string, address: string): Promise<Guest> {
    this.throttle.demandPatience(address);
    const row = tokenSchema.safeParse(token).success ? await this.links.byTokenHash(hashToken(token)) : null;
    if (!row) this.throttle.countWrong(address);
    return liveOrThrow(row);
  }

  /** @throws AppError 404 without a cookie for this link, 410 for a link that is no longer valid */
  async guestOf(request: Request): Promise<Guest> {
    const cookies: Record<string, unknown> = request.cookies ?? {};
    const token = cookies[LINK_COOKIE];
    if (typeof token !== 'string') throw unknown();
    const payload = await this.jwt.verifyAsync<object>(token).catch(() => null);
    const parsed = cookieSchema.safeParse(payload);
    if (!parsed.success || parsed.data.lid !== request.params.linkId) throw unknown();
    return liveOrThrow(await this.links.byId(parsed.data.lid));
  }

  setCookie(response: Response, linkId: string): void {
    const options: CookieOptions = {
      httpOnly: true,
      sameSite: 'lax',
      secure: !isLocal(this.env),
      path: `/api/share/${linkId}`,
    };
    response.cookie(LINK_COOKIE, this.sign(linkId), options);
  }

  /** What the cookie of a link holds. */
  sign(linkId: string): string {
    return this.jwt.sign({ lid: linkId });
  }
}

function liveOrThrow(row: LinkRow | null): Guest {
  if (!row) throw unknown();
  const { expiresAt, revokedAt, ...guest } = row;
  if (revokedAt !== null || expiresAt.getTime() <= Date.now()) throw gone();
  return guest;
}
