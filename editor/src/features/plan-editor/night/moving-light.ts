import type { LightSource, NightScene } from '@lampwright/geometry/light';
import { isSameLight, type LightMap, NightLight, surfaceMapOf } from '@lampwright/geometry/night';
import type { Shares } from './shares';

/** What rests while a hand moves lamps. */
interface Rest {
  readonly still: NightScene;
  readonly shares: Shares;
  /** Lamps that the hand has moved since it took hold. */
  readonly moved: ReadonlySet<string>;
  readonly rgba: Float32Array;
}

/**
 * Light while a hand moves lamps, on a map half as fine, so that it follows: what rests is summed once, and each
 * step works out only what moves.
 */
export class MovingLight {
  private lamps: NightLight | null = null;
  private rest: Rest | null = null;
  private version = 0;

  /** Gets ready for lamps of a scene to be moved. */
  prepare(still: NightScene, whole: NightLight): NightLight {
    const empty = { ...still, sources: [] };
    const longEdge = Math.ceil(Math.max(whole.map.width, whole.map.height) / 2);
    if (this.lamps?.map.longEdge === longEdge) this.lamps.update(empty);
    else this.lamps = new NightLight(empty, surfaceMapOf(still, longEdge));
    return this.lamps;
  }

  /** @param whole the light of `still`, which is left without the lamps that move: sum it anew */
  light(scene: NightScene, shares: Shares, still: NightScene, whole: NightLight): LightMap {
    let { rest } = this;
    const moving = movedIn(scene, still);
    const holds =
      rest !== null && rest.still === still && [...moving].every((id) => rest?.moved.has(id) === true);
    const lamps = holds && this.lamps !== null ? this.lamps : this.prepare(still, whole);
    const moved = holds && rest !== null ? rest.moved : moving;
    if (rest === null || !holds || !sameBut(moved, rest.shares, shares)) {
      const sum = whole.sum(({ id }) => (moved.has(id) ? 0 : (shares[id] ?? 0)));
      rest = { still, shares, moved, rgba: brought(sum, lamps.map.width, lamps.map.height) };
      this.rest = rest;
    }
    lamps.update({ ...still, sources: scene.sources.filter(({ id }) => moved.has(id)) });
    const light = lamps.sum(({ id }) => shares[id] ?? 0);
    const rgba = new Float32Array(light.rgba);
    for (let i = 0; i < rgba.length; i++) rgba[i]! += rest.rgba[i]!;
    this.version++;
    return { ...light, rgba, version: this.version };
  }
}

/** Lamps of a scene that are not as they were. */
function movedIn(scene: NightScene, still: NightScene): ReadonlySet<string> {
  const before = new Map<string, LightSource>(still.sources.map((source) => [source.id, source]));
  const moved = scene.sources.filter((source) => {
    const was = before.get(source.id);
    return was === undefined || !isSameLight(was, source);
  });
  return new Set(moved.map(({ id }) => id));
}

/** Whether all lamps but those that move shine as before. */
function sameBut(moved: ReadonlySet<string>, a: Shares, b: Shares): boolean {
  const ids = Object.keys({ ...a, ...b });
  return ids.every((id) => moved.has(id) || a[id] === b[id]);
}

/** A map brought down to a smaller size, each pixel the mean of those in its place. */
function brought(light: LightMap, width: number, height: number): Float32Array {
  const smaller = new Float32Array(width * height * 4);
  for (let y = 0, to = 0; y < height; y++) {
    const top = Math.floor((y * light.height) / height);
    const bottom = Math.max(Math.floor(((y + 1) * light.height) / height), top + 1);
    for (let x = 0; x < width; x++, to += 4) {
      const left = Math.floor((x * light.width) / width);
      const right = Math.max(Math.floor(((x + 1) * light.width) / width), left + 1);
      const part = 1 / ((right - left) * (bottom - top));
      for (let v = top; v < bottom; v++)
        for (let u = left, from = (v * light.width + left) * 4; u < right; u++, from += 4)
          for (let k = 0; k < 4; k++) smaller[to + k]! += light.rgba[from + k]! * part;
    }
  }
  return smaller;
}
