import type { LightSource, NightScene } from '../light/night-scene.js';
import { groundUnder } from '../light/space.js';
import { solvedPhoto, threeRectangles, yardPixel } from '../sheet/yard.testkit.js';

/** The rendered yard of the calibration's tests, with its house face and one tree marked; lamps as given. */
export function photoScene(
  sources: readonly LightSource[] = [],
  marks: Partial<NightScene> = {},
): NightScene {
  return {
    sheetId: 'sheet',
    view: 'photo',
    widthPx: 2400,
    heightPx: 1600,
    groundMatrix: [...solvedPhoto(threeRectangles()).groundMatrix],
    whiteLux: 40,
    sources: [...sources],
    faces: [
      {
        id: 'house',
        foot: [
          { x: 423, y: 708 },
          { x: 1958.3, y: 726 },
        ],
        top: [
          { x: 400, y: 457 },
          { x: 1986, y: 461 },
        ],
        heightMeters: 2.7,
      },
    ],
    trees: [
      {
        id: 'tree',
        foot: yardPixel('right tree foot'),
        outline: [
          { x: 2080, y: 0 },
          { x: 1925, y: 280 },
          { x: 2050, y: 460 },
          { x: 2390, y: 460 },
          { x: 2399, y: 0 },
        ],
        heightMeters: 7,
        crownBaseMeters: 2.9,
      },
    ],
    buildings: [],
    zones: [],
    ...marks,
  };
}

/** A drawing from above, 2 cm of ground to a pixel, with a building of 10 × 6 m. */
export function planScene(sources: readonly LightSource[] = []): NightScene {
  return {
    ...photoScene(sources),
    view: 'plan',
    widthPx: 1000,
    heightPx: 800,
    groundMatrix: [0.02, 0, 0, 0, 0.02, 0, 0, 0, 1],
    faces: [],
    trees: [],
    buildings: [
      {
        id: 'building',
        points: [
          { x: 100, y: 100 },
          { x: 600, y: 100 },
          { x: 600, y: 400 },
          { x: 100, y: 400 },
        ],
        heightMeters: 3,
      },
    ],
  };
}

export function lampAt(x: number, y: number, more: Partial<LightSource> = {}): LightSource {
  return {
    id: `lamp-${x}-${y}`,
    kind: 'path',
    x,
    y,
    z: 0.5,
    axis: [0, 0, -1],
    peakCandela: 60,
    halfAngle: Math.PI / 3,
    shield: 0,
    quantity: 1,
    output: 1,
    cctKelvin: 2700,
    zoneId: 'zone',
    groupId: null,
    treeId: null,
    ...more,
  };
}

/** Ground metres under a pixel that must be on the ground. */
export function groundAt(scene: NightScene, x: number, y: number): { x: number; y: number } {
  const ground = groundUnder(scene, { x, y });
  if (!ground) throw new Error('There is no ground there.');
  return ground;
}

/** Lamps of all kinds strewn over what the sheet shows of the ground. */
export function strewnLamps(scene: NightScene, count: number, random: () => number): LightSource[] {
  return Array.from({ length: count }, (_, i) => {
    const y = scene.view === 'photo' ? scene.heightPx * (0.48 + 0.5 * random()) : scene.heightPx * random();
    const at = groundAt(scene, scene.widthPx * random(), y);
    const id = `lamp-${i}`;
    if (i % 2 === 0) return lampAt(at.x, at.y, { id, cctKelvin: 2700 + 1300 * random() });
    const lean = random() - 0.5;
    return lampAt(at.x, at.y, {
      id,
      kind: 'up',
      z: 0.1,
      axis: [lean, 0.3, Math.sqrt(1 - lean * lean - 0.09)],
      peakCandela: 700 * random(),
      halfAngle: 0.3,
      shield: random(),
    });
  });
}
