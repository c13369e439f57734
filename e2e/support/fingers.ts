import type { CDPSession, Page } from '@playwright/test';
import type { Point } from './plan-handle.js';

/** Fingers on the glass; the browser's own touch events, not made-up DOM events. */
export class Fingers {
  private constructor(private readonly session: CDPSession) {}

  static async of(page: Page): Promise<Fingers> {
    return new Fingers(await page.context().newCDPSession(page));
  }

  put(...at: readonly Point[]): Promise<unknown> {
    return this.send('touchStart', at);
  }

  move(...at: readonly Point[]): Promise<unknown> {
    return this.send('touchMove', at);
  }

  lift(): Promise<unknown> {
    return this.send('touchEnd', []);
  }

  private send(type: 'touchStart' | 'touchMove' | 'touchEnd', at: readonly Point[]): Promise<unknown> {
    return this.session.send('Input.dispatchTouchEvent', {
      type,
      touchPoints: at.map(({ x, y }, id) => ({ x, y, id })),
    });
  }
}
