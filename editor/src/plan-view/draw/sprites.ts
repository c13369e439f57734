import type { FixtureLook } from '../fixture-look';
import { drawFixture, markReach } from './fixture';

/**
 * Pictures of marks, drawn once and stamped: text is the dearest thing to draw on a canvas, and a plan has
 * many marks of few looks. Sizes come in half pixels, so zooming makes a dozen pictures, not hundreds.
 */
export class MarkSprites {
  private readonly kept = new Map<string, HTMLCanvasElement>();

  constructor(private readonly pixelRatio: number) {}

  /** Forget everything, e.g. when the typeface has arrived. */
  clear(): void {
    this.kept.clear();
  }

  stamp(
    ctx: CanvasRenderingContext2D,
    x: number,
    y: number,
    radius: number,
    look: FixtureLook,
    initial: string,
  ): void {
    const r = Math.round(radius * 2) / 2;
    const key = `${look.kind}${look.tint.toFixed(1)}${look.notch ?? ''}${initial}${r}`;
    let sprite = this.kept.get(key);
    const reach = markReach(r);
    if (sprite === undefined) {
      sprite = document.createElement('canvas');
      const px = Math.ceil(reach * 2 * this.pixelRatio);
      sprite.width = px;
      sprite.height = px;
      const own = sprite.getContext('2d');
      if (own !== null) {
        own.scale(this.pixelRatio, this.pixelRatio);
        own.translate(reach, reach);
        drawFixture(own, r, look, initial);
      }
      this.kept.set(key, sprite);
    }
    ctx.drawImage(
      sprite,
      x - reach,
      y - reach,
      sprite.width / this.pixelRatio,
      sprite.height / this.pixelRatio,
    );
  }
}
