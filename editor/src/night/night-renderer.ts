import type { LightMap, Look } from '@lampwright/geometry/night';

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
