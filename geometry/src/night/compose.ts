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
  const [ir, ig, ib] = grade.ink;
  const gain = grade.lamps / whiteLux;
  const glowGain = grade.lamps;
  const tintFloor = GLOW_TINT_SHARE * whiteLux;
  const row = rowOf(4 * light.width);
  const leafRow = leafRowOf(light.width);
  const perX = light.width / width;
  const lastColumn = light.width - 1;
  const lastRow = light.height - 1;
  for (let y = from; y < to; y++) {
    const fy = Math.min(Math.max(((y + 0.5) * light.height) / height - 0.5, 0), lastRow);
    const y0 = Math.floor(fy);
    const ty = fy - y0;
    mixRows(rgba, row, 4 * light.width, y0, Math.min(y0 + 1, lastRow), ty);
    mixRows(leaves, leafRow, light.width, y0, Math.min(y0 + 1, lastRow), ty);
    for (let x = 0; x < width; x++) {
      const fx = Math.min(Math.max((x + 0.5) * perX - 0.5, 0), lastColumn);
      const x0 = Math.floor(fx);
      const tx = fx - x0;
      const x1 = Math.min(x0 + 1, lastColumn);
      const a = 4 * x0;
      const b = 4 * x1;
      const sx = 1 - tx;
      const lr = row[a]! * sx + row[b]! * tx;
      const lg = row[a + 1]! * sx + row[b + 1]! * tx;
      const lb = row[a + 2]! * sx + row[b + 2]! * tx;
      const glow = glowGain * (row[a + 3]! * sx + row[b + 3]! * tx);
      const i = (y * width + x) * 4;
      const r = LINEAR[data[i]!]!;
      const g = LINEAR[data[i + 1]!]!;
      const bl = LINEAR[data[i + 2]!]!;
      const luma = LUMA[0] * r + LUMA[1] * g + LUMA[2] * bl;
      const grey = (1 - saturation) * luma;
      const dark2 = (1 - luma) * (1 - luma);
      const dark = dark2 * dark2 * dark2 * dark2 * dark2 * dark2;
      let red = (grey + saturation * r) * ar + dark * ir;
      let green = (grey + saturation * g) * ag + dark * ig;
      let blue = (grey + saturation * bl) * ab + dark * ib;
      if (lr > 0) {
        let lit = gain;
        if (bl > GAP_BLUE[0]) {
          const leaf = leafRow[x0]! * sx + leafRow[x1]! * tx;
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

/** Rows between the map's own, kept from one picture to the next. */
const rowOf = kept();
const leafRowOf = kept();

function kept(): (length: number) => Float32Array {
  let row = new Float32Array(0);
  return (length) => {
    if (row.length !== length) row = new Float32Array(length);
    return row;
  };
}

/** One row between two of a map, `share` of the way from the upper to the lower. */
function mixRows(
  map: Float32Array | Uint8Array,
  into: Float32Array,
  length: number,
  upper: number,
  lower: number,
  share: number,
): void {
  const above = upper * length;
  const below = lower * length;
  for (let i = 0; i < length; i++) into[i] = map[above + i]! * (1 - share) + map[below + i]! * share;
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
