import type { LightMap, Look } from '@lampwright/geometry/night';
import { CanvasNight } from './canvas-night';
import { WebglNight } from './webgl-night';

/** Pixels of the picture, as wide and high as its canvas. */
export interface PictureSize {
  readonly width: number;
  readonly height: number;
}

export type NightPhoto = ImageBitmap | HTMLImageElement | HTMLCanvasElement;

/** Draws a night over a photo or drawing. */
export interface NightRenderer {
  readonly kind: 'webgl' | 'canvas';
  /**
   * Draws the light as it is at this moment; the map may be written over afterwards. On the fallback this may go
   * on for some frames, and a later picture replaces one that waits.
   */
  draw(light: LightMap, look: Look, whiteLux: number): void;
  /** Settles when what was asked for is on the canvas. */
  drawn(): Promise<void>;
  setPhoto(photo: NightPhoto, size: PictureSize): void;
  dispose(): void;
}

/**
 * The renderer for a canvas that has no context yet: WebGL 2 where there is one, else a plain canvas that shows
 * the same picture.
 *
 * @param prefer 'canvas' passes WebGL over, to compare the two
 */
export function createNightRenderer(
  canvas: HTMLCanvasElement,
  photo: NightPhoto,
  size: PictureSize,
  prefer: NightRenderer['kind'] = 'webgl',
): NightRenderer {
  const webgl = prefer === 'webgl' ? WebglNight.on(canvas, photo, size) : null;
  return webgl ?? new CanvasNight(canvas, photo, size);
}
