import { describe, expect, it } from 'vitest';
import { Garden, pixelAt, square, yardPhoto } from './scene.testkit.js';
import { before, insideness, middleOf, spaceOf } from './space.js';

describe('a space', () => {
  it('has the walls of faces along their foot, and of buildings all around, under a roof', () => {
    const garden = new Garden();
    garden.face(
      [
        { x: 0, y: 0 },
        { x: 300, y: 0 },
        { x: 300, y: 400 },
      ],
      2.5,
    );
    garden.area('building', square(1000, 1000, 100), 6);
    const { walls, roofs } = spaceOf(garden.scene());
    expect(walls.map(({ heightMeters }) => heightMeters)).toEqual([2.5, 2.5, 6, 6, 6, 6]);
    expect(
      walls.map((w) => Math.hypot(w.bx - w.ax, w.by - w.ay)).map((m) => Math.round(m * 1e6) / 1e6),
    ).toEqual([3, 4, 2, 2, 2, 2]);
    expect(roofs).toHaveLength(1);
  });

  it('has a crown of the area of its outline seen from above', () => {
    const garden = new Garden();
    const id = garden.tree({ x: 500, y: 500 }, square(520, 500, 150), 7, 3);
    const [crown] = spaceOf(garden.scene()).crowns;
    expect(crown).toMatchObject({ id, z: 5, halfHeightMeters: 2 });
    expect(crown?.x).toBeCloseTo(5.2, 9);
    expect(Math.PI * (crown?.radiusMeters ?? 0) ** 2).toBeCloseTo(9, 9);
  });

  it('has a crown as wide as its silhouette, as far away as its foot', () => {
    const garden = new Garden(yardPhoto());
    // The right-hand tree of the rendered yard stands at (9.8, 7.6).
    const foot = pixelAt(garden.sheet, 9.8, 7.6);
    const left = pixelAt(garden.sheet, 8.3, 7.6).x;
    const right = pixelAt(garden.sheet, 11.3, 7.6).x;
    garden.tree(
      foot,
      [
        { x: left, y: foot.y - 500 },
        { x: right, y: foot.y - 500 },
        { x: (left + right) / 2, y: foot.y - 900 },
      ],
      6,
      2,
    );
    const [crown] = spaceOf(garden.scene()).crowns;
    expect(crown?.radiusMeters).toBeCloseTo(1.5, 1);
    expect(Math.hypot((crown?.x ?? 0) - 9.8, (crown?.y ?? 0) - 7.6)).toBeLessThan(0.1);
  });

  it('leaves out marks above the horizon, and a roof that is not all on the ground', () => {
    const garden = new Garden(yardPhoto());
    const ground = pixelAt(garden.sheet, 0, 4);
    garden.face([ground, { x: ground.x, y: 2 }], 3);
    garden.tree({ x: 1200, y: 2 }, square(1200, 2, 50), 4, 1);
    garden.area('building', [ground, pixelAt(garden.sheet, 3, 4), { x: 1200, y: 2 }], 4);
    const space = spaceOf(garden.scene());
    expect(space.crowns).toEqual([]);
    expect(space.roofs).toEqual([]);
    expect(space.walls).toHaveLength(1);
  });
});

describe('points and crowns', () => {
  it('moves a point of an upright surface before it, level, and leaves the ground', () => {
    const p = { x: 1, y: 2, z: 3 };
    expect(before(p, { x: 0, y: 0, z: 1 })).toEqual(p);
    const off = before(p, { x: -0.6, y: 0, z: 0.8 });
    expect(off).toEqual({ x: 0.7, y: 2, z: 3 });
  });

  it('is on a crown’s surface where insideness is 1', () => {
    const crown = { id: 't', x: 0, y: 0, z: 5, radiusMeters: 2, halfHeightMeters: 3 };
    expect(insideness(crown, { x: 2, y: 0, z: 5 })).toBeCloseTo(1, 12);
    expect(insideness(crown, { x: 0, y: 0, z: 8 })).toBeCloseTo(1, 12);
    expect(insideness(crown, { x: 0, y: 0, z: 5 })).toBe(0);
  });

  it('finds area and middle of a polygon either way round', () => {
    const corners = square(3, -2, 4);
    for (const points of [corners, corners.toReversed()])
      expect(middleOf(points)).toEqual({ area: 64, x: 3, y: -2 });
  });
});
