import { createNightRenderer, type NightRenderer, type PictureSize } from '../../../night';
import type { SheetImage } from '../canvas/sheet-image';
import type { NightFrame } from './controller';

/**
 * The longer side of the picture in pixels. Without WebGL every pixel is worked out by the processor: then fewer,
 * so that a drag still follows.
 */
const LONG_EDGE = { webgl: 2048, canvas: 1100 } as const;

function sizeOf(image: SheetImage, longEdge: number): PictureSize {
  const share = Math.min(1, longEdge / Math.max(image.width, image.height));
  return { width: Math.round(image.width * share), height: Math.round(image.height * share) };
}

/** The sheet's photo or drawing as it looks at night, drawn anew for every frame of the evening. */
export class NightPicture {
  readonly image: SheetImage;
  private readonly renderer: NightRenderer;
  private readonly source = document.createElement('canvas');
  private readonly shown = document.createElement('canvas');

  /** @param changed is called when `image` shows what was drawn last */
  constructor(
    photo: SheetImage,
    private readonly changed: () => void,
  ) {
    const whole = photo.levels[0]!;
    const size = sizeOf(photo, LONG_EDGE.webgl);
    this.renderer = createNightRenderer(this.source, whole, size);
    if (this.renderer.kind === 'canvas') this.renderer.setPhoto(whole, sizeOf(photo, LONG_EDGE.canvas));
    const { width, height } = this.source;
    this.shown.width = width;
    this.shown.height = height;
    this.image = { levels: [this.shown], width, height };
  }

  draw({ light, look, whiteLux }: NightFrame): void {
    this.renderer.draw(light, look, whiteLux);
    // Panning and zooming draw from a copy: reading from WebGL each time is dear.
    if (this.renderer.kind === 'webgl') this.copy();
    else void this.renderer.drawn().then(() => this.copy());
  }

  dispose(): void {
    this.renderer.dispose();
  }

  private copy(): void {
    this.shown.getContext('2d', { alpha: false })?.drawImage(this.source, 0, 0);
    this.changed();
  }
}
