import { describe, expect, it } from 'vitest';
import { boxOf, frameOf, pixelOf, spotOf } from './sheet-box';
import { crowdedOf } from './use-crowded';
import { MOST_ZOOM, panned, showing, under, whole, zoomed } from './view';

describe('the part of a picture that is seen', () => {
  it('keeps what is under the fingers where it is', () => {
    const at = { x: 0.25, y: 0.7 };
    const near = zoomed(whole, 2, at);
    expect(under(near, at).x).toBeCloseTo(0.25);
    expect(under(near, at).y).toBeCloseTo(0.7);
  });

  it('never shows beyond the edges, however far it is dragged', () => {
    const near = zoomed(whole, 3);
    for (const [dx, dy] of [
      [9, 9],
      [-9, -9],
    ] as const) {
      const { x, y } = panned(near, dx, dy);
      expect(x).toBeLessThanOrEqual(0);
      expect(x + 3).toBeGreaterThanOrEqual(1);
      expect(y).toBeLessThanOrEqual(0);
      expect(y + 3).toBeGreaterThanOrEqual(1);
    }
  });

  it('zooms between the whole and the most', () => {
    expect(zoomed(whole, 0.5)).toEqual(whole);
    expect(zoomed(whole, 1000).zoom).toBe(MOST_ZOOM);
    expect(zoomed(zoomed(whole, 4, { x: 1, y: 1 }), 0.001)).toEqual(whole);
  });

  it('brings a light into sight, and leaves one that is seen alone', () => {
    const near = zoomed(whole, 4, { x: 0, y: 0 });
    const moved = showing(near, { x: 0.6, y: 0.6 });
    expect(moved.x + 0.6 * moved.zoom).toBeCloseTo(0.5);
    expect(showing(near, { x: 0.1, y: 0.1 })).toBe(near);
  });
});

describe('pixels of a sheet in the frame', () => {
  it.each([
    [2400, 1600],
    [1000, 3000],
    [4096, 1024],
  ])('go there and back for %i × %i', (widthPx, heightPx) => {
    const size = { widthPx, heightPx };
    for (const at of [
      { x: 0, y: 0 },
      { x: widthPx, y: heightPx },
      { x: 333, y: 777 },
    ]) {
      const spot = spotOf(size, at);
      expect(spot.x).toBeGreaterThanOrEqual(0);
      expect(spot.y).toBeLessThanOrEqual(1);
      expect(pixelOf(size, spot)).toEqual(at);
    }
  });

  it('stay on the picture where the frame is wider than it', () => {
    expect(pixelOf({ widthPx: 1000, heightPx: 3000 }, { x: 0, y: 0.5 })).toEqual({ x: 0, y: 1500 });
  });
});

describe('marks that stand close together', () => {
  const marks = [0.1, 0.13, 0.5].map((x) => ({ spot: { x, y: 0.5 } }));

  it('are told from those that have room, and have room themselves in a closer look', () => {
    const [left, right] = marks;
    expect(crowdedOf(marks, { widthPx: 350, heightPx: 230 })).toEqual(new Set([left, right]));
    expect(crowdedOf(marks, { widthPx: 1000, heightPx: 660 })).toEqual(new Set());
  });

  it('may be close on one side only', () => {
    const above = [0.4, 0.44].map((y) => ({ spot: { x: 0.2, y } }));
    expect(crowdedOf(above, { widthPx: 350, heightPx: 230 }).size).toBe(2);
    expect(crowdedOf(above, { widthPx: 350, heightPx: 700 }).size).toBe(0);
  });
});

describe('the frame', () => {
  it('has the shape of its picture, neither taller nor wider than looks well', () => {
    expect(frameOf({ widthPx: 1600, heightPx: 1100 })).toBeCloseTo(1600 / 1100);
    expect(frameOf({ widthPx: 1000, heightPx: 3000 })).toBe(4 / 5);
    expect(frameOf({ widthPx: 4000, heightPx: 1000 })).toBe(16 / 9);
    expect(boxOf({ widthPx: 1600, heightPx: 1100 })).toEqual({ left: 0, top: 0, width: 1, height: 1 });
  });
});
