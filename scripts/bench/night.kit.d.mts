import type { Page } from '@playwright/test';

/** How far two pictures are apart: of so many values, in steps of 255. */
export interface NightDifference {
  readonly values: number;
  readonly over1: number;
  readonly over3: number;
  readonly most: number;
  readonly mean: number;
}

export function onNightPage<T>(use: (page: Page) => Promise<T>): Promise<T>;
