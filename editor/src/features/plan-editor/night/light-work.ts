import type { NightScene } from '@lampwright/geometry/light';
import { type LightMap, NightLight, surfaceMapOf } from '@lampwright/geometry/night';
import { MovingLight } from './moving-light';
import type { Shares } from './shares';

/** What is asked of whoever works out light: a scene, and what of it shines. */
export interface LightAsk {
  readonly scene: NightScene;
  readonly shares: Shares;
  /** Pixels of the longer side of the map. */
  readonly longEdge: number;
  /** A hand is moving lamps: a map half as fine will do, if it only comes soon. */
  readonly moving: boolean;
}

interface Kept {
  readonly sheetId: string;
  readonly longEdge: number;
  /** What `light` is of. */
  still: NightScene;
  readonly light: NightLight;
}

/**
 * Works out light, and keeps what it worked out while the sheet stays: lamps that did not change cost nothing.
 * Plain computing, to be run where it holds nobody up.
 */
export class LightWork {
  private kept: Kept | null = null;
  private readonly moving = new MovingLight();

  light({ scene, shares, longEdge, moving }: LightAsk): LightMap {
    const { sheetId } = scene;
    let { kept } = this;
    if (kept?.sheetId !== sheetId || kept.longEdge !== longEdge) {
      kept = { sheetId, longEdge, still: scene, light: new NightLight(scene, surfaceMapOf(scene, longEdge)) };
      this.kept = kept;
    }
    if (moving) return this.moving.light(scene, shares, kept.still, kept.light);
    kept.still = scene;
    kept.light.update(scene);
    return kept.light.sum(({ id }) => shares[id] ?? 0);
  }

  /** Gets ready for lamps to be moved, so that their first step comes as soon as the next. */
  prepare(): void {
    if (this.kept !== null) this.moving.prepare(this.kept.still, this.kept.light);
  }
}
