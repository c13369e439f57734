import type { LightSource, NightScene } from '@lampwright/geometry/light';

/** A garden that isn't there: a photo of 1200 × 800 px, seen from 3 m up, with a house, a fence and five trees. */
export const PHOTO = { width: 1200, height: 800 } as const;

const FOCAL = 1000;
const EYE = { y: -6, z: 3 };
const DIP = 0.22;

/** Sheet pixels to ground: the inverse of a camera at (0, −6, 3) that looks along y and a little down. */
function groundMatrix(): number[] {
  const cx = PHOTO.width / 2;
  const cy = PHOTO.height / 2;
  const s = Math.sin(DIP);
  const c = Math.cos(DIP);
  // A ray through pixel (u, v) is ((u − cx) / f, c − s · (v − cy) / f, −s − c · (v − cy) / f); it meets the ground
  // where it has come down by the eye's height.
  const down = [0, c / FOCAL, s - (c * cy) / FOCAL];
  const ahead = [0, -s / FOCAL, c + (s * cy) / FOCAL];
  const x = [EYE.z / FOCAL, 0, (-EYE.z * cx) / FOCAL];
  const y = ahead.map((a, i) => EYE.z * a + EYE.y * down[i]!);
  return [...x, ...y, ...down];
}

function pixelOf(x: number, y: number, z: number): { x: number; y: number } {
  const s = Math.sin(DIP);
  const c = Math.cos(DIP);
  const ahead = y - EYE.y;
  const up = z - EYE.z;
  const depth = c * ahead - s * up;
  return {
    x: PHOTO.width / 2 + (FOCAL * x) / depth,
    y: PHOTO.height / 2 - (FOCAL * (s * ahead + c * up)) / depth,
  };
}

/** The same numbers from the same seed (mulberry32). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export function yard(fixtures: number, seed: number): NightScene {
  const random = seeded(seed);
  const face = (
    id: string,
    x0: number,
    x1: number,
    y: number,
    height: number,
  ): NightScene['faces'][number] => ({
    id,
    foot: [pixelOf(x0, y, 0), pixelOf(x1, y, 0)],
    top: [pixelOf(x0, y, height), pixelOf(x1, y, height)],
    heightMeters: height,
  });
  const tree = (id: string, x: number, y: number, r: number, base: number, height: number) => ({
    id,
    foot: pixelOf(x, y, 0),
    outline: Array.from({ length: 16 }, (_, i) => {
      const turn = (i / 16) * 2 * Math.PI;
      return pixelOf(x + r * Math.cos(turn), y, (base + height) / 2 + ((height - base) / 2) * Math.sin(turn));
    }),
    heightMeters: height,
    crownBaseMeters: base,
  });
  return {
    sheetId: 'yard',
    view: 'photo',
    widthPx: PHOTO.width,
    heightPx: PHOTO.height,
    groundMatrix: groundMatrix(),
    whiteLux: 40,
    sources: Array.from({ length: fixtures }, (_, i) => lamp(i, random)),
    faces: [face('house', -6, 6, 12, 2.8), face('fence', -9, -6.5, 9, 1.8)],
    trees: [
      tree('maple', 6, 7, 2, 2.2, 6),
      tree('birch', -5, 6, 1.2, 1.5, 5),
      tree('box', -2, 10.5, 0.6, 0, 1.1),
      tree('yew', 2, 10.5, 0.6, 0, 1.1),
      tree('holly', 4, 9, 0.7, 0, 1.4),
    ],
    buildings: [
      {
        id: 'building',
        points: [pixelOf(-6, 12, 0), pixelOf(6, 12, 0), pixelOf(6, 20, 0), pixelOf(-6, 20, 0)],
        heightMeters: 2.8,
      },
    ],
    zones: [
      {
        id: 'zone',
        kind: 'feed',
        name: 'Feed',
        schedule: { on: { at: 'sunset', offsetMinutes: 0 }, off: { at: 'clock', minutes: 1380 } } as never,
      },
    ],
  };
}

/** Path lights, up-lights and wall washes by turns, strewn over the garden. */
function lamp(i: number, random: () => number): LightSource {
  const x = -7 + 14 * random();
  const y = 11 * random();
  const common = {
    id: `lamp-${i}`,
    x,
    y,
    quantity: 1,
    output: 1,
    cctKelvin: 2700 + 300 * Math.floor(3 * random()),
    zoneId: 'zone',
    groupId: i % 2 === 0 ? 'even' : null,
    treeId: null,
    shield: 0,
  };
  if (i % 3 === 0)
    return { ...common, kind: 'path', z: 0.5, axis: [0, 0, -1], peakCandela: 63, halfAngle: Math.PI / 3 };
  if (i % 3 === 1) {
    const lean = 0.3 * (random() - 0.5);
    const axis: [number, number, number] = [lean, 0.3, Math.sqrt(1 - lean * lean - 0.09)];
    return { ...common, kind: 'up', z: 0.1, axis, peakCandela: 690, halfAngle: 0.31 };
  }
  return {
    ...common,
    kind: 'wall-wash',
    y: 11.2,
    z: 0.15,
    axis: [0, 0.6, 0.8],
    peakCandela: 90,
    halfAngle: 0.9,
  };
}
