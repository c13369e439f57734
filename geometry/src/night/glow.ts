import type { FixtureKind } from '../catalogue/item.js';
import { intensityAt } from '../light/beam.js';
import type { LightSource } from '../light/night-scene.js';
import type { SurfaceMap } from './surface-map.js';

/**
 * The glow of a lamp that is itself in the picture: a small bright core, where lens or lit hood is seen, and the
 * faint bloom that a camera adds around it. Its strength goes with the candela towards the viewer; how it spreads
 * is a matter of taste, and small.
 */
export interface Glow {
  /** Map pixels. */
  readonly left: number;
  readonly top: number;
  readonly width: number;
  readonly height: number;
  /** Shares of white. */
  readonly values: Float32Array;
}

/** Share of its peak that a lamp throws aside on its hood and lens, seen from anywhere. */
function thrownAside(kind: FixtureKind): number {
  switch (kind) {
    case 'path':
    case 'bollard':
    case 'step':
    case 'linear':
      return 0.03;
    case 'up':
    case 'down':
    case 'flood':
    case 'wall-wash':
    case 'in-grade':
    case 'underwater':
      return 0.0004;
  }
}
/** Candela towards the viewer at which a core is as good as white. */
const WHITE_CANDELA = 12;
/** Of the core and of the bloom, in thousandths of the map's long edge. */
const CORE_PER_MILLE = 1.1;
const BLOOM_PER_MILLE = 7;
const BLOOM_SHARE = 0.1;
/** Bloom radii after which nothing is left. */
const REACH = 3;
/** A lamp that lies by less than this share of its distance behind what the map shows there is seen. */
const HIDDEN_SHARE = 0.02;

/** Null where the lamp is not seen. */
export function glowOf(map: SurfaceMap, source: LightSource): Glow | null {
  const seen = map.viewer.see(source.x, source.y, source.z);
  const candela = source.peakCandela * source.quantity * source.output;
  if (!seen || !(candela > 0)) return null;
  const u = seen.u * map.perSheet;
  const v = seen.v * map.perSheet;
  if (!(u >= 0 && v >= 0 && u < map.width && v < map.height)) return null;
  const shown = map.depth[Math.floor(v) * map.width + Math.floor(u)]!;
  if (map.view === 'photo' && seen.depth > shown * (1 + HIDDEN_SHARE) && source.treeId === null) return null;
  const strength = Math.min(
    Math.sqrt((candela * towardsViewer(map, source)) / source.peakCandela / WHITE_CANDELA),
    1.4,
  );
  const core = Math.max((CORE_PER_MILLE / 1000) * map.longEdge, 0.7);
  const bloom = (BLOOM_PER_MILLE / 1000) * map.longEdge;
  const reach = REACH * bloom;
  const left = Math.max(Math.floor(u - reach), 0);
  const top = Math.max(Math.floor(v - reach), 0);
  const width = Math.min(Math.ceil(u + reach), map.width) - left;
  const height = Math.min(Math.ceil(v + reach), map.height) - top;
  const values = new Float32Array(width * height);
  for (let j = 0; j < height; j++)
    for (let i = 0; i < width; i++) {
      const r = Math.hypot(left + i + 0.5 - u, top + j + 0.5 - v);
      const edge = Math.max(1 - r / reach, 0);
      values[j * width + i] =
        strength * (Math.exp(-((r / core) ** 2)) + BLOOM_SHARE * edge * edge * Math.exp(-r / bloom));
    }
  return { left, top, width, height, values };
}

/** Candela of one light towards the viewer. */
function towardsViewer(
  map: SurfaceMap,
  { kind, x, y, z, axis, peakCandela, halfAngle, shield }: LightSource,
): number {
  const { eye } = map.viewer;
  const to = eye ? [eye.x - x, eye.y - y, eye.z - z] : [0, 0, 1];
  const length = Math.hypot(to[0]!, to[1]!, to[2]!) || 1;
  const cosine = (to[0]! * axis[0] + to[1]! * axis[1] + to[2]! * axis[2]) / length;
  const angle = Math.acos(Math.min(Math.max(cosine, -1), 1));
  const beam = { peakCandela, halfAngle: halfAngle ?? Number.POSITIVE_INFINITY, shield };
  return Math.max(intensityAt(beam, angle), thrownAside(kind) * peakCandela);
}
