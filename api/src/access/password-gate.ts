import { createHmac } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { ENV } from '../config/config.module.js';
import type { Env } from '../config/env.js';
import { Database } from '../database/database.js';
import { AppError } from '../http/app-error.js';
import { stableAddress } from './caller-address.js';
import { verifyPassword } from './password.js';
import { type AttemptKeys, PasswordAttemptsRepository } from './password-attempts.repository.js';

const MOST_FAILURES = 10;
const WINDOW_MINUTES = 15;
const WINDOW_MS = WINDOW_MINUTES * 60_000;

/**
 * Every check of a password in the product goes through here, so that each counts towards the same limit:
 * ten failures of an account from an address in 15 minutes. Accounts that don't exist are counted alike.
 */
@Injectable()
export class PasswordGate {
  constructor(
    @Inject(ENV) private readonly env: Env,
    @Inject(Database) private readonly database: Database,
    @Inject(PasswordAttemptsRepository) private readonly attempts: PasswordAttemptsRepository,
  ) {}

  /**
   * Whether the password is right. The attempt is counted as failed before the password is looked at and
   * struck out when it was right: of many attempts at once, no more than the limit are looked at.
   * @param email of the account, normalised
   * @param address the caller's
   * @throws AppError 429 when the limit is reached, whatever the password
   */
  async check(email: string, address: string, storedHash: string | null, password: string): Promise<boolean> {
    const keys = { account: this.accountKey(email), address: this.key('address', stableAddress(address)) };
    await this.take(keys);
    const right = await verifyPassword(storedHash, password);
    if (right) await this.attempts.clear(keys);
    return right;
  }

  /** Forgets the failures of an account whose owner proved themselves in another way. */
  async forgive(email: string): Promise<void> {
    await this.attempts.clearAccount(this.accountKey(email));
  }

  private async take(keys: AttemptKeys): Promise<void> {
    await this.database.transaction(async () => {
      const now = new Date();
      const since = new Date(now.getTime() - WINDOW_MS);
      await this.attempts.lock(keys);
      await this.attempts.forgetBefore(since);
      const failures = await this.attempts.failuresSince(keys, since);
      const oldest = failures.at(-MOST_FAILURES);
      if (oldest) throw tooMany(oldest.getTime() + WINDOW_MS - now.getTime());
      await this.attempts.add(keys, now);
    });
  }

  private accountKey(email: string): string {
    return this.key('account', email);
  }

  /** Keyed, so that the table can't be turned back into addresses by trying them all. */
  private key(kind: string, value: string): string {
    return createHmac('sha256', this.env.SESSION_SECRET).update(`${kind}:${value}`).digest('hex');
  }
}

function tooMany(waitMs: number): AppError {
  const seconds = Math.max(1, Math.ceil(waitMs / 1000));
  const minutes = Math.ceil(seconds / 60);
  const wait = minutes === 1 ? 'a minute' : `${minutes} minutes`;
  return new AppError(
    429,
    'too-many-attempts',
    `There were too many failed attempts. Please wait ${wait}, or use “Forgotten password”.`,
    { retryAfterSeconds: seconds },
    { 'Retry-After': String(seconds) },
  );
}
