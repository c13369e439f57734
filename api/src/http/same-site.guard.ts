import { type CanActivate, type ExecutionContext, Inject, Injectable } from '@nestjs/common';
import type { Request } from 'express';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { AppError } from './app-error.js';

const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Refuses writes that another site's page makes a browser send. Browsers name the relation in
 * Sec-Fetch-Site, older ones the Origin; a caller that sends neither is no browser and carries no
 * cookie against its owner's will.
 */
@Injectable()
export class SameSiteGuard implements CanActivate {
  private readonly origin: string;

  constructor(@Inject(ENV) env: Env) {
    this.origin = new URL(env.PUBLIC_URL).origin;
  }

  canActivate(context: ExecutionContext): boolean {
    const request = context.switchToHttp().getRequest<Request>();
    if (SAFE.has(request.method)) return true;
    const site = request.get('sec-fetch-site');
    if (site !== undefined) {
      if (site === 'same-origin' || site === 'none') return true;
    } else {
      const origin = request.get('origin');
      if (origin === undefined || origin === this.origin) return true;
    }
    throw new AppError(403, 'cross-site', 'This request came from another site and was refused.');
  }
}
