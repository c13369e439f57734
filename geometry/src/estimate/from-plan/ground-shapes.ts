import type { AreaRecord, PlanPoint } from '../../plan/index.js';
import type { SolvedScale } from '../../sheet/index.js';
import { type GroundPoint, meters } from '../../units/index.js';
import { sheetPoint } from './sheet-scale.js';

/** Corners of the least upright box around something. */
export interface Box {
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
}

export interface GroundArea {
  readonly area: AreaRecord;
  readonly points: readonly GroundPoint[];
  readonly box: Box;
}

/**
 * Points on the ground; null where one of them is not. Without a scale the sheet stands in: what lies inside
 * of what is the same there, only lengths mean nothing.
 */
export function onGround(scale: SolvedScale | null, points: readonly PlanPoint[]): GroundPoint[] | null {
  const ground: GroundPoint[] = [];
  for (const point of points) {
    const p = scale ? scale.groundFromSheet(sheetPoint(point)) : { x: meters(point.x), y: meters(-point.y) };
    if (!p) return null;
    ground.push(p);
  }
  return ground;
}

export function groundArea(scale: SolvedScale | null, area: AreaRecord): GroundArea | null {
  const points = onGround(scale, area.points);
  return points && { area, points, box: boxOf(points) };
}

export function boxOf(points: readonly GroundPoint[]): Box {
  const box = {
    minX: Number.POSITIVE_INFINITY,
    minY: Number.POSITIVE_INFINITY,
    maxX: Number.NEGATIVE_INFINITY,
    maxY: Number.NEGATIVE_INFINITY,
  };
  for (const { x, y } of points) {
    box.minX = Math.min(box.minX, x);
    box.minY = Math.min(box.minY, y);
    box.maxX = Math.max(box.maxX, x);
    box.maxY = Math.max(box.maxY, y);
  }
  return box;
}

/** Whether two boxes come within so many metres of one another: a cheap no before the exact answer. */
export function near(a: Box, b: Box, distance: number): boolean {
  return (
    a.minX - b.maxX <= distance &&
    b.minX - a.maxX <= distance &&
    a.minY - b.maxY <= distance &&
    b.minY - a.maxY <= distance
  );
}
