import { describe, expect, it } from 'vitest';
import type { FixtureItem } from '../catalogue/index.js';
import { pathLight } from '../plan/plan.testkit.js';
import { lumensOf } from './beam.js';
import { lampsOf } from './illuminance.js';
import { building, crown, lamp, spaceWith, towards, up } from './light.testkit.js';
import { lumensIntoTheSky, neighbourCautions } from './neighbours.js';
import { Garden, pixelAt, square, tilt, yardPhoto } from './scene.testkit.js';
import { beamOf, spaceOf } from './space.js';

const flood: FixtureItem = {
  ...(pathLight as Extract<FixtureItem, { light: 'integrated' }>),
  name: 'Flood light, 12 W',
  kind: 'flood',
  lumens: 1000,
  beamDegrees: 60,
  mountingHeightMeters: 2,
};

const cautionsOf = (garden: Garden) => {
  const scene = garden.scene();
  return neighbourCautions(garden.doc, scene, spaceOf(scene));
};

describe('light past the lot line', () => {
  function lot() {
    const garden = new Garden();
    garden.area('lot-line', square(1000, 1000, 500));
    return garden;
  }

  it('names the lamp and the place where it is worst', () => {
    const garden = lot();
    // The lot goes from 5 to 15 m; a flood 3 m inside of its right-hand edge, aimed out over it.
    const id = garden.light(flood, 1200, 1000, { aim: tilt({ x: 1600, y: 1000 }, 80) });
    const past = cautionsOf(garden).filter(({ kind }) => kind === 'past-the-lot-line');
    expect(past).toHaveLength(1);
    expect(past[0]?.recordIds).toEqual([id]);
    expect(past[0]?.at?.x).toBeCloseTo(15.5, 6);
    expect(past[0]?.at?.y).toBeCloseTo(-10, 0);
    expect(past[0]?.text).toMatch(
      /^F1 sends \d+ lx past the lot line, 3\.5 m from the light .* local rules decide\.$/,
    );
  });

  it('is not told of where light stays in, whichever way round the line was drawn', () => {
    for (const reverse of [false, true]) {
      const garden = new Garden();
      const corners = square(1000, 1000, 500);
      garden.area('lot-line', reverse ? corners.toReversed() : corners);
      garden.light(pathLight, 1000, 1000);
      garden.light(flood, 1000, 1000, { aim: tilt({ x: 1100, y: 1000 }, 0) });
      expect(cautionsOf(garden).filter(({ kind }) => kind === 'past-the-lot-line')).toEqual([]);
    }
  });

  it('is not told of behind a wall', () => {
    const garden = lot();
    garden.light(flood, 1200, 1000, { aim: tilt({ x: 1600, y: 1000 }, 80) });
    garden.face(
      [
        { x: 1450, y: 0 },
        { x: 1450, y: 2000 },
      ],
      4,
    );
    expect(cautionsOf(garden).filter(({ kind }) => kind === 'past-the-lot-line')).toEqual([]);
  });

  it('can’t be worked out where the line leaves the ground of a photo, and that is said', () => {
    const garden = new Garden(yardPhoto());
    garden.area('lot-line', [pixelAt(garden.sheet, 0, 4), pixelAt(garden.sheet, 3, 4), { x: 1200, y: 2 }]);
    expect(cautionsOf(garden)).toMatchObject([
      { kind: 'not-looked-at', text: expect.stringMatching(/horizon/) },
    ]);
  });
});

describe('light into the sky', () => {
  const lumens = (source: ReturnType<typeof lamp>, parts = {}) =>
    lumensIntoTheSky(lampsOf(spaceWith({ ...parts, sources: [source] }))[0]!);

  it('is all of a beam straight up, none of a spot straight down, half of what shines all around', () => {
    const straightUp = lamp([0, 0, 0.1], { lumens: 400 }, 24, { axis: up });
    expect(lumens(straightUp).sky).toBeGreaterThan(0.99 * 400);
    expect(lumens(straightUp).total).toBeCloseTo(400, 3);
    expect(lumens(lamp([0, 0, 3], { lumens: 400 }, 24)).sky).toBeLessThan(0.1);
    const around = lamp([0, 0, 1], { lumens: 400 }, 360);
    expect(Math.abs(lumens(around).sky / 200 - 1)).toBeLessThan(0.01);
    const level = lamp([0, 0, 1], { lumens: 400 }, 40, { axis: towards(1, 1, 0), shield: 0.5, quantity: 2 });
    expect(Math.abs(lumens(level).sky / lumensOf(beamOf(level)) - 1)).toBeLessThan(0.02);
  });

  it('is caught by a crown over the lamp, by a wall before it, and under a roof', () => {
    const source = lamp([0, 0, 0.1], { lumens: 400 }, 24, { axis: up });
    expect(lumens(source, { crowns: [crown([0, 0, 5], 3, 2)] }).sky).toBeLessThan(40);
    const house = building(
      [
        [-3, -3],
        [3, -3],
        [3, 3],
        [-3, 3],
      ],
      3,
    );
    expect(lumens(source, house).sky).toBe(0);
    const slanted = lamp([0, 0, 0.1], { lumens: 400 }, 20, { axis: towards(1, 0, 1) });
    const high = { walls: [{ id: 'w', ax: 2, ay: -50, bx: 2, by: 50, heightMeters: 9 }] };
    expect(lumens(slanted, high).sky).toBeLessThan(0.1 * lumens(slanted).sky);
  });

  it('names lamps, most to blame first, and leaves path lights with their hats alone', () => {
    const garden = new Garden();
    const wide = garden.light({ ...flood, lumens: 1000 }, 1000, 1000);
    const small = garden.light({ ...flood, name: 'Small flood', lumens: 300 }, 2000, 1000);
    garden.light(pathLight, 500, 500);
    const [caution, ...others] = cautionsOf(garden);
    expect(others).toEqual([]);
    expect(caution).toMatchObject({ kind: 'into-the-sky', recordIds: [wide, small] });
    expect(caution?.text).toMatch(
      /from F1 \(1000 of 1000 lm\) and F2 \(300 of 300 lm\)\. .* local rules decide\.$/,
    );
  });
});

describe('cold light', () => {
  it('names six lights at most and counts the rest', () => {
    const garden = new Garden();
    for (let i = 0; i < 9; i++) garden.light({ ...pathLight, cctKelvin: 5000 } as FixtureItem, 100 * i, 0);
    const [caution] = cautionsOf(garden);
    expect(caution?.recordIds).toHaveLength(9);
    expect(caution?.text).toMatch(/P5 \(5000 K\) and 4 others\./);
  });

  it('is told of over 3000 K, deferring to local rules', () => {
    // Dark-sky ordinance guidance, from memory: 3000 K and below.
    const garden = new Garden();
    garden.light({ ...pathLight, cctKelvin: 3000 } as FixtureItem, 0, 0);
    expect(cautionsOf(garden)).toEqual([]);
    const cold = garden.light({ ...pathLight, name: 'Cold', cctKelvin: 4000 } as FixtureItem, 100, 0);
    expect(cautionsOf(garden)).toEqual([
      {
        kind: 'cold-light',
        recordIds: [cold],
        at: null,
        text: 'Colder than 3000 K: P2 (4000 K). Many local rules ask for 3000 K or warmer at night; they decide.',
      },
    ]);
  });
});
