import { Injectable } from '@nestjs/common';
import { AppError } from '../../http/app-error.js';

/** A person may ask this often a second without end … */
const PER_SECOND = 60;
/** … and this often at once: a page that was asleep, or a program's first burst. */
const AT_ONCE = 120;
/** Forget full budgets from this many on, so that memory does not grow with every person who ever asked. */
const KEPT = 10_000;

interface Budget {
  left: number;
  at: number;
}

/**
 * How often each person may ask for an estimate: a bucket that fills steadily. Kept in this process alone; several
 * API processes give a person as many budgets.
 */
@Injectable()
export class RequestBudget {
  private readonly budgets = new Map<string, Budget>();
  /** Milliseconds from any beginning; tests stop it. */
  clock: () => number = () => performance.now();

  /** @throws AppError 429 with Retry-After when the person's budget is used up */
  spend(userId: string): void {
    const now = this.clock();
    const budget = this.budgets.get(userId) ?? { left: AT_ONCE, at: now };
    budget.left = refilled(budget, now);
    budget.at = now;
    if (budget.left < 1) {
      throw new AppError(
        429,
        'too-many-requests',
        `You may ask for ${PER_SECOND} estimates a second. Please wait a moment and ask again.`,
        {},
        { 'Retry-After': '1' },
      );
    }
    budget.left -= 1;
    this.budgets.set(userId, budget);
    if (this.budgets.size > KEPT) this.forgetFull(now);
  }

  private forgetFull(now: number): void {
    for (const [userId, budget] of this.budgets) {
      if (refilled(budget, now) >= AT_ONCE) this.budgets.delete(userId);
    }
  }
}

const refilled = ({ left, at }: Budget, now: number): number =>
  Math.min(AT_ONCE, left + ((now - at) / 1000) * PER_SECOND);
