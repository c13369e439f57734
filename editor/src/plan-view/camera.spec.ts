import { describe, expect, it } from 'vitest';
import { fitBox, MAX_ZOOM, markRadius, toSheet, toWindow, zoomAt } from './camera';

describe('the camera', () => {
  it('goes to the window and back', () => {
    const camera = { x: 30, y: -12, zoom: 0.37 };
    const p = { x: 812.5, y: 99.25 };
    const back = toSheet(camera, toWindow(camera, p));
    expect(back.x).toBeCloseTo(p.x, 9);
    expect(back.y).toBeCloseTo(p.y, 9);
  });

  it('keeps what lies under the pointer where it is while it zooms', () => {
    const camera = { x: 30, y: -12, zoom: 0.37 };
    const anchor = { x: 500, y: 300 };
    const before = toSheet(camera, anchor);
    const after = toSheet(zoomAt(camera, anchor, 1.7), anchor);
    expect(after.x).toBeCloseTo(before.x, 9);
    expect(after.y).toBeCloseTo(before.y, 9);
    expect(zoomAt(camera, anchor, 1e9).zoom).toBe(MAX_ZOOM);
  });

  it('fits a box into the middle, no closer than asked', () => {
    const window = { width: 1000, height: 500 };
    const camera = fitBox({ left: 0, top: 0, right: 2000, bottom: 500 }, window);
    expect(camera.zoom).toBeCloseTo(0.46);
    expect(toWindow(camera, { x: 1000, y: 250 })).toEqual({ x: 500, y: 250 });
    expect(fitBox({ left: 5, top: 5, right: 5, bottom: 5 }, window, 2).zoom).toBe(2);
  });

  it('keeps marks of one size from near, and smaller ones from far', () => {
    expect(markRadius({ x: 0, y: 0, zoom: 4 })).toBe(13);
    expect(markRadius({ x: 0, y: 0, zoom: 0.3 })).toBe(13);
    expect(markRadius({ x: 0, y: 0, zoom: 0.1 })).toBeLessThan(8);
    expect(markRadius({ x: 0, y: 0, zoom: 0.001 })).toBe(5);
  });
});
