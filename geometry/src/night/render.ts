import type { LightSource, NightScene } from '../light/night-scene.js';
import { composeNight, type Picture } from './compose.js';
import { NightLight } from './layers.js';
import { lookAt } from './look.js';
import { resized } from './resize.js';
import { surfaceMapOf } from './surface-map.js';

export interface NightMoment {
  /** How far each lamp is on, 0 to 1. */
  readonly on: (source: LightSource) => number;
  readonly sunAltitude: number;
}

/** The light map of a still is so much smaller than the picture: finer is not seen. */
const STILL_MAP_SHARE = 0.6;
const LEAST_MAP_EDGE = 320;

/**
 * A still of a scene over its photo or drawing: all in one, for paper. The picture's longer side is `longEdge`
 * pixels, or as many as the photo has if that is fewer.
 */
export function renderNight(
  photo: Picture,
  scene: NightScene,
  { on, sunAltitude }: NightMoment,
  longEdge: number,
): Picture {
  const base = resized(photo, longEdge);
  const mapEdge = Math.max(Math.round(Math.max(base.width, base.height) * STILL_MAP_SHARE), LEAST_MAP_EDGE);
  const light = new NightLight(scene, surfaceMapOf(scene, mapEdge));
  const data = composeNight(base, light.sum(on), lookAt(sunAltitude), scene.whiteLux);
  return { width: base.width, height: base.height, data };
}
