import { createNightRenderer, type NightRenderer, type PictureSize } from '../../../night';
import { isWebglSlow } from '../../../night/software';
import type { SheetImage } from '../canvas/sheet-image';
import type { NightFrame } from './controller';

type Kind = NightRenderer['kind'];

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
/** No longer than this, however busy the machine is. */
const LONGEST_REST_MS = 1000;

function sizeOf(image: SheetImage, longEdge: number): PictureSize {
  const share = Math.min(1, longEdge / Math.max(image.width, image.height));
  return { width: Math.round(image.width * share), height: Math.round(image.height * share) };
}

/** The sheet at night in one size. */
class Plate {
  readonly image: SheetImage;
  private readonly renderer: NightRenderer;
  private readonly source = document.createElement('canvas');
  /** Panning and zooming draw from a copy of WebGL's canvas: reading from that each time is dear. */
  private readonly copy: HTMLCanvasElement | null;

  constructor(photo: SheetImage, longEdge: Readonly<Record<Kind, number>>, prefer: Kind) {
    const whole = photo.levels[0]!;
    this.renderer = createNightRenderer(this.source, whole, sizeOf(photo, longEdge[prefer]), prefer);
    if (this.renderer.kind !== prefer)
      this.renderer.setPhoto(whole, sizeOf(photo, longEdge[this.renderer.kind]));
    const { width, height } = this.source;
    this.copy = this.renderer.kind === 'webgl' ? document.createElement('canvas') : null;
    if (this.copy !== null) Object.assign(this.copy, { width, height });
    this.image = { levels: [this.copy ?? this.source], width, height };
  }

  get kind(): Kind {
    return this.renderer.kind;
  }

  /** Calls back when `image` shows it; at once where it is drawn by WebGL. */
  draw({ light, look, whiteLux }: NightFrame, done: () => void): void {
    this.renderer.draw(light, look, whiteLux);
    if (this.copy === null) {
      void this.renderer.drawn().then(done);
      return;
    }
    this.copy.getContext('2d', { alpha: false })?.drawImage(this.source, 0, 0);
    done();
  }

  dispose(): void {
    this.renderer.dispose();
  }
}

/**
 * The sheet's photo or drawing as it looks at night, drawn anew for every frame of the evening. Where that takes
 * long, what moves is drawn smaller, and finely once it rests. A frame that comes while another is being drawn
 * waits for it; of several that wait only the newest is drawn, so that pictures come one by one however fast
 * frames do.
 */
export class NightPicture {
  image: SheetImage;
  private readonly prefer: Kind;
  private fine: Plate;
  private quick: Plate | null = null;
  /** How long the fine picture took last. */
  private fineMs = 0;
  private drawnOnce = false;
  private lightened = false;
  private resting: ReturnType<typeof setTimeout> | null = null;
  private latest: NightFrame | null = null;
  /** The quick picture is being drawn. */
  private busy = false;
  private disposed = false;

  /** @param changed is called when `image` shows what was drawn last */
  constructor(
    private readonly photo: SheetImage,
    private readonly changed: () => void,
  ) {
    this.prefer = isWebglSlow() ? 'canvas' : 'webgl';
    this.fine = new Plate(photo, FINE_EDGE, this.prefer);
    this.image = this.fine.image;
  }

  draw(frame: NightFrame): void {
    this.latest = frame;
    if (this.resting !== null) clearTimeout(this.resting);
    this.resting = null;
    if (this.fine.kind === 'webgl' && this.fineMs <= SLOW_MS) this.drawFinely(frame);
    else if (!this.busy) this.drawQuickly(frame);
  }

  dispose(): void {
    this.disposed = true;
    if (this.resting !== null) clearTimeout(this.resting);
    this.fine.dispose();
    this.quick?.dispose();
  }

  private drawQuickly(frame: NightFrame): void {
    this.quick ??= new Plate(this.photo, { webgl: QUICK_EDGE, canvas: QUICK_EDGE }, this.prefer);
    const plate = this.quick;
    this.busy = true;
    plate.draw(frame, () => {
      this.busy = false;
      if (this.disposed) return;
      this.show(plate);
      const { latest } = this;
      if (latest !== null && latest !== frame) this.drawQuickly(latest);
      else this.rest(frame);
    });
  }

  private rest(frame: NightFrame): void {
    const wait = Math.min(Math.max(REST_MS, this.fineMs * RESTS_OF_FINE), LONGEST_REST_MS);
    this.resting = setTimeout(() => {
      this.resting = null;
      this.drawFinely(frame);
    }, wait);
  }

  private drawFinely(frame: NightFrame): void {
    const startedAt = performance.now();
    const plate = this.fine;
    plate.draw(frame, () => {
      if (this.disposed) return;
      this.fineMs = performance.now() - startedAt;
      this.lighten();
      // Something may have moved while it was under way.
      if (frame === this.latest) this.show(plate);
    });
  }

  private show(plate: Plate): void {
    this.image = plate.image;
    this.changed();
  }

  /** The first picture is no measure: everything is set up for it. Without WebGL nothing is held up. */
  private lighten(): void {
    const measured = this.drawnOnce;
    this.drawnOnce = true;
    if (!measured || this.lightened || this.fineMs <= HEAVY_MS || this.fine.kind === 'canvas') return;
    this.lightened = true;
    this.fine.dispose();
    this.fine = new Plate(this.photo, { webgl: LIGHTER_EDGE, canvas: LIGHTER_EDGE }, this.prefer);
  }
}
