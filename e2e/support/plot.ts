import type { Point } from './plan-handle.js';

/** Rendered at 200 dots per inch, 1 in = 10 ft is 20 pixels a foot. */
export const plotSize = { width: 2200, height: 3400 };

/** Corners of the pool, 22 × 14 ft, in pixels of that rendering: the middle of the drawn line. */
export const pool = {
  farLeft: { x: 986.5, y: 800 },
  farRight: { x: 1426.5, y: 800 },
  nearRight: { x: 1426.5, y: 1080 },
  nearLeft: { x: 986.5, y: 1080 },
} satisfies Record<string, Point>;
