import type { NightScene } from '@lampwright/geometry/light';

/** A sheet's picture by night, and the scene that it was worked out from. */
export interface NightPicture {
  readonly scene: NightScene;
  /** JPEG. */
  readonly picture: Buffer;
}
