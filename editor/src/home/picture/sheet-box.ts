import type { Spot } from './view';

interface Size {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Beyond these a picture would fill the screen, or be a strip. */
const TALLEST = 4 / 5;
const WIDEST = 16 / 9;

/** Width to height of the frame: the picture's own, within reason; another picture lies in its middle. */
export const frameOf = ({ widthPx, heightPx }: Size): number =>
  Math.min(WIDEST, Math.max(TALLEST, widthPx / heightPx));

/** Where a picture lies in the frame, in shares of it. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export function boxOf(size: Size): Box {
  const shape = size.widthPx / size.heightPx;
  const frame = frameOf(size);
  const width = Math.min(1, shape / frame);
  const height = Math.min(1, frame / shape);
  return { left: (1 - width) / 2, top: (1 - height) / 2, width, height };
}

/** Sheet pixels → spot of the frame at no zoom. */
export function spotOf(size: Size, at: { readonly x: number; readonly y: number }): Spot {
  const box = boxOf(size);
  return {
    x: box.left + (at.x / size.widthPx) * box.width,
    y: box.top + (at.y / size.heightPx) * box.height,
  };
}

/** Spot of the frame at no zoom → sheet pixels, on the picture. */
export function pixelOf(size: Size, spot: Spot): { x: number; y: number } {
  const box = boxOf(size);
  const within = (n: number, most: number): number => Math.round(Math.min(most, Math.max(0, n)));
  return {
    x: within(((spot.x - box.left) / box.width) * size.widthPx, size.widthPx),
    y: within(((spot.y - box.top) / box.height) * size.heightPx, size.heightPx),
  };
}
