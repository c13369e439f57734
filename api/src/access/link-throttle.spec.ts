import { describe, expect, it } from 'vitest';
import { AppError } from '../http/app-error.js';
import { LinkThrottle } from './link-throttle.js';

const MINUTE = 60_000;

function refusal(throttle: LinkThrottle, address: string, now: number): AppError | null {
  try {
    throttle.demandPatience(address, now);
    return null;
  } catch (error) {
    if (error instanceof AppError) return error;
    throw error;
  }
}

describe('the throttle of links', () => {
  it('stops an address after 20 wrong tokens, until 15 minutes have passed', () => {
    const throttle = new LinkThrottle();
    for (let i = 0; i < 20; i += 1) {
      expect(refusal(throttle, '192.0.2.1', i)).toBeNull();
      throttle.countWrong('192.0.2.1', i);
    }
    const refused = refusal(throttle, '192.0.2.1', 5 * MINUTE);
    expect(refused).toMatchObject({ status: 429, headers: { 'Retry-After': '600' } });
    expect(refused?.message).toContain('10 minutes');
    expect(refusal(throttle, '192.0.2.2', 5 * MINUTE)).toBeNull();
    expect(refusal(throttle, '192.0.2.1', 15 * MINUTE)).toBeNull();
  });

  it('takes the first 64 bits of an IPv6 address for the caller', () => {
    const throttle = new LinkThrottle();
    for (let i = 0; i < 20; i += 1) throttle.countWrong(`2001:db8::${i.toString(16)}`, 0);
    expect(refusal(throttle, '2001:db8::ffff', 1)).not.toBeNull();
    expect(refusal(throttle, '2001:db8:0:1::1', 1)).toBeNull();
  });

  it('forgets who was wrong longest ago rather than growing without end', () => {
    const throttle = new LinkThrottle();
    for (let i = 0; i < 20; i += 1) throttle.countWrong('192.0.2.1', 0);
    for (let i = 0; i < 9_999; i += 1) throttle.countWrong(`10.0.${i >> 8}.${i & 255}`, 1);
    expect(refusal(throttle, '192.0.2.1', 2)).not.toBeNull();
    throttle.countWrong('10.99.0.1', 2);
    expect(throttle.size).toBe(10_000);
    expect(refusal(throttle, '192.0.2.1', 2)).toBeNull();
  });
});
