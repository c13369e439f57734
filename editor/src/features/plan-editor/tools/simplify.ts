import type { Point } from '../../../plan-view/camera';
import { nearestOn } from './hit';

/**
 * A hand-drawn line with as few points as keep it within `tolerance` of itself (Douglas and Peucker's method,
 * with a stack in place of recursion, so that a long scribble can't exhaust it).
 */
export function simplify(points: readonly Point[], tolerance: number): Point[] {
  if (points.length <= 2) return [...points];
  const keep = new Uint8Array(points.length);
  keep[0] = 1;
  keep[points.length - 1] = 1;
  const todo: [number, number][] = [[0, points.length - 1]];
  for (let span = todo.pop(); span !== undefined; span = todo.pop()) {
    const [from, to] = span;
    let farthest = -1;
    let most = tolerance;
    for (let i = from + 1; i < to; i++) {
      const d = nearestOn([points[from]!, points[to]!], points[i]!)?.distance ?? 0;
      if (d > most) {
        most = d;
        farthest = i;
      }
    }
    if (farthest < 0) continue;
    keep[farthest] = 1;
    todo.push([from, farthest], [farthest, to]);
  }
  return points.filter((_, i) => keep[i] === 1);
}
