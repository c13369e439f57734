import type { NightScene } from '@lampwright/geometry/light';
import { type LightMap, NightLight, surfaceMapOf } from '@lampwright/geometry/night';
import type { Shares } from './shares';

/** What is asked of whoever works out light: a scene, and what of it shines. */
export interface LightAsk {
  readonly scene: NightScene;
  readonly shares: Shares;
  /** Pixels of the longer side of the map. */
  readonly longEdge: number;
}

/**
 * Works out light, and keeps what it worked out while the sheet stays: lamps that did not change cost nothing.
 * Plain computing, to be run where it holds nobody up.
 */
export class LightWork {
  private kept: { readonly sheetId: string; readonly longEdge: number; readonly light: NightLight } | null =
    null;

  light({ scene, shares, longEdge }: LightAsk): LightMap {
    const { sheetId } = scene;
    if (this.kept?.sheetId === sheetId && this.kept.longEdge === longEdge) this.kept.light.update(scene);
    else this.kept = { sheetId, longEdge, light: new NightLight(scene, surfaceMapOf(scene, longEdge)) };
    return this.kept.light.sum(({ id }) => shares[id] ?? 0);
  }
}
