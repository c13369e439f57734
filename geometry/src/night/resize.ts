import { codeOf } from './code.js';
import { linearOf } from './colour.js';
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
  const data = new Uint8ClampedArray(width * height * 4);
  const columns = partsOf(picture.width, width);
  const rows = partsOf(picture.height, height);
  const row = new Float32Array(width * 3);
  const sum = new Float32Array(width * 3);
  for (let y = 0; y < height; y++) {
    sum.fill(0);
    for (let k = rows.start[y]!; k < rows.start[y + 1]!; k++) {
      squeeze(picture, rows.at[k]!, columns, row);
      const part = rows.share[k]!;
      for (let i = 0; i < sum.length; i++) sum[i]! += row[i]! * part;
    }
    for (let x = 0, i = y * width * 4; x < width; x++, i += 4) {
      data[i] = codeOf(sum[x * 3]!);
      data[i + 1] = codeOf(sum[x * 3 + 1]!);
      data[i + 2] = codeOf(sum[x * 3 + 2]!);
      data[i + 3] = 255;
    }
  }
  return { width, height, data };
}

/** Of each pixel along one side: which pixels of the larger picture it covers, and how much of it each is. */
interface Parts {
  readonly start: Uint32Array;
  readonly at: Uint32Array;
  readonly share: Float32Array;
}

function partsOf(from: number, to: number): Parts {
  const start = new Uint32Array(to + 1);
  const at: number[] = [];
  const share: number[] = [];
  const per = from / to;
  for (let x = 0; x < to; x++) {
    start[x] = at.length;
    const low = x * per;
    const high = Math.min(low + per, from);
    for (let k = Math.floor(low); k < high; k++) {
      at.push(k);
      share.push((Math.min(k + 1, high) - Math.max(k, low)) / (high - low));
    }
  }
  start[to] = at.length;
  return { start, at: Uint32Array.from(at), share: Float32Array.from(share) };
}

/** One row of linear light, brought down in width. */
function squeeze({ width, data }: Picture, y: number, { start, at, share }: Parts, row: Float32Array): void {
  for (let x = 0; x + 1 < start.length; x++) {
    let r = 0;
    let g = 0;
    let b = 0;
    for (let k = start[x]!; k < start[x + 1]!; k++) {
      const i = (y * width + at[k]!) * 4;
      const part = share[k]!;
      r += LINEAR[data[i]!]! * part;
      g += LINEAR[data[i + 1]!]! * part;
      b += LINEAR[data[i + 2]!]! * part;
    }
    row[x * 3] = r;
    row[x * 3 + 1] = g;
    row[x * 3 + 2] = b;
  }
}
