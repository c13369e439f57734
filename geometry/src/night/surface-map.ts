import type { NightScene } from '../light/night-scene.js';
import type { Viewer } from './camera.js';
import { SurfaceKind, type SurfacePoint, surfacesOf } from './surfaces.js';

/** Pixels of the map are kept by blocks of so many each way: what a lamp does not reach is passed over by block. */
export const BLOCK = 8;
const BLOCK_PIXELS = BLOCK * BLOCK;

/**
 * What each pixel of a sheet shows, at the light map's own size: one or more samples a pixel, in metres. Where two
 * surfaces meet within a pixel there are several, so that no edge is jagged. The sky has none.
 */
export interface SurfaceMap {
  readonly view: NightScene['view'];
  /** Map pixels. */
  readonly width: number;
  readonly height: number;
  readonly longEdge: number;
  /** Map pixels to a sheet pixel. */
  readonly perSheet: number;
  readonly viewer: Viewer;
  readonly blocksAcross: number;
  readonly blocksDown: number;
  /** Samples of block b are those from blockStart[b] up to blockStart[b + 1]. */
  readonly blockStart: Uint32Array;
  /** Of each block: middle (x, y, z) and radius of a ball around its samples, in metres. */
  readonly blockBall: Float32Array;
  /** Of each block: whether all of it is ground. */
  readonly blockIsGround: Uint8Array;
  /** Pixel within its block, row by row. */
  readonly slot: Uint8Array;
  readonly kind: Uint8Array;
  /** Mark that the sample is of; see {@link SurfaceMap.crownIds}. */
  readonly owner: Int16Array;
  /** How much of its pixel the sample is. */
  readonly share: Float32Array;
  readonly x: Float32Array;
  readonly y: Float32Array;
  readonly z: Float32Array;
  readonly nx: Float32Array;
  readonly ny: Float32Array;
  readonly nz: Float32Array;
  /** Of each map pixel, row by row: how far what is seen there is from the camera; Infinity for sky. */
  readonly depth: Float32Array;
  /** Of each map pixel: how much of it is crown, 0 to 255. */
  readonly leaves: Uint8Array;
  /** By owner: the tree whose crown or trunk it is. */
  readonly crownIds: readonly (string | null)[];
}

/** Where a pixel shows an edge it is sampled at these places, in pixels. */
const WITHIN = [0.25, 0.75] as const;

/** The surface map of a scene, its longer side `longEdge` pixels. */
export function surfaceMapOf(scene: NightScene, longEdge: number): SurfaceMap {
  const scale = Math.min(longEdge / Math.max(scene.widthPx, scene.heightPx), 1);
  const width = Math.max(Math.round(scene.widthPx * scale), 1);
  const height = Math.max(Math.round(scene.heightPx * scale), 1);
  const perX = scene.widthPx / width;
  const perY = scene.heightPx / height;
  const surfaces = surfacesOf(scene);

  const depth = new Float32Array(width * height).fill(Number.POSITIVE_INFINITY);
  const marks = new Int32Array(width * height);
  let at = 0;
  const look = (point: SurfacePoint) => {
    // Several things in one pixel, as on drawings, count as one mark of their own.
    marks[at] = Math.imul(marks[at]!, 31) + point.owner + 1;
    depth[at] = Math.min(depth[at]!, point.depth);
  };
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++, at++) surfaces.at((i + 0.5) * perX, (j + 0.5) * perY, look);

  const blocksAcross = Math.ceil(width / BLOCK);
  const blocksDown = Math.ceil(height / BLOCK);
  const blockStart = new Uint32Array(blocksAcross * blocksDown + 1);
  const samples = new Samples(width * height);
  let slot = 0;
  let share = 1;
  const keep = (point: SurfacePoint) => {
    samples.add(point, slot, share);
  };
  for (let b = 0; b < blocksAcross * blocksDown; b++) {
    blockStart[b] = samples.count;
    const left = (b % blocksAcross) * BLOCK;
    const top = Math.floor(b / blocksAcross) * BLOCK;
    for (slot = 0; slot < BLOCK_PIXELS; slot++) {
      const i = left + (slot % BLOCK);
      const j = top + Math.floor(slot / BLOCK);
      if (i >= width || j >= height) continue;
      if (isEdge(marks, width, height, i, j)) {
        share = 1 / (WITHIN.length * WITHIN.length);
        for (const dy of WITHIN) for (const dx of WITHIN) surfaces.at((i + dx) * perX, (j + dy) * perY, keep);
      } else {
        share = 1;
        surfaces.at((i + 0.5) * perX, (j + 0.5) * perY, keep);
      }
    }
  }
  blockStart[blocksAcross * blocksDown] = samples.count;
  return {
    view: scene.view,
    width,
    height,
    longEdge,
    perSheet: width / scene.widthPx,
    viewer: surfaces.viewer,
    blocksAcross,
    blocksDown,
    blockStart,
    ...blockBounds(samples, blockStart),
    slot: samples.slot.subarray(0, samples.count),
    kind: samples.kind.subarray(0, samples.count),
    owner: samples.owner.subarray(0, samples.count),
    share: samples.share.subarray(0, samples.count),
    x: samples.x.subarray(0, samples.count),
    y: samples.y.subarray(0, samples.count),
    z: samples.z.subarray(0, samples.count),
    nx: samples.nx.subarray(0, samples.count),
    ny: samples.ny.subarray(0, samples.count),
    nz: samples.nz.subarray(0, samples.count),
    depth,
    // A drawing is no leaves but paper.
    leaves:
      scene.view === 'plan'
        ? new Uint8Array(width * height)
        : leavesOf(samples, blockStart, width, height, blocksAcross),
    crownIds: surfaces.crownIds,
  };
}

function isEdge(marks: Int32Array, width: number, height: number, i: number, j: number): boolean {
  const at = j * width + i;
  const mark = marks[at]!;
  return (
    (i > 0 && marks[at - 1] !== mark) ||
    (i < width - 1 && marks[at + 1] !== mark) ||
    (j > 0 && marks[at - width] !== mark) ||
    (j < height - 1 && marks[at + width] !== mark)
  );
}

function leavesOf(
  samples: Samples,
  blockStart: Uint32Array,
  width: number,
  height: number,
  blocksAcross: number,
): Uint8Array {
  const leaves = new Float32Array(width * height);
  for (let b = 0; b + 1 < blockStart.length; b++) {
    const left = (b % blocksAcross) * BLOCK;
    const top = Math.floor(b / blocksAcross) * BLOCK;
    for (let s = blockStart[b]!; s < blockStart[b + 1]!; s++) {
      if (samples.kind[s] !== SurfaceKind.crown) continue;
      const slot = samples.slot[s]!;
      leaves[(top + Math.floor(slot / BLOCK)) * width + left + (slot % BLOCK)]! += samples.share[s]!;
    }
  }
  const bytes = new Uint8Array(leaves.length);
  for (let i = 0; i < leaves.length; i++) bytes[i] = Math.round(255 * leaves[i]!);
  return bytes;
}

function blockBounds(samples: Samples, blockStart: Uint32Array) {
  const blocks = blockStart.length - 1;
  const blockBall = new Float32Array(blocks * 4);
  const blockIsGround = new Uint8Array(blocks);
  const { x, y, z, kind } = samples;
  for (let b = 0; b < blocks; b++) {
    const from = blockStart[b]!;
    const to = blockStart[b + 1]!;
    const low = [Infinity, Infinity, Infinity];
    const high = [-Infinity, -Infinity, -Infinity];
    let isGround = 1;
    for (let s = from; s < to; s++) {
      const p = [x[s]!, y[s]!, z[s]!];
      for (let k = 0; k < 3; k++) {
        low[k] = Math.min(low[k]!, p[k]!);
        high[k] = Math.max(high[k]!, p[k]!);
      }
      if (kind[s] !== SurfaceKind.ground) isGround = 0;
    }
    if (to > from) {
      for (let k = 0; k < 3; k++) blockBall[b * 4 + k] = (low[k]! + high[k]!) / 2;
      // A little more, for what is rounded.
      blockBall[b * 4 + 3] =
        1.001 * Math.hypot(high[0]! - low[0]!, high[1]! - low[1]!, high[2]! - low[2]!) * 0.5 + 1e-3;
    }
    blockIsGround[b] = isGround;
  }
  return { blockBall, blockIsGround };
}

/** Samples, in arrays that grow. */
class Samples {
  count = 0;
  slot: Uint8Array;
  kind: Uint8Array;
  owner: Int16Array;
  share: Float32Array;
  x: Float32Array;
  y: Float32Array;
  z: Float32Array;
  nx: Float32Array;
  ny: Float32Array;
  nz: Float32Array;

  constructor(private capacity: number) {
    this.slot = new Uint8Array(capacity);
    this.kind = new Uint8Array(capacity);
    this.owner = new Int16Array(capacity);
    this.share = new Float32Array(capacity);
    this.x = new Float32Array(capacity);
    this.y = new Float32Array(capacity);
    this.z = new Float32Array(capacity);
    this.nx = new Float32Array(capacity);
    this.ny = new Float32Array(capacity);
    this.nz = new Float32Array(capacity);
  }

  add(point: SurfacePoint, slot: number, share: number): void {
    if (this.count === this.capacity) this.grow();
    const i = this.count++;
    this.slot[i] = slot;
    this.kind[i] = point.kind;
    this.owner[i] = point.owner;
    this.share[i] = share * point.share;
    this.x[i] = point.x;
    this.y[i] = point.y;
    this.z[i] = point.z;
    this.nx[i] = point.nx;
    this.ny[i] = point.ny;
    this.nz[i] = point.nz;
  }

  private grow(): void {
    const old = { ...this };
    const bigger = new Samples(Math.ceil(this.capacity * 1.5) + 64);
    for (const key of ['slot', 'kind', 'owner', 'share', 'x', 'y', 'z', 'nx', 'ny', 'nz'] as const) {
      bigger[key].set(old[key]);
      this[key] = bigger[key] as never;
    }
    this.capacity = bigger.capacity;
  }
}
