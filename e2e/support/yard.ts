import type { Point } from './plan-handle.js';

/**
 * The yard photo is ray-traced from a modelled yard, so that true places are known: metres on the ground
 * (x to the right, y away from the camera) and pixels of the 2400 × 1600 photo.
 */
interface Landmark {
  readonly ground: Point;
  readonly pixel: Point;
}

const at = (gx: number, gy: number, px: number, py: number): Landmark => ({
  ground: { x: gx, y: gy },
  pixel: { x: px, y: py },
});

/** Each in order around, the near left corner first. */
export const patio = {
  widthMeters: 6,
  depthMeters: 3.6,
  corners: [
    at(-3.6, 8, 786.09, 789.32),
    at(2.4, 8, 1392.94, 797.98),
    at(2.4, 11.6, 1379.13, 719.09),
    at(-3.6, 11.6, 869.12, 712.98),
  ],
} as const;

export const pond = {
  widthMeters: 4,
  depthMeters: 4.4,
  corners: [
    at(3.6, 1.9, 1619.11, 1038.71),
    at(7.6, 1.9, 2249.57, 1052.06),
    at(7.6, 6.3, 2001.05, 856.28),
    at(3.6, 6.3, 1538.01, 849.01),
  ],
} as const;

export const supplyBox = at(2.75, 11.53, 1409.68, 720.75);

/** The pixel of a place on the ground, through the map that the corners of patio and pond fix. */
export function pixelOf(ground: Point): Point {
  const [h0, h1, h2, h3, h4, h5, h6, h7] = map;
  const w = h6 * ground.x + h7 * ground.y + 1;
  return { x: (h0 * ground.x + h1 * ground.y + h2) / w, y: (h3 * ground.x + h4 * ground.y + h5) / w };
}

/** The plane-to-plane map of four landmarks that lie far apart. */
const map = solve([patio.corners[0], patio.corners[2], pond.corners[1], pond.corners[3]]);

type Map8 = readonly [number, number, number, number, number, number, number, number];

function solve(marks: readonly Landmark[]): Map8 {
  const rows = marks.flatMap(({ ground: { x, y }, pixel: { x: u, y: v } }) => [
    [x, y, 1, 0, 0, 0, -u * x, -u * y, u],
    [0, 0, 0, x, y, 1, -v * x, -v * y, v],
  ]);
  for (let column = 0; column < 8; column++) {
    let pivot = column;
    for (let r = column + 1; r < 8; r++)
      if (Math.abs(rows[r]![column]!) > Math.abs(rows[pivot]![column]!)) pivot = r;
    [rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!];
    for (let r = 0; r < 8; r++) {
      if (r === column) continue;
      const share = rows[r]![column]! / rows[column]![column]!;
      for (let c = column; c < 9; c++) rows[r]![c]! -= share * rows[column]![c]!;
    }
  }
  const h = rows.map((row, i) => row[8]! / row[i]!);
  return [h[0]!, h[1]!, h[2]!, h[3]!, h[4]!, h[5]!, h[6]!, h[7]!];
}
