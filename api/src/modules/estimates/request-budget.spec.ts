import { describe, expect, it } from 'vitest';
import { AppError } from '../../http/app-error.js';
import { RequestBudget } from './request-budget.js';

const grantedOf = (budget: RequestBudget, userId: string, times: readonly number[]) =>
  times.filter((now) => {
    budget.clock = () => now;
    try {
      budget.spend(userId);
      return true;
    } catch (error) {
      expect(error).toBeInstanceOf(AppError);
      expect(error).toMatchObject({ status: 429, headers: { 'Retry-After': '1' } });
      return false;
    }
  }).length;

describe('RequestBudget', () => {
  it('grants fifty a second for as long as anyone likes', () => {
    const times = Array.from({ length: 50 * 60 }, (_, i) => i * 20);
    expect(grantedOf(new RequestBudget(), 'a', times)).toBe(times.length);
  });

  it('grants fifty at once in every second', () => {
    const times = Array.from({ length: 50 * 20 }, (_, i) => 1000 * Math.floor(i / 50));
    expect(grantedOf(new RequestBudget(), 'a', times)).toBe(times.length);
  });

  it('refuses a flood of one person, and nobody else', () => {
    const budget = new RequestBudget();
    const flood = Array.from({ length: 1000 }, () => 5000);
    const granted = grantedOf(budget, 'a', flood);
    expect(granted).toBeGreaterThanOrEqual(50);
    expect(granted).toBeLessThan(200);
    expect(grantedOf(budget, 'b', [5000])).toBe(1);
    expect(grantedOf(budget, 'a', [6000])).toBe(1);
  });

  it('forgets people who have been away', () => {
    const budget = new RequestBudget();
    for (let i = 0; i < 30_000; i++) {
      budget.clock = () => i;
      budget.spend(`u${i}`);
    }
    expect(grantedOf(budget, 'u0', [40_000])).toBe(1);
  });
});
