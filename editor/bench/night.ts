import type { NightScene } from '@lampwright/geometry/light';
import { lookAt, NightLight, surfaceMapOf } from '@lampwright/geometry/night';
import { createNightRenderer, type NightRenderer } from '../src/night';
import { PHOTO, seeded, yard } from './night-yard';

/** Milliseconds, each in the order that they were taken. */
export interface NightTimes {
  readonly build: number[];
  readonly drag: number[];
  readonly group: number[];
  readonly evening: number[];
  /** A picture of the same size put on a canvas, and nothing else. */
  readonly bare: number[];
}

/** How far the two renderers' pictures are apart, in steps of 255. */
export interface NightDifference {
  readonly values: number;
  readonly over1: number;
  readonly over3: number;
  readonly most: number;
  readonly mean: number;
}

declare global {
  interface Window {
    benchNight: (kind: NightRenderer['kind'], fixtures: number, rounds: number) => Promise<NightTimes>;
    compareNight: (sunAltitude: number) => Promise<NightDifference>;
    /** The picture after its graphics context was lost and given back, beside the one before. */
    loseNight: () => Promise<NightDifference>;
    /** Longest run of one value, and number of values, along a row of a dark ramp. */
    rampNight: (kind: NightRenderer['kind']) => Promise<{ longestRun: number; largestStep: number }>;
  }
}

const MAP_EDGE = 720;
const SEED = 20_260_601;

/** A photo of the yard, painted: sky, grass, house, with some grain. */
function photo(): HTMLCanvasElement {
  const canvas = document.createElement('canvas');
  canvas.width = PHOTO.width;
  canvas.height = PHOTO.height;
  const context = canvas.getContext('2d')!;
  const picture = context.createImageData(PHOTO.width, PHOTO.height);
  const random = seeded(SEED);
  for (let i = 0; i < picture.data.length; i += 4) {
    const y = Math.floor(i / 4 / PHOTO.width);
    const grain = 40 * (random() - 0.5);
    const [r, g, b] = y < 180 ? [150, 190, 240] : y < 420 ? [150, 90, 70] : [90, 130, 60];
    picture.data[i] = r! + grain;
    picture.data[i + 1] = g! + grain;
    picture.data[i + 2] = b! + grain;
    picture.data[i + 3] = 255;
  }
  context.putImageData(picture, 0, 0);
  return canvas;
}

function rendererOf(kind: NightRenderer['kind'], picture = photo()) {
  const canvas = document.createElement('canvas');
  document.body.replaceChildren(canvas);
  const night = createNightRenderer(canvas, picture, PHOTO, kind);
  if (night.kind !== kind) throw new Error(`There is no ${kind} here.`);
  return { night, canvas };
}

/** Waits until the picture is there, not only asked for. */
async function shown(night: NightRenderer, canvas: HTMLCanvasElement): Promise<void> {
  await night.drawn();
  const gl = night.kind === 'webgl' ? canvas.getContext('webgl2') : null;
  if (gl) gl.readPixels(0, 0, 1, 1, gl.RGBA, gl.UNSIGNED_BYTE, new Uint8Array(4));
}

window.benchNight = async (kind, fixtures, rounds) => {
  const times: NightTimes = { build: [], drag: [], group: [], evening: [], bare: [] };
  const timed = async (into: number[], work: () => Promise<void> | void) => {
    const from = performance.now();
    await work();
    into.push(performance.now() - from);
    await new Promise((resolve) => setTimeout(resolve, 0));
  };
  const { night, canvas } = rendererOf(kind);
  let scene: NightScene = yard(fixtures, SEED);
  let light = new NightLight(scene, surfaceMapOf(scene, MAP_EDGE));
  for (let i = 0; i < 5; i++)
    await timed(times.build, async () => {
      light = new NightLight(scene, surfaceMapOf(scene, MAP_EDGE));
      night.draw(
        light.sum(() => 1),
        lookAt(-12),
        scene.whiteLux,
      );
      await shown(night, canvas);
    });
  for (let i = 0; i < rounds; i++)
    await timed(times.drag, async () => {
      const moved = i % fixtures;
      const sources = scene.sources.map((source, k) =>
        k === moved ? { ...source, x: source.x + 0.05, y: source.y - 0.03 } : source,
      );
      scene = { ...scene, sources };
      light.update(scene);
      night.draw(
        light.sum(() => 1),
        lookAt(-12),
        scene.whiteLux,
      );
      await shown(night, canvas);
    });
  for (let i = 0; i < rounds; i++)
    await timed(times.group, async () => {
      const on = i % 2;
      night.draw(
        light.sum((source) => (source.groupId ? on : 1)),
        lookAt(-12),
        scene.whiteLux,
      );
      await shown(night, canvas);
    });
  for (let i = 0; i < rounds; i++)
    await timed(times.evening, async () => {
      night.draw(
        light.sum(() => 1),
        lookAt(2 - (14 * i) / rounds),
        scene.whiteLux,
      );
      await shown(night, canvas);
    });
  night.dispose();
  await bare(kind, rounds, (work) => timed(times.bare, work));
  return times;
};

async function bare(
  kind: NightRenderer['kind'],
  rounds: number,
  timed: (work: () => void) => Promise<void>,
): Promise<void> {
  const canvas = document.createElement('canvas');
  canvas.width = PHOTO.width;
  canvas.height = PHOTO.height;
  document.body.replaceChildren(canvas);
  const picture = new ImageData(PHOTO.width, PHOTO.height);
  if (kind === 'canvas') {
    const context = canvas.getContext('2d')!;
    for (let i = 0; i < rounds; i++) await timed(() => context.putImageData(picture, 0, 0));
    return;
  }
  const gl = canvas.getContext('webgl2')!;
  gl.bindTexture(gl.TEXTURE_2D, gl.createTexture());
  for (let i = 0; i < rounds; i++)
    await timed(() => {
      gl.texImage2D(gl.TEXTURE_2D, 0, gl.RGBA8, gl.RGBA, gl.UNSIGNED_BYTE, picture);
      gl.readPixels(0, 0, 1, 1, gl.RGBA, gl.UNSIGNED_BYTE, new Uint8Array(4));
    });
}

function pixelsOf(canvas: HTMLCanvasElement): Uint8ClampedArray {
  const copy = document.createElement('canvas');
  copy.width = canvas.width;
  copy.height = canvas.height;
  const context = copy.getContext('2d')!;
  context.drawImage(canvas, 0, 0);
  return context.getImageData(0, 0, copy.width, copy.height).data;
}

function difference(a: Uint8ClampedArray, b: Uint8ClampedArray): NightDifference {
  let over1 = 0;
  let over3 = 0;
  let most = 0;
  let sum = 0;
  for (let i = 0; i < a.length; i++) {
    const apart = Math.abs(a[i]! - b[i]!);
    if (apart > 1) over1++;
    if (apart > 3) over3++;
    most = Math.max(most, apart);
    sum += apart;
  }
  return { values: a.length, over1, over3, most, mean: sum / a.length };
}

async function pictureBy(kind: NightRenderer['kind'], sunAltitude: number) {
  const scene = yard(60, SEED);
  const light = new NightLight(scene, surfaceMapOf(scene, MAP_EDGE));
  const { night, canvas } = rendererOf(kind);
  night.draw(
    light.sum(() => 1),
    lookAt(sunAltitude),
    scene.whiteLux,
  );
  await shown(night, canvas);
  return { night, canvas };
}

window.compareNight = async (sunAltitude) => {
  const webgl = await pictureBy('webgl', sunAltitude);
  const one = pixelsOf(webgl.canvas);
  webgl.night.dispose();
  const canvas = await pictureBy('canvas', sunAltitude);
  return difference(one, pixelsOf(canvas.canvas));
};

window.loseNight = async () => {
  const { night, canvas } = await pictureBy('webgl', -12);
  const before = pixelsOf(canvas);
  const extension = canvas.getContext('webgl2')!.getExtension('WEBGL_lose_context')!;
  const restored = new Promise((resolve) => canvas.addEventListener('webglcontextrestored', resolve));
  extension.loseContext();
  await new Promise((resolve) => setTimeout(resolve, 50));
  extension.restoreContext();
  await restored;
  await shown(night, canvas);
  return difference(before, pixelsOf(canvas));
};

window.rampNight = async (kind) => {
  const ramp = document.createElement('canvas');
  ramp.width = PHOTO.width;
  ramp.height = PHOTO.height;
  const context = ramp.getContext('2d')!;
  context.fillStyle = '#808080';
  context.fillRect(0, 0, PHOTO.width, PHOTO.height);
  const { night, canvas } = rendererOf(kind, ramp);
  // A very dark pool: three steps of 255 over the whole width.
  const width = 240;
  const height = 160;
  const rgba = new Float32Array(width * height * 4);
  for (let i = 0; i < width * height; i++) rgba.fill((0.2 * (i % width)) / width, 4 * i, 4 * i + 3);
  const leaves = new Uint8Array(width * height);
  night.draw({ view: 'photo', width, height, rgba, leaves, version: 1 }, lookAt(-18), 40);
  await shown(night, canvas);
  const data = pixelsOf(canvas);
  return smoothness(data);
};

/** Over columns of a ramp: the longest run of equal values in a row, and the largest step between neighbouring means. */
function smoothness(data: Uint8ClampedArray): { longestRun: number; largestStep: number } {
  let longestRun = 0;
  let run = 0;
  for (let x = 1; x < PHOTO.width; x++) {
    const at = (300 * PHOTO.width + x) * 4;
    run = data[at] === data[at - 4] ? run + 1 : 0;
    longestRun = Math.max(longestRun, run);
  }
  const mean = (x: number) => {
    let sum = 0;
    for (let y = 0; y < PHOTO.height; y++)
      for (let k = 0; k < 8; k++) sum += data[(y * PHOTO.width + x + k) * 4]!;
    return sum / (PHOTO.height * 8);
  };
  let largestStep = 0;
  for (let x = 8; x < PHOTO.width - 8; x += 8)
    largestStep = Math.max(largestStep, Math.abs(mean(x) - mean(x - 8)));
  return { longestRun, largestStep };
}
