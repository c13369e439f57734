import type { Page } from '@playwright/test';
import sharp from 'sharp';
import type { Point } from './plan-handle.js';

export type Colour = readonly [red: number, green: number, blue: number];

/** What a dim fixture's mark, and the edge of its label, is drawn in. */
export const dimBlue: Colour = [0x00, 0x72, 0xb2];

/** Thin lines are mixed with what is under them; nothing else on the yard photo is so blue. */
const MIXED = 40;

/** How many pixels of a colour a person sees in a square around a place of the window. */
export async function pixelsOf(page: Page, colour: Colour, around: Point, reach: number): Promise<number> {
  const left = Math.max(0, Math.round(around.x - reach));
  const top = Math.max(0, Math.round(around.y - reach));
  const png = await page.screenshot({ clip: { x: left, y: top, width: 2 * reach, height: 2 * reach } });
  const { data, info } = await sharp(png).removeAlpha().raw().toBuffer({ resolveWithObject: true });
  let found = 0;
  for (let i = 0; i < data.length; i += info.channels)
    if (colour.every((part, k) => Math.abs(part - data[i + k]!) <= MIXED)) found += 1;
  return found;
}
