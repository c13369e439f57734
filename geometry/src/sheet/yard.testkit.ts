import { type Meters, meters, pixels, type SheetPoint } from '../units/brand.js';
import { solveCalibration } from './calibration.js';
import type { RectangleReference, ScaleReference } from './references.js';
import type { SolvedScale } from './scale.js';

/**
 * A rendered yard: a ray-traced picture of a modelled garden, 2400 × 1600 px, so that the ground position
 * (metres) behind each of these pixels is exact. The pixels are rounded to 0.01.
 */
const yard = {
  'patio near left': { ground: [-3.6, 8.0], pixel: [786.09, 789.32] },
  'patio near right': { ground: [2.4, 8.0], pixel: [1392.94, 797.98] },
  'patio far right': { ground: [2.4, 11.6], pixel: [1379.13, 719.09] },
  'patio far left': { ground: [-3.6, 11.6], pixel: [869.12, 712.98] },
  'first slab near left': { ground: [0.8, 0.2], pixel: [1173.08, 1141.26] },
  'first slab near right': { ground: [1.6, 0.2], pixel: [1313.07, 1144.69] },
  'first slab far right': { ground: [1.6, 0.75], pixel: [1312.8, 1104.65] },
  'first slab far left': { ground: [0.8, 0.75], pixel: [1179.5, 1101.54] },
  'pond outer near left': { ground: [3.6, 1.9], pixel: [1619.11, 1038.71] },
  'pond outer near right': { ground: [7.6, 1.9], pixel: [2249.57, 1052.06] },
  'pond outer far right': { ground: [7.6, 6.3], pixel: [2001.05, 856.28] },
  'pond outer far left': { ground: [3.6, 6.3], pixel: [1538.01, 849.01] },
  'supply box foot': { ground: [2.75, 11.53], pixel: [1409.68, 720.75] },
  'right tree foot': { ground: [9.8, 7.6], pixel: [2191.66, 820.29] },
  'bed near right': { ground: [-4.4, 5.0], pixel: [594.54, 877.55] },
  'house right corner': { ground: [9.0, 11.6], pixel: [1958.3, 726.03] },
} as const satisfies Record<string, { ground: readonly [number, number]; pixel: readonly [number, number] }>;

export type YardName = keyof typeof yard;
export const yardNames = Object.keys(yard) as YardName[];

export const at = (x: number, y: number): SheetPoint => ({ x: pixels(x), y: pixels(y) });

export function yardPixel(name: YardName): SheetPoint {
  const [x, y] = yard[name].pixel;
  return at(x, y);
}

export function yardDistance(a: YardName, b: YardName): Meters {
  const [ax, ay] = yard[a].ground;
  const [bx, by] = yard[b].ground;
  return meters(Math.hypot(ax - bx, ay - by));
}

/** Moves a point as a click would; the identity for exact clicks. */
export type Click = (p: SheetPoint) => SheetPoint;
export const exactly: Click = (p) => p;

const rectangles = {
  patio: ['patio near left', 'patio near right', 'patio far right', 'patio far left'],
  slab: ['first slab near left', 'first slab near right', 'first slab far right', 'first slab far left'],
  pond: ['pond outer near left', 'pond outer near right', 'pond outer far right', 'pond outer far left'],
} as const satisfies Record<string, readonly [YardName, YardName, YardName, YardName]>;

export type YardRectangle = keyof typeof rectangles;
export const yardRectangleNames = Object.keys(rectangles) as YardRectangle[];

export function yardRectangle(name: YardRectangle, click: Click = exactly): RectangleReference {
  const [a, b, c, d] = rectangles[name];
  return {
    id: name,
    kind: 'rectangle',
    corners: [click(yardPixel(a)), click(yardPixel(b)), click(yardPixel(c)), click(yardPixel(d))],
    widthMeters: yardDistance(a, b),
    depthMeters: yardDistance(b, c),
  };
}

export function threeRectangles(click: Click = exactly): RectangleReference[] {
  return yardRectangleNames.map((name) => yardRectangle(name, click));
}

/** The scale of a photo that must be solvable. */
export function solvedPhoto(references: readonly ScaleReference[], clickSigmaPixels?: number): SolvedScale {
  const result = solveCalibration({ view: 'photo', references }, { clickSigmaPixels });
  if (!result.ok) throw new Error(result.message);
  return result.scale;
}

/** A seeded generator of uniform numbers in [0, 1) (mulberry32). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Clicks with a normal error of one standard deviation `sigma` in each coordinate (Box–Muller). */
export function noisy(random: () => number, sigma = 1): Click {
  return (p) => {
    const r = sigma * Math.sqrt(-2 * Math.log(1 - random()));
    const turn = 2 * Math.PI * random();
    return at(p.x + r * Math.cos(turn), p.y + r * Math.sin(turn));
  };
}
