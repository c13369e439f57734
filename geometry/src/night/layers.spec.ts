import { describe, expect, it } from 'vitest';
import { groundLux } from '../light/illuminance.js';
import type { NightScene } from '../light/night-scene.js';
import { spaceOf } from '../light/space.js';
import { seeded } from '../sheet/yard.testkit.js';
import { LUMA } from './colour.js';
import { type LightMap, NightLight } from './layers.js';
import { groundAt, lampAt, photoScene, planScene, strewnLamps } from './night.testkit.js';
import { surfaceMapOf } from './surface-map.js';

const EDGE = 160;
const SEED = 4711;

const lightOf = (scene: NightScene, edge = EDGE) => new NightLight(scene, surfaceMapOf(scene, edge));
const allOn = (scene: NightScene, edge = EDGE) => lightOf(scene, edge).sum(() => 1);
const valuesOf = (map: LightMap) => Float32Array.from(map.rgba);

/** Lux at a sheet pixel, whatever its colour. */
function luxAtPixel(map: LightMap, scene: NightScene, x: number, y: number): number {
  const i = Math.floor((x * map.width) / scene.widthPx);
  const j = Math.floor((y * map.height) / scene.heightPx);
  const at = (j * map.width + i) * 4;
  return map.rgba[at]! * LUMA[0] + map.rgba[at + 1]! * LUMA[1] + map.rgba[at + 2]! * LUMA[2];
}

describe.each([
  ['a photo', photoScene],
  ['a plan', planScene],
])('light over %s', (_name, sceneOf) => {
  const bare = sceneOf();
  const sources = strewnLamps(bare, 24, seeded(SEED));
  const scene = { ...bare, sources };

  it(`adds up lamp by lamp (seed ${SEED})`, () => {
    const light = lightOf(scene);
    const all = valuesOf(light.sum(() => 1));
    const sum = new Float32Array(all.length);
    for (const { id } of sources) {
      const one = light.sum((source) => (source.id === id ? 1 : 0)).rgba;
      for (let i = 0; i < sum.length; i++) sum[i]! += one[i]!;
    }
    expect(all.some((value) => value > 1)).toBe(true);
    for (let i = 0; i < all.length; i++)
      if (Math.abs(all[i]! - sum[i]!) > 1e-5 * (1 + all[i]!)) expect.fail(`${all[i]} is not ${sum[i]}`);
  });

  it('gives half the light at half the share', () => {
    const light = lightOf(scene);
    const whole = valuesOf(light.sum(() => 1));
    const half = light.sum(() => 0.5).rgba;
    for (let i = 0; i < whole.length; i++)
      if (Math.abs(half[i]! - whole[i]! / 2) > 1e-5 * (1 + whole[i]!)) expect.fail(`${half[i]}`);
  });

  it(`is the same to the last digit after changes as when made anew (seed ${SEED})`, () => {
    const random = seeded(SEED + 1);
    const light = lightOf(scene);
    light.sum(() => 1);
    let now: NightScene = scene;
    for (let step = 0; step < 6; step++) {
      const chosen = Math.floor(random() * now.sources.length);
      const moved = now.sources.map((source, i) =>
        i === chosen ? { ...source, x: source.x + random() - 0.5, output: 0.5 + random() } : source,
      );
      if (step % 4 === 3) moved.splice(chosen, 1);
      if (step % 5 === 4) moved.push(lampAt(1, 1 + step, { id: `new-${step}` }));
      now = { ...now, sources: moved };
      light.update(now);
      const dimmed = `lamp-${step}`;
      const share = ({ id }: { id: string }) => (id === dimmed ? 0.3 : 1);
      expect(valuesOf(light.sum(share))).toEqual(valuesOf(lightOf(now).sum(share)));
    }
  });

  it('is dark with all lamps off, and follows a wall that is moved', () => {
    const light = lightOf(scene);
    light.sum(() => 1);
    expect(light.sum(() => 0).rgba.every((value) => value === 0)).toBe(true);
    const without = { ...scene, faces: [], buildings: [], trees: [] };
    light.update(without);
    expect(valuesOf(light.sum(() => 1))).toEqual(valuesOf(allOn(without)));
  });
});

describe('what is lit', () => {
  it('is the ground as the inverse square and cosine laws say, where nothing stands', () => {
    const bare = photoScene([], { faces: [], trees: [] });
    const at = groundAt(bare, 1200, 1000);
    const scene = { ...bare, sources: [lampAt(at.x, at.y)] };
    const map = allOn(scene, 1200);
    const space = spaceOf(scene);
    let checked = 0;
    for (let u = 900; u < 1500; u += 40)
      for (let v = 900; v < 1150; v += 30) {
        // In the middle of a map pixel.
        const x = (Math.floor(u / 2) + 0.5) * 2;
        const y = (Math.floor(v / 2) + 0.5) * 2;
        const ground = groundAt(scene, x, y);
        const exact = groundLux(space, ground.x, ground.y);
        if (exact < 0.5) continue;
        expect(Math.abs(luxAtPixel(map, scene, x, y) / exact - 1)).toBeLessThan(0.001);
        checked++;
      }
    expect(checked).toBeGreaterThan(50);
  });

  it('is a pool that falls off from the foot of a path light', () => {
    const bare = photoScene();
    const at = groundAt(bare, 1200, 1000);
    const scene = { ...bare, sources: [lampAt(at.x, at.y)] };
    const map = allOn(scene, 800);
    const lux = [0, 60, 120, 200, 300].map((aside) => luxAtPixel(map, scene, 1200 + aside, 1000));
    expect(lux[0]).toBeGreaterThan(150);
    for (let i = 1; i < lux.length; i++) expect(lux[i]).toBeLessThan(lux[i - 1]! * 0.8);
  });

  it('is never the sky', () => {
    const bare = photoScene([], { trees: [] });
    const scene = { ...bare, sources: strewnLamps(bare, 30, seeded(SEED)) };
    const map = allOn(scene);
    // The photo's horizon is at about 310 px.
    for (let u = 5; u < 2400; u += 50)
      for (let v = 5; v < 290; v += 20) expect(luxAtPixel(map, scene, u, v)).toBe(0);
  });

  it('is a wall that a lamp before it points at, more below than above, and nothing behind it', () => {
    const bare = photoScene([], { trees: [] });
    const foot = groundAt(bare, 1200, 725);
    const wallWash = lampAt(foot.x, foot.y, {
      kind: 'wall-wash',
      z: 0.15,
      axis: [0, 0, 1],
      peakCandela: 200,
    });
    const before = groundAt(bare, 1200, 760);
    const scene = { ...bare, sources: [{ ...wallWash, x: before.x, y: before.y }] };
    const map = allOn(scene, 800);
    const low = luxAtPixel(map, scene, 1200, 690);
    expect(low).toBeGreaterThan(5);
    expect(luxAtPixel(map, scene, 1200, 480)).toBeLessThan(low);
    // Ground that runs on behind the house, seen beside and above it.
    for (const [u, v] of [
      [1200, 440],
      [1200, 380],
      [600, 420],
      [1700, 350],
    ] as const)
      expect(luxAtPixel(map, scene, u, v)).toBe(0);
  });

  it('is nothing inside of a building on a plan, while the ground and the wall before it are', () => {
    const scene = planScene([lampAt(7, 8.6, { z: 0.6 })]);
    const map = allOn(scene, 500);
    for (let u = 104; u < 596; u += 12)
      for (let v = 104; v < 396; v += 12) expect(luxAtPixel(map, scene, u, v)).toBe(0);
    expect(luxAtPixel(map, scene, 350, 430)).toBeGreaterThan(20);
    expect(luxAtPixel(map, scene, 350, 402)).toBeGreaterThan(1);
    // Behind the building, as seen from the lamp.
    expect(luxAtPixel(map, scene, 350, 60)).toBe(0);
  });

  it('is a crown over an up-light at its foot, at its base more than at its top', () => {
    const bare = photoScene([], { faces: [] });
    const foot = groundAt(bare, 2191.66, 840);
    const scene = {
      ...bare,
      sources: [
        lampAt(foot.x, foot.y, { kind: 'up', z: 0.1, axis: [0, 0, 1], peakCandela: 2000, halfAngle: 0.6 }),
      ],
    };
    const map = allOn(scene, 800);
    const base = luxAtPixel(map, scene, 2180, 440);
    expect(base).toBeGreaterThan(10);
    expect(luxAtPixel(map, scene, 2180, 60)).toBeLessThan(base);
  });
});

it('is finite whatever was marked', () => {
  const point = { x: 1200, y: 900 };
  const above = { x: 300, y: 20 };
  const faces: NightScene['faces'] = [
    { id: 'point', foot: [point, point], top: [point, point], heightMeters: 2 },
    { id: 'sky', foot: [above, { x: 500, y: 10 }], top: [above, above], heightMeters: 2 },
    {
      id: 'folded',
      foot: [point, { x: 1400, y: 900 }],
      top: [
        { x: 1400, y: 700 },
        { x: 1200, y: 700 },
      ],
      heightMeters: 2,
    },
    {
      id: 'untopped',
      foot: [
        { x: 300, y: 900 },
        { x: 700, y: 860 },
      ],
      top: null,
      heightMeters: 1,
    },
  ];
  const trees: NightScene['trees'] = [
    { id: 'flat', foot: point, outline: [point, point, point], heightMeters: 1, crownBaseMeters: 0 },
    { id: 'sky', foot: above, outline: [above, point, { x: 0, y: 0 }], heightMeters: 3, crownBaseMeters: 1 },
    {
      id: 'line',
      foot: point,
      outline: [point, { x: 1300, y: 900 }, { x: 1250, y: 900 }],
      heightMeters: 3,
      crownBaseMeters: 2.99,
    },
  ];
  const bare = photoScene([], {
    faces,
    trees,
    buildings: [{ id: 'b', points: [point, point, above], heightMeters: 3 }],
  });
  const at = groundAt(bare, 1200, 900);
  const inPlace = lampAt(at.x, at.y, { z: 0 });
  for (const view of ['photo', 'plan'] as const) {
    const scene = { ...bare, view, sources: [inPlace, ...strewnLamps(bare, 8, seeded(SEED))] };
    const { rgba } = allOn(scene);
    expect(rgba.every(Number.isFinite)).toBe(true);
    expect(rgba.every((value) => value >= 0)).toBe(true);
  }
});
