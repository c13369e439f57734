import { execFile } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { promisify } from 'node:util';
import { estimateRequestOf, normalizeEstimateRequest } from '@lampwright/geometry/estimate';
import { type LightSource, type NightScene, nightSceneOf } from '@lampwright/geometry/light';
import { type Picture, renderNight, viewerOf } from '@lampwright/geometry/night';
import { defaultSettings, planOf } from '@lampwright/geometry/plan';
import sharp from 'sharp';
import { beforeAll, describe, expect, it } from 'vitest';
import { solveEstimate } from '../../circuit/index.js';
import { starterCatalogue } from '../../modules/catalogue/starter/index.js';
import { PlanBuilder } from '../plan-builder.js';
import { drawHarrowBank, HARROW_BANK_SHEET } from './harrow-bank.js';
import { drawSandpiperRow, SANDPIPER_ROW_SHEET } from './sandpiper-row.js';

/** Night pictures of the demo sheets, left in test-results/pictures to be looked at, and what must be true of them. */

const FILES = fileURLToPath(new URL('../files/', import.meta.url));
const PICTURES = fileURLToPath(new URL('../../../../test-results/pictures/', import.meta.url));
const LONG_EDGE = 1200;
const ALL = () => 1;

const catalogue = (name: string) => {
  const item = starterCatalogue.find((entry) => entry.name === name);
  if (!item) throw new Error(`The starter catalogue has no "${name}".`);
  return { sourceId: null, item };
};

function sceneOf(
  draw: (plan: PlanBuilder) => void,
  sheet: typeof HARROW_BANK_SHEET | typeof SANDPIPER_ROW_SHEET,
): NightScene {
  const start = planOf([
    defaultSettings('us'),
    {
      kind: 'sheet',
      id: 'sheet',
      name: 'Sheet',
      order: 0,
      ...sheet,
      pixelsPerPaperMeter: sheet.view === 'plan' ? 200 / 0.0254 : null,
      references: [],
      groundMetersPerPaperMeter: null,
      whiteLux: null,
    },
  ]);
  const builder = new PlanBuilder(start, 'sheet', catalogue, 'demo');
  draw(builder);
  const { request } = estimateRequestOf(builder.plan);
  if (!request) throw new Error('There is nothing to estimate.');
  const answer = solveEstimate(normalizeEstimateRequest(request));
  const volts = new Map(answer.fixtures.map((fixture) => [fixture.id, fixture.volts]));
  const scene = nightSceneOf(builder.plan, 'sheet', volts);
  if (!scene) throw new Error('The sheet has no scale.');
  return scene;
}

async function pixelsOf(file: string): Promise<Picture> {
  const { data, info } = await sharp(file)
    .resize(LONG_EDGE, LONG_EDGE, { fit: 'inside' })
    .ensureAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return { width: info.width, height: info.height, data: new Uint8ClampedArray(data) };
}

async function plotPlan(): Promise<Picture> {
  const folder = await mkdtemp(join(tmpdir(), 'lampwright-night-spec-'));
  try {
    const page = join(folder, 'page');
    await promisify(execFile)('pdftoppm', [
      '-r',
      '100',
      '-png',
      '-singlefile',
      join(FILES, 'plot-plan.pdf'),
      page,
    ]);
    return await pixelsOf(`${page}.png`);
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

async function kept(name: string, picture: Picture): Promise<Picture> {
  const { width, height, data } = picture;
  await sharp(Buffer.from(data.buffer), { raw: { width, height, channels: 4 } })
    .png()
    .toFile(join(PICTURES, `${name}.png`));
  return picture;
}

/** Mean of red, green and blue around a place of the sheet, 0 to 255. */
function brightness(
  { width, height, data }: Picture,
  scene: NightScene,
  x: number,
  y: number,
  radius = 4,
): number {
  const cx = Math.round((x * width) / scene.widthPx);
  const cy = Math.round((y * height) / scene.heightPx);
  let sum = 0;
  let count = 0;
  for (let v = Math.max(cy - radius, 0); v <= Math.min(cy + radius, height - 1); v++)
    for (let u = Math.max(cx - radius, 0); u <= Math.min(cx + radius, width - 1); u++) {
      const i = (v * width + u) * 4;
      sum += data[i]! + data[i + 1]! + data[i + 2]!;
      count += 3;
    }
  return sum / count;
}

const meanOf = ({ data }: Picture) => data.reduce((sum, value) => sum + value, 0) / data.length;

/** Pixels that differ by more than what dither and the least light make. */
function changed(a: Picture, b: Picture): { x: number; y: number }[] {
  const places: { x: number; y: number }[] = [];
  for (let i = 0; i < a.data.length; i += 4) {
    const apart = Math.max(...[0, 1, 2].map((k) => Math.abs(a.data[i + k]! - b.data[i + k]!)));
    if (apart > 3) places.push({ x: (i / 4) % a.width, y: Math.floor(i / 4 / a.width) });
  }
  return places;
}

/** Where a lamp's foot is on the sheet. */
function footOf(scene: NightScene, { x, y }: LightSource): { x: number; y: number } {
  const seen = viewerOf(scene).see(x, y, 0);
  if (!seen) throw new Error('The lamp is behind the camera.');
  return { x: seen.u, y: seen.v };
}

beforeAll(() => {
  mkdirSync(PICTURES, { recursive: true });
});

describe.each([
  [
    'harrow-bank',
    () => sceneOf(drawHarrowBank, HARROW_BANK_SHEET),
    () => pixelsOf(join(FILES, 'yard-photo.jpg')),
  ],
  ['sandpiper-row', () => sceneOf(drawSandpiperRow, SANDPIPER_ROW_SHEET), plotPlan],
] as const)('the night of %s', (name, makeScene, loadPhoto) => {
  let scene: NightScene;
  let photo: Picture;
  let night: Picture;
  let off: Picture;

  beforeAll(async () => {
    scene = makeScene();
    photo = await loadPhoto();
    night = await kept(`${name}-night`, renderNight(photo, scene, { on: ALL, sunAltitude: -14 }, LONG_EDGE));
    off = renderNight(photo, scene, { on: () => 0, sunAltitude: -14 }, LONG_EDGE);
  });

  it('lights the ground by its path lights, which falls off around them', () => {
    const paths = scene.sources.filter(({ kind }) => kind === 'path');
    expect(paths.length).toBeGreaterThan(3);
    for (const lamp of paths) {
      const foot = footOf(scene, lamp);
      expect(brightness(night, scene, foot.x, foot.y)).toBeGreaterThan(
        brightness(off, scene, foot.x, foot.y) + 25,
      );
    }
    // Away from the last of them, where nothing else stands.
    const last = footOf(scene, paths.at(-1)!);
    const away = [0, 0.05, 0.12].map((share) => {
      const y = last.y + share * scene.heightPx;
      return brightness(night, scene, last.x, y) - brightness(off, scene, last.x, y);
    });
    expect(away[0]).toBeGreaterThan(away[1]!);
    expect(away[1]).toBeGreaterThan(away[2]! - 1);
  });

  it('is warm where lamps shine', () => {
    let red = 0;
    let blue = 0;
    for (const { x, y } of changed(night, off)) {
      const i = (y * night.width + x) * 4;
      red += night.data[i]! - off.data[i]!;
      blue += night.data[i + 2]! - off.data[i + 2]!;
    }
    expect(red).toBeGreaterThan(1.15 * blue);
  });

  it('grows darker through dusk', async () => {
    const means: number[] = [];
    for (const altitude of [6, 0, -3, -6, -9, -12]) {
      const dusk = renderNight(photo, scene, { on: () => 0, sunAltitude: altitude }, 400);
      means.push(meanOf(dusk));
    }
    means.slice(1).forEach((mean, i) => {
      expect(mean).toBeLessThan(means[i]!);
    });
    await kept(`${name}-dusk`, renderNight(photo, scene, { on: ALL, sunAltitude: -4 }, LONG_EDGE));
  });

  it('changes only near the lamps of a group that is switched off', async () => {
    const group = scene.sources.filter(({ kind }) => kind === 'path');
    const ids = new Set(group.map(({ id }) => id));
    const without = await kept(
      `${name}-without-path`,
      renderNight(photo, scene, { on: ({ id }) => (ids.has(id) ? 0 : 1), sunAltitude: -14 }, LONG_EDGE),
    );
    const places = changed(night, without);
    expect(places.length).toBeGreaterThan(200);
    const near = 0.25 * LONG_EDGE;
    const feet = group.map((lamp) => footOf(scene, lamp));
    for (const { x, y } of places) {
      const u = (x * scene.widthPx) / night.width;
      const v = (y * scene.heightPx) / night.height;
      const nearest = Math.min(...feet.map((foot) => Math.hypot(foot.x - u, foot.y - v)));
      if (nearest > (near * scene.widthPx) / night.width) expect.fail(`It changed at ${x}, ${y}.`);
    }
  });
});

it('leaves the sky over Harrow Bank as it is', async () => {
  const scene = sceneOf(drawHarrowBank, HARROW_BANK_SHEET);
  const photo = await pixelsOf(join(FILES, 'yard-photo.jpg'));
  const [on, off] = [1, 0].map((share) =>
    renderNight(photo, scene, { on: () => share, sunAltitude: -14 }, 600),
  );
  for (let u = 250; u < 1850; u += 100)
    expect(brightness(on!, scene, u, 60, 1)).toBe(brightness(off!, scene, u, 60, 1));
});

it('leaves the inside of the house on Sandpiper Row dark', async () => {
  const scene = sceneOf(drawSandpiperRow, SANDPIPER_ROW_SHEET);
  const photo = await plotPlan();
  const [on, off] = [1, 0].map((share) =>
    renderNight(photo, scene, { on: () => share, sunAltitude: -14 }, LONG_EDGE),
  );
  // A foot within the walls and more: feet east and south of the lot's corner.
  for (let east = 16; east <= 50; east += 2)
    for (let south = 66; south <= 90; south += 2) {
      const [x, y] = [266.67 + 20 * east, 360 + 20 * south];
      expect(brightness(on!, scene, x, y, 1)).toBe(brightness(off!, scene, x, y, 1));
    }
});
