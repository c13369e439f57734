import { CanvasNight } from './canvas-night';
import type { NightPhoto, NightRenderer, PictureSize } from './night-renderer';
import { WebglNight } from './webgl-night';

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
