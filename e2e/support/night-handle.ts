import type { Page } from '@playwright/test';
import type { Point } from './plan-handle.js';

/** What test builds let tests know of the night picture, whose pixels no selector finds. */
interface NightHandle {
  settled(): Promise<void>;
  lightAt(p: Point): number | null;
}

declare global {
  interface Window {
    __night?: NightHandle;
  }
}

/** Lux on what the sheet shows at its places, red, green and blue added up, once no light is being worked out. */
export async function litAt(page: Page, places: readonly Point[]): Promise<number[]> {
  await page.waitForFunction(async (p) => {
    await window.__night?.settled();
    return (window.__night?.lightAt(p) ?? null) !== null;
  }, places[0]!);
  return page.evaluate((all) => all.map((p) => window.__night!.lightAt(p)!), places);
}
