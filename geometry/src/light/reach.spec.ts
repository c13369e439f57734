import { describe, expect, it } from 'vitest';
import type { Axis } from './aiming.js';
import { beamEdge, reachOf } from './reach.js';
import type { Crown, Wall } from './space.js';

const wall: Wall = { id: 'w', ax: -5, ay: 3, bx: 5, by: 3, heightMeters: 3 };
const crown: Crown = { id: 'c', x: 0, y: 0, z: 5, radiusMeters: 2, halfHeightMeters: 1.5 };
const nothing = { walls: [], crowns: [] };
const pose = (x: number, y: number, z: number, axis: Axis, treeId: string | null = null) => ({
  x,
  y,
  z,
  axis,
  treeId,
});
const slanted = (degreesFromDown: number): Axis => {
  const a = (degreesFromDown * Math.PI) / 180;
  return [0, Math.sin(a), -Math.cos(a)];
};

describe('what the middle of a beam meets', () => {
  it('is the ground below', () => {
    expect(reachOf(pose(1, 2, 4, [0, 0, -1]), nothing)).toEqual({
      on: 'ground',
      point: { x: 1, y: 2, z: 0 },
      meters: 4,
    });
    const { point, meters } = reachOf(pose(0, 0, 2, slanted(60)), nothing);
    expect(meters).toBeCloseTo(4, 12);
    expect(point.y).toBeCloseTo(2 * Math.sqrt(3), 12);
  });

  it('is a wall before the ground behind it, unless it passes over', () => {
    const low = reachOf(pose(0, 0, 2, slanted(80)), { walls: [wall], crowns: [] });
    expect(low).toMatchObject({ on: 'face', point: { y: expect.closeTo(3, 12) } });
    expect(reachOf(pose(0, 0, 6, slanted(80)), { walls: [wall], crowns: [] }).on).toBe('ground');
    expect(reachOf(pose(0, 0, 0.2, slanted(160)), { walls: [wall], crowns: [] }).on).toBe('nothing');
  });

  it('is the near side of a crown, but not of the one that it hangs in', () => {
    const space = { walls: [], crowns: [crown] };
    expect(reachOf(pose(0, 0, 0.1, [0, 0, 1]), space)).toMatchObject({
      on: 'tree',
      point: { z: expect.closeTo(3.5, 12) },
    });
    expect(reachOf(pose(0, 0, 3, [0, 0, 1], 'c'), space).on).toBe('nothing');
    expect(reachOf(pose(0, 0, 5, [0, 0, -1]), space).on).toBe('ground');
  });
});

describe('the edge of a beam', () => {
  // Cone Ø = 2·d·tan(β/2) at half intensity: the beam's own geometry.
  it.each([
    [4, 36],
    [2.5, 60],
    [0.5, 120],
  ])('%d m above the ground, %d° wide, is a circle of 2·d·tan(β/2)', (d, degrees) => {
    const down = pose(1, 1, d, [0, 0, -1]);
    const half = (degrees * Math.PI) / 360;
    const [edge, ...others] = beamEdge(down, half, reachOf(down, nothing), nothing);
    expect(others).toEqual([]);
    expect(edge!.at(-1)).toEqual(edge![0]);
    for (const p of edge!) {
      expect(p.z).toBeCloseTo(0, 12);
      expect(2 * Math.hypot(p.x - 1, p.y - 1)).toBeCloseTo(2 * d * Math.tan(half), 9);
    }
  });

  it('is an ellipse where the beam falls slanting, from the angles of its near and far edge', () => {
    const light = pose(0, 0, 3, slanted(40));
    const half = (15 * Math.PI) / 180;
    const ys = beamEdge(light, half, reachOf(light, nothing), nothing)
      .flat()
      .map((p) => p.y);
    expect(Math.min(...ys)).toBeCloseTo(3 * Math.tan((25 * Math.PI) / 180), 3);
    expect(Math.max(...ys)).toBeCloseTo(3 * Math.tan((55 * Math.PI) / 180), 3);
  });

  it('climbs the wall that it meets, and is left open where it passes over', () => {
    const light = pose(0, 2, 0.15, [0, Math.SQRT1_2, Math.SQRT1_2]);
    const reach = reachOf(light, { walls: [wall], crowns: [] });
    expect(reach.on).toBe('face');
    const edge = beamEdge(light, Math.PI / 5, reach, { walls: [wall] });
    expect(edge).toHaveLength(1);
    expect(edge[0]!.length).toBeGreaterThan(20);
    expect(edge[0]!.at(-1)).not.toEqual(edge[0]![0]);
    for (const p of edge[0]!) {
      expect(p.y).toBeLessThan(3 + 1e-9);
      expect(p.z).toBeLessThanOrEqual(3);
    }
  });

  it('is a circle across the beam where it goes into the air', () => {
    const up = pose(0, 0, 0, [0, 0, 1]);
    const [edge] = beamEdge(up, Math.PI / 5, reachOf(up, nothing), nothing);
    for (const p of edge!) {
      expect(p.z).toBeCloseTo(4, 9);
      expect(Math.hypot(p.x, p.y)).toBeCloseTo(4 * Math.tan(Math.PI / 5), 9);
    }
  });

  it('is only as much of a level beam as falls on the ground near by', () => {
    const light = pose(0, 0, 0.2, slanted(88));
    const edge = beamEdge(light, Math.PI / 10, reachOf(light, nothing), nothing).flat();
    expect(edge.length).toBeGreaterThan(10);
    for (const p of edge) expect(p.z).toBeCloseTo(0, 9);
  });

  it('is nowhere for light that goes all around', () => {
    const light = pose(0, 0, 1, [0, 0, -1]);
    expect(beamEdge(light, Number.POSITIVE_INFINITY, reachOf(light, nothing), nothing)).toEqual([]);
  });
});
