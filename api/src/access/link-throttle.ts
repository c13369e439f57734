import { Injectable } from '@nestjs/common';
import { AppError } from '../http/app-error.js';
import { stableAddress } from './caller-address.js';

const MOST_WRONG = 20;
const WINDOW_MS = 15 * 60_000;
/** Above this the address that was wrong longest ago is forgotten: memory stays small under a flood. */
const MOST_ADDRESSES = 10_000;

interface Wrong {
  readonly count: number;
  readonly since: number;
}

/**
 * Counts tokens that were never given, by address: 20 in 15 minutes, then that address waits. A token has 256
 * bits, so this keeps guessers from keeping the database busy rather than from guessing right. That is why it
 * may live in the memory of each process: opening a page must not write to the database, and a count that a
 * restart forgets costs nothing.
 */
@Injectable()
export class LinkThrottle {
  /** In the order of the last wrong try. */
  private readonly wrong = new Map<string, Wrong>();

  /** @throws AppError 429 for an address that was wrong too often, whatever it asks for now */
  demandPatience(address: string, now = Date.now()): void {
    const found = this.present(stableAddress(address), now);
    if (!found || found.count < MOST_WRONG) return;
    const seconds = Math.max(1, Math.ceil((found.since + WINDOW_MS - now) / 1000));
    const minutes = Math.ceil(seconds / 60);
    throw new AppError(
      429,
      'too-many-attempts',
      `Too many links that do not exist were tried from here. Please wait ${minutes === 1 ? 'a minute' : `${minutes} minutes`} and open your link again.`,
      { retryAfterSeconds: seconds },
      { 'Retry-After': String(seconds) },
    );
  }

  countWrong(address: string, now = Date.now()): void {
    const key = stableAddress(address);
    const { count, since } = this.present(key, now) ?? { count: 0, since: now };
    this.wrong.delete(key);
    this.wrong.set(key, { count: count + 1, since });
    if (this.wrong.size <= MOST_ADDRESSES) return;
    const [oldest] = this.wrong.keys();
    if (oldest !== undefined) this.wrong.delete(oldest);
  }

  /** How many addresses it remembers. */
  get size(): number {
    return this.wrong.size;
  }

  private present(key: string, now: number): Wrong | null {
    const found = this.wrong.get(key);
    if (!found) return null;
    if (now - found.since < WINDOW_MS) return found;
    this.wrong.delete(key);
    return null;
  }
}
