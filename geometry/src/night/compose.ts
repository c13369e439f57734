import { codeOf } from './code.js';
import { LUMA, linearOf } from './colour.js';
import type { LightMap } from './layers.js';
import type { Look } from './look.js';

/** A picture as a canvas holds it: sRGB, four bytes a pixel. */
export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly data: Uint8ClampedArray;
}

/** Colour of a lamp's own glow where no other light says it: about 2700 K as the camera sees it. */
export const GLOW_TINT = [1.28, 0.96, 0.5] as const;
/** So much of {@link GLOW_TINT}, as a share of white, is mixed into the light on a pixel to find its glow's colour. */
export const GLOW_TINT_SHARE = 0.01;

/**
 * Between these values of linear blue what is seen in a crown is ever more sky and less leaf: leaves throw back
 * next to no blue, and light that goes through a gap of theirs is gone.
 */
export const GAP_BLUE = [0.15, 0.45] as const;

const LINEAR = Float32Array.from({ length: 256 }, (_, code) => linearOf(code / 255));
/**
 * The night picture of a daylight photo of the same size as it: each pixel, taken as how much the surface
 * reflects, times what is left of daylight plus the lamps' light, with a soft shoulder towards white. In linear
 * light; the light map is read between its pixels (bilinear). Rounding to bytes is dithered, the same each time,
 * so that dark gradients have no steps.
 */
export function composeNight(
  photo: Picture,
  light: LightMap,
  look: Look,
  whiteLux: number,
): Uint8ClampedArray {
  const out = new Uint8ClampedArray(photo.width * photo.height * 4);
  composeRows(photo, light, look, whiteLux, out, 0, photo.height);
  return out;
}

/** {@link composeNight} of the rows `from` up to `to`, into a picture of the photo's size. */
export function composeRows(
  photo: Picture,
  light: LightMap,
  look: Look,
  whiteLux: number,
  out: Uint8ClampedArray,
  from: number,
  to: number,
): void {
  const { width, height, data } = photo;
  const { rgba, leaves } = light;
  const grade = look[light.view];
  const [ar, ag, ab] = grade.ambient;
  const { saturation, litSaturation, knee } = grade;
  const gain = grade.lamps / whiteLux;
  const glowGain = grade.lamps;
  const tintFloor = GLOW_TINT_SHARE * whiteLux;
  const lastColumn = light.width - 1;
  const lastRow = light.height - 1;
  for (let y = from; y < to; y++) {
    const fy = Math.min(Math.max(((y + 0.5) * light.height) / height - 0.5, 0), lastRow);
    const y0 = Math.floor(fy);
    const ty = fy - y0;
    const upper = y0 * light.width;
    const lower = Math.min(y0 + 1, lastRow) * light.width;
    for (let x = 0; x < width; x++) {
      const fx = Math.min(Math.max(((x + 0.5) * light.width) / width - 0.5, 0), lastColumn);
      const x0 = Math.floor(fx);
      const tx = fx - x0;
      const x1 = Math.min(x0 + 1, lastColumn);
      const a = (upper + x0) * 4;
      const b = (upper + x1) * 4;
      const c = (lower + x0) * 4;
      const d = (lower + x1) * 4;
      const wa = (1 - tx) * (1 - ty);
      const wb = tx * (1 - ty);
      const wc = (1 - tx) * ty;
      const wd = tx * ty;
      const lr = rgba[a]! * wa + rgba[b]! * wb + rgba[c]! * wc + rgba[d]! * wd;
      const lg = rgba[a + 1]! * wa + rgba[b + 1]! * wb + rgba[c + 1]! * wc + rgba[d + 1]! * wd;
      const lb = rgba[a + 2]! * wa + rgba[b + 2]! * wb + rgba[c + 2]! * wc + rgba[d + 2]! * wd;
      const glow = glowGain * (rgba[a + 3]! * wa + rgba[b + 3]! * wb + rgba[c + 3]! * wc + rgba[d + 3]! * wd);
      const i = (y * width + x) * 4;
      const r = LINEAR[data[i]!]!;
      const g = LINEAR[data[i + 1]!]!;
      const bl = LINEAR[data[i + 2]!]!;
      const luma = LUMA[0] * r + LUMA[1] * g + LUMA[2] * bl;
      const grey = (1 - saturation) * luma;
      let red = (grey + saturation * r) * ar;
      let green = (grey + saturation * g) * ag;
      let blue = (grey + saturation * bl) * ab;
      if (lr > 0) {
        let lit = gain;
        if (bl > GAP_BLUE[0]) {
          const leaf =
            leaves[a >> 2]! * wa + leaves[b >> 2]! * wb + leaves[c >> 2]! * wc + leaves[d >> 2]! * wd;
          const t = Math.min((bl - GAP_BLUE[0]) / (GAP_BLUE[1] - GAP_BLUE[0]), 1);
          lit *= 1 - (leaf / 255) * t * t * (3 - 2 * t);
        }
        const plain = (1 - litSaturation) * luma;
        red += (plain + litSaturation * r) * lr * lit;
        green += (plain + litSaturation * g) * lg * lit;
        blue += (plain + litSaturation * bl) * lb * lit;
      }
      if (glow > 0) {
        const tr = lr + tintFloor * GLOW_TINT[0];
        const tg = lg + tintFloor * GLOW_TINT[1];
        const tb = lb + tintFloor * GLOW_TINT[2];
        const k = glow / (LUMA[0] * tr + LUMA[1] * tg + LUMA[2] * tb);
        red += tr * k;
        green += tg * k;
        blue += tb * k;
      }
      const hash = hashOf(x, y);
      out[i] = byteOf(red, knee, hash & 0x3ff);
      out[i + 1] = byteOf(green, knee, (hash >>> 10) & 0x3ff);
      out[i + 2] = byteOf(blue, knee, (hash >>> 20) & 0x3ff);
      out[i + 3] = 255;
    }
  }
}

/** A byte whose mean over many pixels is the light's exact sRGB value; `noise` from 0 to 1023. */
function byteOf(light: number, knee: number, noise: number): number {
  const room = 1 - knee;
  const x = light <= knee || room <= 0 ? light : knee + room * (1 - Math.exp((knee - light) / room));
  const code = codeOf(x);
  // A whole code, as it comes of an untouched photo by day, stays what it is.
  return Math.floor(code + DITHER_EDGE + (noise / 1024) * (1 - 2 * DITHER_EDGE));
}

/** Codes this close to a whole one are rounded to it. */
export const DITHER_EDGE = 0.02;

/** 32 bits that look like chance, the same for the same pixel on every machine. */
export function hashOf(x: number, y: number): number {
  let h = Math.imul(x + 1, 0x9e3779b1) ^ Math.imul(y + 1, 0x85ebca77);
  h = Math.imul(h ^ (h >>> 15), 0x2c1b3c6d);
  h = Math.imul(h ^ (h >>> 12), 0x297a2d39);
  return (h ^ (h >>> 15)) >>> 0;
}
