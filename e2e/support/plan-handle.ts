import type { Page } from '@playwright/test';

export interface Point {
  readonly x: number;
  readonly y: number;
}

/** A record of the plan, as far as tests look into it. */
export interface PlanRecord {
  readonly id: string;
  readonly kind: string;
  readonly number?: number;
  readonly name?: string;
  readonly at?: Point;
  readonly points?: readonly Point[];
  readonly fromId?: string;
  readonly toId?: string;
  readonly runId?: string | null;
  readonly via?: readonly Point[];
  readonly style?: string;
  readonly use?: string;
  readonly heightMeters?: number;
  readonly aim?: { readonly kind: string; readonly heightMeters?: number } | null;
  readonly measuredMeters?: number | null;
  readonly markedToMarked?: boolean;
  readonly references?: readonly { readonly kind: string }[];
}

/** What test builds let tests know of the drawing, whose shapes no selector finds. */
interface PlanHandle {
  records(): PlanRecord[];
  windowPoint(p: Point): Point;
  camera(): { readonly x: number; readonly y: number; readonly zoom: number };
  selection(): string[];
  volts(): Record<string, number>;
  settled(): Promise<void>;
}

declare global {
  interface Window {
    __plan?: PlanHandle;
  }
}

export const whenOpen = (page: Page) => page.waitForFunction(() => window.__plan !== undefined);

export const recordsOf = (page: Page): Promise<PlanRecord[]> => page.evaluate(() => window.__plan!.records());

export const selectionOf = (page: Page): Promise<string[]> => page.evaluate(() => window.__plan!.selection());

export const zoomOf = (page: Page): Promise<number> => page.evaluate(() => window.__plan!.camera().zoom);

export const windowPointOf = (page: Page, p: Point): Promise<Point> =>
  page.evaluate((at) => window.__plan!.windowPoint(at), p);

/** Volts by fixture id, once no estimate is waiting or under way. */
export const settledVolts = (page: Page): Promise<Record<string, number>> =>
  page.evaluate(async () => {
    await window.__plan!.settled();
    return window.__plan!.volts();
  });
