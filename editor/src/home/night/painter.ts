import type { NightScene } from '@lampwright/geometry/light';
import { type LightMap, lookAt } from '@lampwright/geometry/night';
import { createNightRenderer, type NightRenderer } from '../../night';
import { type Lights, lightsOf, type Shares } from './lights';

/** Enough for a close look; more costs a phone its memory. */
const LONG_EDGE_PX = 1600;

export interface Shown {
  readonly sunDegrees: number;
  readonly shares: Shares;
}

interface Listener {
  /** Has drawn for the first time. */
  readonly onDrawn: () => void;
  readonly onFailed: (error: unknown) => void;
}

/** Draws a sheet's evening over its photo: a change of sky at once, one of lights as soon as it is summed. */
export class Painter {
  private readonly renderer: NightRenderer;
  private readonly lights: Lights;
  private light: LightMap | null = null;
  private summed: Shares | null = null;
  private wanted: Shown | null = null;
  private busy = false;
  private gone = false;

  /** @throws Error where nothing can be drawn on the canvas */
  constructor(
    canvas: HTMLCanvasElement,
    photo: HTMLImageElement,
    private readonly scene: NightScene,
    private readonly listener: Listener,
  ) {
    this.renderer = createNightRenderer(canvas, photo, sizeOf(photo));
    this.lights = lightsOf(scene);
  }

  show(shown: Shown): void {
    this.wanted = shown;
    this.draw();
    void this.sum();
  }

  dispose(): void {
    this.gone = true;
    this.lights.close();
    this.renderer.dispose();
  }

  private async sum(): Promise<void> {
    if (this.busy) return;
    this.busy = true;
    try {
      while (!this.gone && this.wanted && this.wanted.shares !== this.summed) {
        const { shares } = this.wanted;
        const light = await this.lights.sum(shares);
        if (this.gone) return;
        const first = this.light === null;
        this.light = light;
        this.summed = shares;
        this.draw();
        if (!first) continue;
        await this.renderer.drawn();
        if (!this.gone) this.listener.onDrawn();
      }
    } catch (error) {
      if (!this.gone) this.listener.onFailed(error);
    } finally {
      this.busy = false;
    }
  }

  private draw(): void {
    if (!this.light || !this.wanted) return;
    this.renderer.draw(this.light, lookAt(this.wanted.sunDegrees), this.scene.whiteLux);
  }
}

/** The photo's own, or as much of it as is kept. */
function sizeOf({ naturalWidth, naturalHeight }: HTMLImageElement): { width: number; height: number } {
  const scale = Math.min(1, LONG_EDGE_PX / Math.max(naturalWidth, naturalHeight));
  return { width: Math.round(naturalWidth * scale), height: Math.round(naturalHeight * scale) };
}
