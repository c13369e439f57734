import type { LightSource, NightScene } from '../light/night-scene.js';
import { type LightSpace, spaceOf } from '../light/space.js';
import { lampColour, type Rgb } from './colour.js';
import { type Glow, glowOf } from './glow.js';
import { type LampLight, lampLightOn } from './lamp-light.js';
import { BLOCK, type SurfaceMap, surfaceMapOf } from './surface-map.js';

const BLOCK_PIXELS = BLOCK * BLOCK;

/** The light on each pixel of a sheet, at the surface map's size. */
export interface LightMap {
  readonly view: NightScene['view'];
  readonly width: number;
  readonly height: number;
  /** Lux on the surface seen, as linear sRGB of the camera's white; and the glow of lamps seen, 1 for white. */
  readonly rgba: Float32Array;
  /** How much of each pixel is crown, 0 to 255. */
  readonly leaves: Uint8Array;
  /** Another number whenever anything in it changed. */
  readonly version: number;
}

/** One lamp's light and glow. */
interface Layer {
  readonly source: LightSource;
  readonly colour: Rgb;
  readonly light: LampLight;
  readonly glow: Glow | null;
  /** Blocks that its light or glow is in. */
  readonly touched: Uint32Array;
  /** As it was in the last sum; 0 before the first. */
  share: number;
}

/** The light of a scene, lamp by lamp, so that lamps are moved, switched and dimmed without working out the rest. */
export class NightLight {
  private scene!: NightScene;
  private surfaces!: SurfaceMap;
  private surfacesKey!: string;
  private space!: LightSpace;
  private layers: Layer[] = [];
  private rgba!: Float32Array;
  /** Of each block: 1 where the sum is not that of the layers any more. */
  private stale!: Uint8Array;
  private version = 0;

  constructor(scene: NightScene, map: SurfaceMap) {
    this.begin(scene, map, keyOfSurfaces(scene));
  }

  private begin(scene: NightScene, map: SurfaceMap, key: string): void {
    this.scene = scene;
    this.surfaces = map;
    this.surfacesKey = key;
    this.space = spaceOf(scene);
    this.rgba = new Float32Array(map.width * map.height * 4);
    this.stale = new Uint8Array(map.blocksAcross * map.blocksDown).fill(1);
    this.layers = scene.sources.map((source) => this.layerOf(source));
  }

  get map(): SurfaceMap {
    return this.surfaces;
  }

  /** Takes over what changed in the scene: lamps that are as they were keep their light. Marks that changed need it all anew. */
  update(scene: NightScene): void {
    const key = scene === this.scene ? this.surfacesKey : keyOfSurfaces(scene);
    if (key !== this.surfacesKey) {
      this.begin(scene, surfaceMapOf(scene, this.surfaces.longEdge), key);
      return;
    }
    this.scene = scene;
    const before = new Map(this.layers.map((layer) => [layer.source.id, layer]));
    const kept = new Set<Layer>();
    const layers = scene.sources.map((source) => {
      const was = before.get(source.id);
      if (!was || !isSameLight(was.source, source)) return this.layerOf(source);
      kept.add(was);
      return was.source === source ? was : { ...was, source };
    });
    for (const layer of this.layers) if (!kept.has(layer) && layer.share > 0) this.touch(layer);
    // Sums of the same lamps in another order differ in their last digit.
    const order = (list: readonly Layer[]) => list.map(({ source }) => source.id).join('\n');
    if (order(layers) !== order(this.layers)) this.stale.fill(1);
    this.layers = layers;
  }

  /**
   * The light of all lamps, each at its share (0 off, 1 on). The map returned is the same one each time, written
   * over where something changed; another one after marks changed.
   */
  sum(share: (source: LightSource) => number): LightMap {
    for (const layer of this.layers) {
      const now = share(layer.source);
      if (now === layer.share) continue;
      layer.share = now;
      this.touch(layer);
    }
    if (this.stale.includes(1)) {
      this.version++;
      this.addUp();
    }
    const { view, width, height, leaves } = this.surfaces;
    return { view, width, height, leaves, rgba: this.rgba, version: this.version };
  }

  private touch(layer: Layer): void {
    for (const block of layer.touched) this.stale[block] = 1;
  }

  private addUp(): void {
    const { rgba, stale } = this;
    const { width, height, blocksAcross } = this.surfaces;
    for (let b = 0; b < stale.length; b++) {
      if (stale[b] === 0) continue;
      const left = (b % blocksAcross) * BLOCK;
      const top = Math.floor(b / blocksAcross) * BLOCK;
      const right = Math.min(left + BLOCK, width);
      for (let y = top; y < Math.min(top + BLOCK, height); y++)
        rgba.fill(0, (y * width + left) * 4, (y * width + right) * 4);
    }
    for (const layer of this.layers) {
      if (layer.share === 0) continue;
      this.addLight(layer);
      if (layer.glow) this.addGlow(layer.glow, layer.share);
    }
    stale.fill(0);
  }

  private addLight({ light, colour, share }: Layer): void {
    const { rgba, stale } = this;
    const { width, height, blocksAcross } = this.surfaces;
    const r = colour[0] * share;
    const g = colour[1] * share;
    const b = colour[2] * share;
    for (let k = 0; k < light.blocks.length; k++) {
      const block = light.blocks[k]!;
      if (stale[block] === 0) continue;
      const left = (block % blocksAcross) * BLOCK;
      const top = Math.floor(block / blocksAcross) * BLOCK;
      const columns = Math.min(BLOCK, width - left);
      const rows = Math.min(BLOCK, height - top);
      for (let y = 0; y < rows; y++) {
        let from = k * BLOCK_PIXELS + y * BLOCK;
        let to = ((top + y) * width + left) * 4;
        for (let x = 0; x < columns; x++, from++, to += 4) {
          const lux = light.lux[from]!;
          rgba[to]! += lux * r;
          rgba[to + 1]! += lux * g;
          rgba[to + 2]! += lux * b;
        }
      }
    }
  }

  private addGlow(glow: Glow, share: number): void {
    const { rgba, stale } = this;
    const { width, blocksAcross } = this.surfaces;
    for (let j = 0; j < glow.height; j++) {
      const y = glow.top + j;
      const row = Math.floor(y / BLOCK) * blocksAcross;
      for (let i = 0; i < glow.width; i++) {
        const x = glow.left + i;
        if (stale[row + Math.floor(x / BLOCK)] === 0) continue;
        rgba[(y * width + x) * 4 + 3]! += glow.values[j * glow.width + i]! * share;
      }
    }
  }

  private layerOf(source: LightSource): Layer {
    const light = lampLightOn(this.surfaces, source, this.space, this.scene.whiteLux);
    const glow = glowOf(this.surfaces, source);
    const touched = new Set(light.blocks);
    if (glow)
      for (let y = Math.floor(glow.top / BLOCK); y * BLOCK < glow.top + glow.height; y++)
        for (let x = Math.floor(glow.left / BLOCK); x * BLOCK < glow.left + glow.width; x++)
          touched.add(y * this.surfaces.blocksAcross + x);
    return {
      source,
      colour: lampColour(source.cctKelvin),
      light,
      glow,
      touched: Uint32Array.from(touched),
      share: 0,
    };
  }
}

/** All of a scene that every lamp's light depends on. */
function keyOfSurfaces({
  view,
  widthPx,
  heightPx,
  groundMatrix,
  whiteLux,
  faces,
  trees,
  buildings,
}: NightScene): string {
  return JSON.stringify([view, widthPx, heightPx, groundMatrix, whiteLux, faces, trees, buildings]);
}

/** Whether a lamp gives the same light as before; in which zone or group it is changes none. */
export function isSameLight(a: LightSource, b: LightSource): boolean {
  return (
    a === b ||
    (a.x === b.x &&
      a.y === b.y &&
      a.z === b.z &&
      a.axis.every((n, i) => n === b.axis[i]) &&
      a.peakCandela === b.peakCandela &&
      a.halfAngle === b.halfAngle &&
      a.shield === b.shield &&
      a.quantity === b.quantity &&
      a.output === b.output &&
      a.cctKelvin === b.cctKelvin &&
      a.treeId === b.treeId)
  );
}
