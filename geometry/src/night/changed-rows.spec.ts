import { describe, expect, it } from 'vitest';
import { rowsThatDiffer } from './changed-rows.js';
import { composeNight, composeRows } from './compose.js';
import type { LightMap } from './layers.js';
import { lookAt } from './look.js';

const map = (width: number, height: number): LightMap => ({
  view: 'photo',
  width,
  height,
  rgba: new Float32Array(width * height * 4).fill(2),
  leaves: new Uint8Array(width * height),
  version: 1,
});

/** The same light with one pixel of the map brighter. */
function lit(light: LightMap, x: number, y: number): LightMap {
  const rgba = light.rgba.slice();
  rgba[(y * light.width + x) * 4] = 30;
  return { ...light, rgba, version: light.version + 1 };
}

describe('rows that differ', () => {
  it.each([
    { height: 32, y: 0 },
    { height: 32, y: 11 },
    { height: 32, y: 19 },
    { height: 20, y: 10 },
    { height: 33, y: 19 },
    { height: 11, y: 7 },
    { height: 117, y: 13 },
  ])('are all that a picture of $height rows needs anew for row $y of twenty', ({ height, y }) => {
    const width = 24;
    const photo = { width, height, data: new Uint8ClampedArray(width * height * 4).fill(150) };
    const look = lookAt(-12);
    const before = map(16, 20);
    const after = lit(before, 5, y);
    const picture = composeNight(photo, before, look, 40);
    const { from, to } = rowsThatDiffer(before, after, height);
    composeRows(photo, after, look, 40, picture, from, to);
    expect(picture).toEqual(composeNight(photo, after, look, 40));
    expect(to - from).toBeLessThanOrEqual(Math.ceil((3 * height) / 20) + 1);
  });

  it('are none for the same light', () => {
    const light = map(16, 20);
    const { from, to } = rowsThatDiffer(light, { ...light, rgba: light.rgba.slice() }, 50);
    expect(to - from).toBe(0);
  });

  it('are all where the map or its leaves are others', () => {
    const light = map(16, 20);
    expect(rowsThatDiffer(light, map(8, 10), 50)).toEqual({ from: 0, to: 50 });
    const leaves = new Uint8Array(16 * 20).fill(9);
    expect(rowsThatDiffer(light, { ...light, leaves }, 50)).toEqual({ from: 0, to: 50 });
  });
});
