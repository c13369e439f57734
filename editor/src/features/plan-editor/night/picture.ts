import { createNightRenderer, type NightRenderer, type PictureSize } from '../../../night';
import type { SheetImage } from '../canvas/sheet-image';
import type { NightFrame } from './controller';

/** The longer side of the picture at rest, in pixels. Without WebGL the processor works out every one of them. */
const FINE_EDGE = { webgl: 2048, canvas: 1400 } as const;
/** Of the picture while it moves, where the fine one takes too long to follow. */
const QUICK_EDGE = 720;
/** A picture that takes longer than this, in milliseconds, is not drawn while something moves. */
const SLOW_MS = 30;
/** One that takes longer than this would hold pointer and keys up even at rest: it is made smaller for good. */
const HEAVY_MS = 150;
const LIGHTER_EDGE = 1200;
/** Nothing has moved for so long, or for longer than the fine picture takes: it is drawn. */
const REST_MS = 250;
const RESTS_OF_FINE = 2;

function sizeOf(image: SheetImage, longEdge: number): PictureSize {
  const share = Math.min(1, longEdge / Math.max(image.width, image.height));
  return { width: Math.round(image.width * share), height: Math.round(image.height * share) };
}

/** The sheet at night in one size. */
class Plate {
  readonly image: SheetImage;
  private readonly renderer: NightRenderer;
  private readonly source = document.createElement('canvas');
  private readonly shown = document.createElement('canvas');

  constructor(photo: SheetImage, longEdge: Readonly<Record<NightRenderer['kind'], number>>) {
    const whole = photo.levels[0]!;
    this.renderer = createNightRenderer(this.source, whole, sizeOf(photo, longEdge.webgl));
    if (this.renderer.kind === 'canvas') this.renderer.setPhoto(whole, sizeOf(photo, longEdge.canvas));
    const { width, height } = this.source;
    this.shown.width = width;
    this.shown.height = height;
    this.image = { levels: [this.shown], width, height };
  }

  /** Settles when `image` shows it; at once where it is drawn by WebGL. */
  draw({ light, look, whiteLux }: NightFrame, done: () => void): void {
    this.renderer.draw(light, look, whiteLux);
    const copy = () => {
      // Panning and zooming draw from a copy: reading from WebGL each time is dear.
      this.shown.getContext('2d', { alpha: false })?.drawImage(this.source, 0, 0);
      done();
    };
    if (this.renderer.kind === 'webgl') copy();
    else void this.renderer.drawn().then(copy);
  }

  dispose(): void {
    this.renderer.dispose();
  }
}

/**
 * The sheet's photo or drawing as it looks at night, drawn anew for every frame of the evening. Where that takes
 * long, what moves is drawn smaller, and finely once it rests.
 */
export class NightPicture {
  image: SheetImage;
  private fine: Plate;
  private quick: Plate | null = null;
  /** How long the fine picture took last. */
  private fineMs = 0;
  private drawnOnce = false;
  private lightened = false;
  private resting: ReturnType<typeof setTimeout> | null = null;
  private latest: NightFrame | null = null;
  private disposed = false;

  /** @param changed is called when `image` shows what was drawn last */
  constructor(
    private readonly photo: SheetImage,
    private readonly changed: () => void,
  ) {
    this.fine = new Plate(photo, FINE_EDGE);
    this.image = this.fine.image;
  }

  draw(frame: NightFrame): void {
    this.latest = frame;
    if (this.resting !== null) clearTimeout(this.resting);
    this.resting = null;
    if (this.fineMs <= SLOW_MS) {
      this.drawOn(this.fine, frame);
      return;
    }
    this.quick ??= new Plate(this.photo, { webgl: QUICK_EDGE, canvas: QUICK_EDGE });
    this.drawOn(this.quick, frame);
    this.resting = setTimeout(
      () => {
        this.resting = null;
        this.drawOn(this.fine, frame);
      },
      Math.max(REST_MS, this.fineMs * RESTS_OF_FINE),
    );
  }

  dispose(): void {
    this.disposed = true;
    if (this.resting !== null) clearTimeout(this.resting);
    this.fine.dispose();
    this.quick?.dispose();
  }

  private drawOn(plate: Plate, frame: NightFrame): void {
    const startedAt = performance.now();
    plate.draw(frame, () => {
      if (this.disposed) return;
      if (plate === this.fine) {
        this.fineMs = performance.now() - startedAt;
        this.lighten();
        // Something has moved while it was under way.
        if (frame !== this.latest) return;
      } else if (this.resting === null) return;
      this.image = plate.image;
      this.changed();
    });
  }

  /** The first picture is no measure: everything is set up for it. */
  private lighten(): void {
    const measured = this.drawnOnce;
    this.drawnOnce = true;
    if (!measured || this.lightened || this.fineMs <= HEAVY_MS) return;
    this.lightened = true;
    this.fine.dispose();
    this.fine = new Plate(this.photo, { webgl: LIGHTER_EDGE, canvas: LIGHTER_EDGE });
  }
}
