import { encodedOf, linearOf } from './colour.js';
import type { Picture } from './compose.js';

const LINEAR = Float32Array.from({ length: 256 }, (_, code) => linearOf(code / 255));

/**
 * The picture with its longer side brought down to so many pixels, each the mean of the area that it covers, in
 * linear light. A picture that is no larger is returned as it is.
 */
export function resized(picture: Picture, longEdge: number): Picture {
  const scale = longEdge / Math.max(picture.width, picture.height);
  if (!(scale < 1)) return picture;
  const width = Math.max(Math.round(picture.width * scale), 1);
  const height = Math.max(Math.round(picture.height * scale), 1);
  const across = squeezed(picture, width);
  const data = new Uint8ClampedArray(width * height * 4);
  const perRow = picture.height / height;
  for (let y = 0; y < height; y++) {
    const from = y * perRow;
    const to = Math.min(from + perRow, picture.height);
    for (let x = 0; x < width; x++) {
      let r = 0;
      let g = 0;
      let b = 0;
      for (let j = Math.floor(from); j < to; j++) {
        const part = Math.min(j + 1, to) - Math.max(j, from);
        const i = (j * width + x) * 3;
        r += across[i]! * part;
        g += across[i + 1]! * part;
        b += across[i + 2]! * part;
      }
      const i = (y * width + x) * 4;
      data[i] = 255 * encodedOf(r / (to - from));
      data[i + 1] = 255 * encodedOf(g / (to - from));
      data[i + 2] = 255 * encodedOf(b / (to - from));
      data[i + 3] = 255;
    }
  }
  return { width, height, data };
}

/** Linear light, each row brought down to so many pixels. */
function squeezed({ width: was, height, data }: Picture, width: number): Float32Array {
  const across = new Float32Array(width * height * 3);
  const perColumn = was / width;
  for (let x = 0; x < width; x++) {
    const from = x * perColumn;
    const to = Math.min(from + perColumn, was);
    for (let y = 0; y < height; y++) {
      let r = 0;
      let g = 0;
      let b = 0;
      for (let k = Math.floor(from); k < to; k++) {
        const part = Math.min(k + 1, to) - Math.max(k, from);
        const i = (y * was + k) * 4;
        r += LINEAR[data[i]!]! * part;
        g += LINEAR[data[i + 1]!]! * part;
        b += LINEAR[data[i + 2]!]! * part;
      }
      const i = (y * width + x) * 3;
      across[i] = r / (to - from);
      across[i + 1] = g / (to - from);
      across[i + 2] = b / (to - from);
    }
  }
  return across;
}
