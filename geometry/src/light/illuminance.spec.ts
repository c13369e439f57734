import { describe, expect, it } from 'vitest';
import { seeded } from '../plan/plan.testkit.js';
import { crownSurface, groundLux, leavesLux, luxAt } from './illuminance.js';
import { building, crown, down, lamp, randomAxis, spaceWith, towards, up, wall } from './light.testkit.js';
import type { LightSpace } from './space.js';

describe('illuminance', () => {
  it('of 1200 lm in all directions, 8 m up and 6 m aside, is 0.76 lx', () => {
    // Theraja, Electrical Technology III, example 49.1.
    const space = spaceWith({ sources: [lamp([0, 0, 8], { lumens: 1200 })] });
    expect(groundLux(space, 6, 0)).toBeCloseTo(0.76, 2);
  });

  it('in the middle of a row of four lamps of 200 cd, 10 m apart and 5 m up, is 6.16 lx', () => {
    // Theraja, Electrical Technology III, example 49.3.
    const sources = [0, 10, 20, 30].map((x) => lamp([x, 0, 5], { candela: 200 }));
    expect(groundLux(spaceWith({ sources }), 15, 0)).toBeCloseTo(6.16, 2);
  });

  it('of 100 candle power at a slant of 2 m and 45° is 17.678 lx', () => {
    // Chakrabarti, Power System Engineering, 4.4.2.
    const side = Math.SQRT2;
    const space = spaceWith({ sources: [lamp([0, 0, side], { candela: 100 })] });
    expect(groundLux(space, side, 0)).toBeCloseTo(17.678, 3);
  });

  it('goes with (I/h²)·cos³θ under a light that hangs, as the bell and the cosine have it', () => {
    // E = (I/h²)cos³θ: inverse square and cosine laws, elementary.
    const space = spaceWith({ sources: [lamp([0, 0, 3], { candela: 900 }, 60)] });
    for (const x of [0, 0.7, 1.7321, 4]) {
      const angle = Math.atan2(x, 3);
      const candela = 900 * 2 ** -((angle / (Math.PI / 6)) ** 2);
      expect(groundLux(space, x, 0)).toBeCloseTo((candela / 9) * Math.cos(angle) ** 3, 9);
    }
  });

  it('follows volts and quantity', () => {
    const one = spaceWith({ sources: [lamp([0, 0, 3], { candela: 100 })] });
    const three = spaceWith({
      sources: [lamp([0, 0, 3], { candela: 100 }, 360, { quantity: 3, output: 0.5 })],
    });
    expect(groundLux(three, 1, 1)).toBeCloseTo(1.5 * groundLux(one, 1, 1), 12);
    const dark = spaceWith({ sources: [lamp([0, 0, 3], { candela: 100 }, 360, { output: 0 })] });
    expect(groundLux(dark, 1, 1)).toBe(0);
  });

  it('stays finite at the lamp itself', () => {
    const space = spaceWith({ sources: [lamp([0, 0, 0.001], { candela: 100 })] });
    expect(groundLux(space, 0, 0)).toBeLessThan(100 / 0.05 ** 2 + 1);
    expect(groundLux(spaceWith({ sources: [lamp([0, 0, 0], { candela: 100 })] }), 0, 0)).toBe(0);
  });

  it('is the same all around a light that points down, and on both sides of the beam of a tilted one', () => {
    const straight = spaceWith({ sources: [lamp([2, 1, 3], { lumens: 300 }, 70)] });
    const one = groundLux(straight, 3.3, 1);
    for (let turn = 0; turn < 6.3; turn += 0.37)
      expect(groundLux(straight, 2 + 1.3 * Math.cos(turn), 1 + 1.3 * Math.sin(turn))).toBeCloseTo(one, 10);
    const tilted = spaceWith({
      sources: [lamp([0, 0, 2], { lumens: 300 }, 40, { axis: towards(3, 0, -2), shield: 0.5 })],
    });
    for (const [x, y] of [
      [2, 0.4],
      [4, 1.9],
      [0.5, 3],
    ] as const)
      expect(groundLux(tilted, x, y)).toBeCloseTo(groundLux(tilted, x, -y), 12);
  });

  it('of several lights together is the sum of each alone, walls and crowns included', () => {
    const seed = 41;
    const random = seeded(seed);
    const between = (a: number, b: number) => a + (b - a) * random();
    for (let round = 0; round < 20; round++) {
      const parts = {
        walls: [wall([between(-5, 5), between(-5, 5)], [between(-5, 5), between(-5, 5)], between(1, 4))],
        crowns: [crown([between(-5, 5), between(-5, 5), 3], between(0.5, 2), between(0.5, 2))],
      };
      const sources = Array.from({ length: 5 }, () =>
        lamp(
          [between(-6, 6), between(-6, 6), between(0.1, 5)],
          { lumens: between(50, 900) },
          between(10, 200),
          {
            axis: randomAxis(random),
          },
        ),
      );
      const all = spaceWith({ ...parts, sources });
      for (let i = 0; i < 30; i++) {
        const [x, y] = [between(-7, 7), between(-7, 7)];
        const alone = sources.map((source) => groundLux(spaceWith({ ...parts, sources: [source] }), x, y));
        expect(groundLux(all, x, y), `seed ${seed}`).toBeCloseTo(
          alone.reduce((a, b) => a + b, 0),
          9,
        );
      }
    }
  });
});

describe('what stops light', () => {
  it('lets it over a wall that is lower than the lamp, as far as the wall’s shadow ends', () => {
    const space = spaceWith({
      sources: [lamp([0, 0, 4], { candela: 1000 })],
      walls: [wall([5, -50], [5, 50], 2)],
    });
    expect(groundLux(space, 4.9, 0)).toBeGreaterThan(0);
    // From 4 m up over 2 m at 5 m, the shadow ends at 10 m: similar triangles.
    for (const x of [5.1, 6, 9, 9.9]) expect(groundLux(space, x, 0)).toBe(0);
    for (const x of [10.1, 12, 30]) expect(groundLux(space, x, 0)).toBeGreaterThan(0);
  });

  it('is nothing beside the ends of a wall', () => {
    const space = spaceWith({
      sources: [lamp([0, 0, 1], { candela: 1000 })],
      walls: [wall([5, -1], [5, 1], 3)],
    });
    expect(groundLux(space, 10, 0)).toBe(0);
    expect(groundLux(space, 10, 1.9)).toBe(0);
    expect(groundLux(space, 10, 2.1)).toBeGreaterThan(0);
  });

  it('lets nothing through the joint of two walls', () => {
    const walls = [wall([5, -3], [5, 0], 3), wall([5, 0], [5, 3], 3)];
    const space = spaceWith({ sources: [lamp([0, 0, 1], { candela: 1000 })], walls });
    expect(groundLux(space, 10, 0)).toBe(0);
    for (const turn of [0.1, 0.7, 1.3, 2.9, 4.4]) {
      const at = (r: number, a: number): [number, number] => [r * Math.cos(turn + a), r * Math.sin(turn + a)];
      const turned = [wall(at(5, -0.5), at(4, 0), 3), wall(at(4, 0), at(5, 0.5), 3)];
      const [x, y] = at(8, 0);
      expect(
        groundLux(spaceWith({ sources: [lamp([0, 0, 1], { candela: 1000 })], walls: turned }), x, y),
      ).toBe(0);
    }
  });

  it('lights the side of a wall that faces the lamp and not the other', () => {
    const space = spaceWith({
      sources: [lamp([0, 0, 0.1], { lumens: 400 }, 60, { axis: towards(1, 0, 1) })],
      walls: [wall([2, -5], [2, 5], 4)],
    });
    const point = { x: 2, y: 0.3, z: 2 };
    expect(luxAt(space, point, { x: -1, y: 0, z: 0 })).toBeGreaterThan(10);
    expect(luxAt(space, point, { x: 1, y: 0, z: 0 })).toBe(0);
  });

  it('lights a face although the building behind it is drawn a little before it', () => {
    const source = lamp([0, 0, 0.1], { lumens: 400 }, 60, { axis: towards(1, 0, 1) });
    const house = building(
      [
        [1.85, -5],
        [8, -5],
        [8, 5],
        [1.85, 5],
      ],
      4,
    );
    const space = spaceWith({
      sources: [source],
      ...house,
      walls: [...house.walls, wall([2, -5], [2, 5], 4, 'face')],
    });
    expect(luxAt(space, { x: 2, y: 0.3, z: 2 }, { x: -1, y: 0, z: 0 })).toBeGreaterThan(10);
    expect(luxAt(space, { x: 2.6, y: 0.3, z: 2 }, { x: -1, y: 0, z: 0 })).toBe(0);
  });

  it('is a crown between lamp and ground, which catches the light itself', () => {
    const tree = crown([3, 0, 2.5], 1.5, 1.5);
    const space = spaceWith({ sources: [lamp([0, 0, 2.5], { candela: 800 })], crowns: [tree] });
    expect(groundLux(space, 1, 0)).toBeGreaterThan(0);
    // Just beyond the crown along the ray through its middle; far below it, and beside it, light goes on.
    expect(luxAt(space, { x: 6, y: 0, z: 2.5 }, { x: -1, y: 0, z: 0 })).toBe(0);
    expect(luxAt(space, { x: 6, y: 3.5, z: 2.5 }, { x: -1, y: 0, z: 0 })).toBeGreaterThan(0);
    const lit = crownSurface(tree, Math.PI, 0);
    expect(lit.point.x).toBeCloseTo(1.5, 12);
    expect(luxAt(space, lit.point, lit.normal)).toBeCloseTo(800 / 1.5 ** 2, 6);
    const far = crownSurface(tree, 0, 0.3);
    expect(luxAt(space, far.point, far.normal)).toBe(0);
  });

  it('falls on leaves most on the side towards the lamp, by half on the edge of it, and not on the far side', () => {
    const tree = crown([3, 0, 2.5], 1.5, 1.5);
    const far = lamp([-97, 0, 2.5], { candela: 800 });
    const space = spaceWith({ sources: [far], crowns: [tree] });
    const on = (azimuth: number) => {
      const { point, normal } = crownSurface(tree, azimuth, 0);
      return leavesLux(space, point, normal);
    };
    expect(on(Math.PI)).toBeCloseTo(800 / 98.5 ** 2, 9);
    expect(on(Math.PI / 2) / on(Math.PI)).toBeCloseTo(0.5, 1);
    expect(on(0)).toBeLessThan(1e-9);
    const walled = spaceWith({ ...space, walls: [wall([0, -9], [0, 9], 6)] });
    const { point, normal } = crownSurface(tree, Math.PI, 0);
    expect(leavesLux(walled, point, normal)).toBe(0);
  });

  it('is not the crown that the lamp hangs in', () => {
    const tree = crown([0, 0, 4], 2, 2);
    const low = lamp([0.5, 0, 1.9], { lumens: 380 }, 60);
    const inside = lamp([0.5, 0, 4], { lumens: 380 }, 60);
    const above = { ...lamp([0.5, 0, 6.2], { lumens: 380 }, 60) };
    const lux = (source: ReturnType<typeof lamp>) =>
      groundLux(spaceWith({ sources: [source], crowns: [tree] }), 0.5, 0);
    expect(lux(low)).toBeGreaterThan(0);
    expect(lux(inside)).toBeGreaterThan(0);
    expect(lux(above)).toBe(0);
    expect(lux({ ...above, treeId: 'tree' })).toBeGreaterThan(0);
  });
});

/** A building of five to nine corners about a middle, which may fold inwards. */
function randomBuilding(random: () => number, x: number, y: number) {
  const count = 5 + Math.floor(random() * 5);
  const points = Array.from({ length: count }, (_, i): [number, number] => {
    const turn = ((i + 0.8 * random()) / count) * 2 * Math.PI;
    const r = 2 + 4 * random();
    return [x + r * Math.cos(turn), y + r * Math.sin(turn)];
  });
  return building(points, 2.5 + 5 * random());
}

function isInside({ roofs }: Pick<LightSpace, 'roofs'>, x: number, y: number): boolean {
  // Winding of the corners about the point: another rule than the one under test.
  return roofs.some(({ points }) => {
    let turn = 0;
    points.forEach((p, i) => {
      const q = points[(i + 1) % points.length]!;
      const [a, b] = [Math.atan2(p.y - y, p.x - x), Math.atan2(q.y - y, q.x - x)];
      turn += Math.atan2(Math.sin(b - a), Math.cos(b - a));
    });
    return Math.abs(turn) > Math.PI;
  });
}

describe('a building', () => {
  it('lets no light in from lamps around and above it, and none out from a lamp within', () => {
    const seed = 7;
    const random = seeded(seed);
    const between = (a: number, b: number) => a + (b - a) * random();
    let inside = 0;
    let lit = 0;
    for (let round = 0; round < 60; round++) {
      const house = randomBuilding(random, between(-2, 2), between(-2, 2));
      const { heightMeters } = house.roofs[0]!;
      const lamps = Array.from({ length: 25 }, () =>
        lamp([between(-10, 10), between(-10, 10), between(0, 12)], { candela: 5000 }, between(20, 360), {
          axis: randomAxis(random),
        }),
      );
      const within = (l: (typeof lamps)[number]) => isInside(house, l.x, l.y) && l.z < heightMeters;
      const around = spaceWith({ ...house, sources: lamps.filter((l) => !within(l)) });
      const indoors = spaceWith({ ...house, sources: lamps.filter(within) });
      for (let i = 0; i < 120; i++) {
        const point = { x: between(-7, 7), y: between(-7, 7), z: between(0, heightMeters - 0.001) };
        const normal = { x: 0, y: 0, z: random() < 0.5 ? 1 : -1 };
        const name = `seed ${seed}, round ${round}`;
        if (isInside(house, point.x, point.y)) {
          inside += 1;
          expect(luxAt(around, point, normal), name).toBe(0);
        } else {
          if (luxAt(around, point, normal) > 0) lit += 1;
          expect(luxAt(indoors, point, normal), name).toBe(0);
        }
      }
    }
    // The test would mean nothing without places inside, and without light outside.
    expect(inside).toBeGreaterThan(500);
    expect(lit).toBeGreaterThan(500);
  });

  it('is dark behind from a lamp that is lower than it', () => {
    const house = building(
      [
        [2, -20],
        [6, -20],
        [6, 20],
        [2, 20],
      ],
      3,
    );
    const space = spaceWith({
      ...house,
      sources: [lamp([0, 0, 2.9], { candela: 5000 }, 360, { axis: down })],
    });
    for (const x of [2.5, 5.9, 6.5, 20, 100]) expect(groundLux(space, x, 0)).toBe(0);
    const over = spaceWith({ ...house, sources: [lamp([0, 0, 6], { candela: 5000 }, 360, { axis: up })] });
    expect(groundLux(over, 5, 0)).toBe(0);
    expect(groundLux(over, 11, 0)).toBe(0);
    expect(groundLux(over, 13, 0)).toBeGreaterThan(0);
  });
});
