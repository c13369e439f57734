import type { Spot } from './view';

/** Width to height of the frame; a picture of another shape lies in its middle. */
export const FRAME = 3 / 2;

interface Size {
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Where a picture lies in the frame, in shares of it. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
}

export function boxOf({ widthPx, heightPx }: Size): Box {
  const shape = widthPx / heightPx;
  const width = Math.min(1, shape / FRAME);
  const height = Math.min(1, FRAME / shape);
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
