import { composeRows, type LightMap, type Look, rowsThatDiffer } from '@lampwright/geometry/night';
import type { NightPhoto, NightRenderer, PictureSize } from './night-renderer';
import { photoPixels } from './photo-pixels';

/** A slice is as many rows as take about this long, so that pointers and keys are heard in between. */
const SLICE_MS = 12;
const FIRST_ROWS = 64;

interface Wanted {
  /** A copy of its own. */
  readonly light: LightMap;
  readonly look: Look;
  readonly whiteLux: number;
}

/** Composes on the processor, slice by slice; the canvas changes once the whole picture is there. */
export class CanvasNight implements NightRenderer {
  readonly kind = 'canvas';
  private readonly context: CanvasRenderingContext2D;
  private photo!: ImageData;
  private picture!: ImageData;
  /** What is being composed, and what comes after it. */
  private now: Wanted | null = null;
  private next: Wanted | null = null;
  /** Room for a light map that is not in use: to ask for memory for each picture takes longer than to fill it. */
  private spare: Float32Array | null = null;
  /** What the picture shows. */
  private shown: Wanted | null = null;
  /** Rows that are still to be composed. */
  private row = 0;
  private end = 0;
  private rows = FIRST_ROWS;
  private timer: ReturnType<typeof setTimeout> | null = null;
  private waiting: (() => void)[] = [];
  private disposed = false;

  constructor(
    private readonly canvas: HTMLCanvasElement,
    photo: NightPhoto,
    size: PictureSize,
  ) {
    const context = canvas.getContext('2d', { alpha: false });
    if (!context) throw new Error('This browser gives no canvas to draw on.');
    this.context = context;
    this.setPhoto(photo, size);
  }

  setPhoto(photo: NightPhoto, size: PictureSize): void {
    this.canvas.width = size.width;
    this.canvas.height = size.height;
    this.photo = photoPixels(photo, size);
    this.picture = this.context.createImageData(size.width, size.height);
    this.shown = null;
    this.row = 0;
    this.end = size.height;
  }

  draw(light: LightMap, look: Look, whiteLux: number): void {
    if (this.disposed) return;
    const room = this.next?.light.rgba ?? this.spare;
    if (!this.next) this.spare = null;
    const rgba = room?.length === light.rgba.length ? room : new Float32Array(light.rgba.length);
    rgba.set(light.rgba);
    this.next = { light: { ...light, rgba }, look, whiteLux };
    if (this.timer === null) this.slice();
  }

  drawn(): Promise<void> {
    if (!this.now && !this.next) return Promise.resolve();
    return new Promise((resolve) => this.waiting.push(resolve));
  }

  dispose(): void {
    this.disposed = true;
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    this.finish();
  }

  private slice(): void {
    this.timer = null;
    if (!this.now) {
      this.now = this.next;
      this.next = null;
      this.begin();
    }
    const { now, photo, picture } = this;
    if (!now) return;
    const until = Math.min(this.row + this.rows, this.end);
    const startedAt = performance.now();
    composeRows(photo, now.light, now.look, now.whiteLux, picture.data, this.row, until);
    const took = performance.now() - startedAt;
    if (until > this.row)
      this.rows = Math.max(Math.round(((until - this.row) * SLICE_MS) / Math.max(took, 0.1)), 1);
    this.row = until;
    if (until === this.end) {
      this.context.putImageData(picture, 0, 0);
      this.spare = this.shown?.light.rgba ?? null;
      this.shown = now;
      this.now = null;
      if (!this.next) {
        this.finish();
        return;
      }
    }
    this.timer = setTimeout(() => this.slice(), 0);
  }

  /** Rows whose light is as it was stay as they are: while one lamp is dragged that is many of them. */
  private begin(): void {
    const { shown, now, photo } = this;
    this.row = 0;
    this.end = photo.height;
    if (!shown || !now || shown.look !== now.look || shown.whiteLux !== now.whiteLux) return;
    const { from, to } = rowsThatDiffer(shown.light, now.light, photo.height);
    this.row = from;
    this.end = to;
  }

  private finish(): void {
    const waiting = this.waiting;
    this.waiting = [];
    for (const resolve of waiting) resolve();
  }
}
