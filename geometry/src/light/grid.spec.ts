import { describe, expect, it } from 'vitest';
import { pathLight, seeded } from '../plan/plan.testkit.js';
import type { PlanePoint } from '../sheet/matrix3.js';
import { luxAlong, luxOnSheet, luxWithin, MOST_SAMPLES, placeAlong } from './grid.js';
import { groundLux } from './illuminance.js';
import { building, lamp, spaceWith, towards } from './light.testkit.js';
import { Garden, pixelAt, yardPhoto } from './scene.testkit.js';
import { spaceOf } from './space.js';

const rectangle = (x: number, y: number, w: number, h: number): PlanePoint[] => [
  { x, y },
  { x: x + w, y },
  { x: x + w, y: y + h },
  { x, y: y + h },
];

/** Path lights 0.5 m high along the x axis, every so many metres. */
const row = (count: number, apart: number) =>
  Array.from({ length: count }, (_, i) => lamp([i * apart, 0, 0.5], { lumens: 190 }, 120));

describe('light along a path', () => {
  it('is that of the places it looked at, from its start to its end', () => {
    const space = spaceWith({ sources: row(4, 3) });
    const figures = luxAlong(space, [
      { x: 0, y: 0.6 },
      { x: 9, y: 0.6 },
    ])!;
    expect(figures.samples[0]?.alongMeters).toBe(0);
    expect(figures.samples.at(-1)?.alongMeters).toBe(9);
    for (const { x, y, lux } of figures.samples) expect(lux).toBe(groundLux(space, x, y));
    const all = figures.samples.map(({ lux }) => lux);
    expect(figures.least.lux).toBe(Math.min(...all));
    expect(figures.most.lux).toBe(Math.max(...all));
    expect(figures.meanLux).toBeCloseTo(all.reduce((a, b) => a + b, 0) / all.length, 9);
    expect(figures.uniformity).toBeCloseTo(figures.least.lux / figures.meanLux, 12);
    expect(figures.notes).toEqual([]);
    const ys = new Set(figures.samples.map(({ y }) => Math.round(y * 1e6) / 1e6));
    expect(Math.min(...ys)).toBeCloseTo(0.1, 6);
    expect(Math.max(...ys)).toBeCloseTo(1.1, 6);
  });

  it('has its mean between the mean and the most of a finer look, and misses no pool', () => {
    const sources = row(5, 2.5);
    const space = spaceWith({ sources });
    const figures = luxAlong(space, [
      { x: -1, y: 0.3 },
      { x: 11, y: 0.3 },
    ])!;
    let sum = 0;
    let most = 0;
    let count = 0;
    for (let x = -1; x <= 11; x += 0.02)
      for (let y = -0.2; y <= 0.8; y += 0.02) {
        const lux = groundLux(space, x, y);
        sum += lux;
        most = Math.max(most, lux);
        count += 1;
      }
    expect(figures.most.lux).toBeGreaterThan(0.8 * most);
    expect(Math.abs(figures.meanLux / (sum / count) - 1)).toBeLessThan(0.1);
  });

  it('looks more closely where pools are small, and only as closely as those on the path ask', () => {
    const line = [
      { x: 0, y: 0 },
      { x: 10, y: 0 },
    ];
    const wide = luxAlong(spaceWith({ sources: [lamp([5, 0, 4], { lumens: 400 }, 60)] }), line)!;
    const spot = luxAlong(spaceWith({ sources: [lamp([5, 0, 4], { lumens: 400 }, 10)] }), line)!;
    // The half-light radius of 10° from 4 m is 0.35 m.
    expect(spot.spacingMeters).toBeCloseTo((4 * Math.tan((5 * Math.PI) / 180)) / 2, 6);
    expect(wide.spacingMeters).toBeGreaterThan(0.9);
    const far = lamp([5, 40, 4], { lumens: 400 }, 10);
    const both = luxAlong(spaceWith({ sources: [lamp([5, 0, 4], { lumens: 400 }, 60), far] }), line)!;
    expect(both.spacingMeters).toBe(wide.spacingMeters);
    expect(luxAlong(spaceWith({}), line)!.spacingMeters).toBe(1);
  });

  it('is null where there is no length, and dark where there is no light', () => {
    expect(
      luxAlong(spaceWith({}), [
        { x: 1, y: 1 },
        { x: 1, y: 1 },
      ]),
    ).toBeNull();
    const dark = luxAlong(spaceWith({}), [
      { x: 0, y: 0 },
      { x: 3, y: 0 },
    ])!;
    expect([dark.least.lux, dark.meanLux, dark.uniformity]).toEqual([0, 0, 0]);
  });

  it('follows its bends', () => {
    const line = [
      { x: 0, y: 0 },
      { x: 3, y: 0 },
      { x: 3, y: 0 },
      { x: 3, y: 4 },
    ];
    expect(placeAlong(line, 0)).toEqual({ x: 0, y: 0, nx: -0, ny: 1 });
    expect(placeAlong(line, 5)).toMatchObject({ x: 3, y: 2, nx: -1 });
    expect(placeAlong(line, 99)).toMatchObject({ x: 3, y: 4 });
  });
});

describe('light in an area', () => {
  it('has a mean that agrees with random places', () => {
    const seed = 11;
    const random = seeded(seed);
    const sources = Array.from({ length: 6 }, () =>
      lamp([8 * random(), 6 * random(), 2 + 2 * random()], { lumens: 300 }, 50 + 60 * random(), {
        axis: towards(random() - 0.5, random() - 0.5, -1),
      }),
    );
    const space = spaceWith({ sources });
    // An L of 8 × 6 m with a corner of 4 × 3 m missing.
    const corners = [
      { x: 0, y: 0 },
      { x: 8, y: 0 },
      { x: 8, y: 3 },
      { x: 4, y: 3 },
      { x: 4, y: 6 },
      { x: 0, y: 6 },
    ];
    const figures = luxWithin(space, corners)!;
    let sum = 0;
    const count = 40_000;
    for (let i = 0; i < count; ) {
      const [x, y] = [8 * random(), 6 * random()];
      if (x > 4 && y > 3) continue;
      sum += groundLux(space, x, y);
      i += 1;
    }
    expect(Math.abs(figures.meanLux / (sum / count) - 1), `seed ${seed}`).toBeLessThan(0.04);
    expect(figures.samples.every(({ x, y }) => x < 4 || y < 3)).toBe(true);
  });

  it('finds the bright middle of every pool', () => {
    const seed = 5;
    const random = seeded(seed);
    for (let round = 0; round < 25; round++) {
      const source = lamp(
        [10 * random(), 10 * random(), 0.4 + 4 * random()],
        { lumens: 300 },
        8 + 100 * random(),
        {
          axis: towards(0.5 * (random() - 0.5), 0.5 * (random() - 0.5), -1),
        },
      );
      const space = spaceWith({ sources: [source] });
      const figures = luxWithin(space, rectangle(-1, -1, 12, 12))!;
      let most = 0;
      const reach = 1.2 * source.z;
      for (let i = -60; i <= 60; i++)
        for (let j = -60; j <= 60; j++) {
          const [x, y] = [source.x + (i * reach) / 60, source.y + (j * reach) / 60];
          if (x > -1 && x < 11 && y > -1 && y < 11) most = Math.max(most, groundLux(space, x, y));
        }
      const capped = figures.notes.length > 0;
      expect(figures.most.lux, `seed ${seed}, round ${round}`).toBeGreaterThan((capped ? 0.3 : 0.75) * most);
    }
  });

  it('says when it looked less closely than it should, and never looks at more places than it says', () => {
    const space = spaceWith({ sources: row(20, 2) });
    const figures = luxWithin(space, rectangle(0, -20, 40, 40))!;
    expect(figures.samples.length).toBeLessThanOrEqual(MOST_SAMPLES);
    expect(figures.notes).toHaveLength(1);
    expect(figures.notes[0]).toMatch(
      /^Looked at every 0\.6\d m in place of every 0\.19 m, to keep to 4,000 places/,
    );
    const long = luxAlong(space, [
      { x: 0, y: 0 },
      { x: 4000, y: 0 },
    ])!;
    expect(long.samples.length).toBeLessThanOrEqual(MOST_SAMPLES);
    expect(long.notes).toHaveLength(1);
  });

  it('looks at a small area in a dozen places at least', () => {
    const figures = luxWithin(spaceWith({}), rectangle(0, 0, 0.6, 0.6))!;
    expect(figures.samples.length).toBeGreaterThanOrEqual(9);
    expect(
      luxWithin(spaceWith({}), [
        { x: 0, y: 0 },
        { x: 1, y: 0 },
        { x: 2, y: 0 },
      ]),
    ).toBeNull();
  });

  it('leaves places under a roof out and says so', () => {
    const house = building(
      [
        [0, 0],
        [5, 0],
        [5, 10],
        [0, 10],
      ],
      3,
    );
    const space = spaceWith({ ...house, sources: [lamp([7, 5, 4], { lumens: 900 }, 360)] });
    const figures = luxWithin(space, rectangle(0, 0, 10, 10))!;
    expect(figures.samples.every(({ x }) => x > 5)).toBe(true);
    expect(figures.least.lux).toBeGreaterThan(0);
    expect(figures.notes).toEqual(['50 % of it is under a roof and is left out.']);
    expect(luxWithin(space, rectangle(1, 1, 3, 3))).toBeNull();
  });
});

it('reads a path and an area off a photo in metres, and nothing above its horizon', () => {
  const garden = new Garden(yardPhoto());
  const at = pixelAt(garden.sheet, 0, 4);
  garden.light(pathLight, at.x, at.y);
  const scene = garden.scene();
  const space = spaceOf(scene);
  const points = [
    [-2, 4],
    [2, 4],
  ].map(([x, y]) => pixelAt(garden.sheet, x!, y!));
  const path = luxOnSheet(scene, space, { kind: 'path', points, widthMeters: 0.5 })!;
  expect(path.samples.at(-1)?.alongMeters).toBeCloseTo(4, 2);
  expect(path.most.x).toBeCloseTo(0, 0);
  const corners = rectangle(-1, 3, 2, 2).map(({ x, y }) => pixelAt(garden.sheet, x, y));
  const area = luxOnSheet(scene, space, { kind: 'area', points: corners })!;
  expect(area.most.lux).toBeGreaterThan(20);
  expect(luxOnSheet(scene, space, { kind: 'path', points: [points[0]!, { x: 1200, y: 2 }] })).toBeNull();
});
