import { expect, type Page } from '@playwright/test';
import { type Point, windowPointOf, zoomOf } from './plan-handle.js';

/** The most that one turn of the wheel is taken for, and what it does to the zoom. */
const TURN = 200;
const ZOOM_PER_PIXEL = 0.0016;

/** A place in the window where the drawing lies bare of panels and bars, near its middle. */
export function bareSpot(page: Page): Promise<Point> {
  return page.evaluate(() => {
    const frame = document.querySelector('[data-testid="plan-canvas"]');
    if (frame === null) throw new Error('There is no drawing on this page.');
    const box = frame.getBoundingClientRect();
    const middle = { x: box.left + box.width / 2, y: box.top + box.height / 2 };
    const isBare = (x: number, y: number) => {
      const found = document.elementFromPoint(x, y);
      return found instanceof HTMLCanvasElement && frame.contains(found);
    };
    let best: { x: number; y: number } | null = null;
    let least = Number.POSITIVE_INFINITY;
    const step = 30;
    for (let x = box.left + step; x < box.right - step; x += step)
      for (let y = box.top + step; y < box.bottom - step; y += step) {
        const clear =
          isBare(x, y) &&
          isBare(x - step, y) &&
          isBare(x + step, y) &&
          isBare(x, y - step) &&
          isBare(x, y + step);
        const distance = Math.hypot(x - middle.x, y - middle.y);
        if (clear && distance < least) {
          best = { x, y };
          least = distance;
        }
      }
    if (best === null) throw new Error('The drawing is covered.');
    return best;
  });
}

/** Whether a click at a place in the window reaches the drawing. */
export function isBare(page: Page, at: Point): Promise<boolean> {
  return page.evaluate(({ x, y }) => {
    const found = document.elementFromPoint(x, y);
    const frame = document.querySelector('[data-testid="plan-canvas"]');
    return found instanceof HTMLCanvasElement && frame?.contains(found) === true;
  }, at);
}

/**
 * Turns the wheel, and moves two fingers on the trackpad, until a place of the sheet is in the clear, so large;
 * so many pixels of the window beside the middle.
 */
export async function lookAt(page: Page, place: Point, zoom: number, beside = 0): Promise<void> {
  const middle = await bareSpot(page);
  const spot = { x: middle.x + beside, y: middle.y };
  await page.mouse.move(spot.x, spot.y);
  for (;;) {
    const before = await zoomOf(page);
    const wanted = -Math.log(zoom / before) / ZOOM_PER_PIXEL;
    if (Math.abs(wanted) < 60) break;
    await page.mouse.wheel(0, Math.round(Math.max(-TURN, Math.min(TURN, wanted))));
    await expect.poll(() => zoomOf(page)).not.toBe(before);
  }
  const from = await windowPointOf(page, place);
  const dx = from.x - spot.x;
  const dy = from.y - spot.y;
  if (Math.hypot(dx, dy) < 1) return;
  // A sideways part marks it as a trackpad's move, however small.
  await page.mouse.wheel(dx === 0 ? 0.5 : dx, dy);
  await expect
    .poll(async () => {
      const at = await windowPointOf(page, place);
      return Math.hypot(at.x - spot.x, at.y - spot.y);
    })
    .toBeLessThan(2);
}
