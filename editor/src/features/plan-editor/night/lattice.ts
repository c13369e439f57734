import { isUnder, isWithin, type NightScene, spaceOf } from '@lampwright/geometry/light';
import type { PlanPoint } from '@lampwright/geometry/plan';
import type { PlanePoint, SolvedScale } from '@lampwright/geometry/sheet';
import { type GroundPoint, meters } from '@lampwright/geometry/units';

/** A place on the ground where light is told as a figure. */
export interface LatticePlace {
  /** In metres. */
  readonly ground: PlanePoint;
  /** On the sheet. */
  readonly at: PlanPoint;
}

/** So far around the lamps, in metres, light is looked at. */
const AROUND_METERS = 4;
/** Metres from place to place: the closest that keeps to the most places. */
const SPACINGS = [0.5, 1, 2, 4, 8, 16] as const;
const MOST_PLACES = 2400;
/** Places are given coarse steps first, so that where there is no room for all, what stays is even. */
const COARSEST = 8;

/** Even places on the ground around the lamps, as far as the sheet shows it, those of coarser steps first. */
export function latticeOf(scene: NightScene, scale: SolvedScale): LatticePlace[] {
  if (scene.sources.length === 0) return [];
  const xs = scene.sources.map(({ x }) => x);
  const ys = scene.sources.map(({ y }) => y);
  const left = Math.min(...xs) - AROUND_METERS;
  const right = Math.max(...xs) + AROUND_METERS;
  const bottom = Math.min(...ys) - AROUND_METERS;
  const top = Math.max(...ys) + AROUND_METERS;
  const spacing =
    SPACINGS.find((s) => ((right - left) / s + 1) * ((top - bottom) / s + 1) <= MOST_PLACES) ??
    Math.sqrt(((right - left) * (top - bottom)) / MOST_PLACES);
  const seen = seenOn(scene, scale);
  const places: (LatticePlace & { readonly step: number })[] = [];
  // Whole steps from the origin of the ground, so that places stay where they are while lamps move.
  for (let j = Math.ceil(bottom / spacing); j * spacing <= top; j++)
    for (let i = Math.ceil(left / spacing); i * spacing <= right; i++) {
      const ground = { x: i * spacing, y: j * spacing };
      const at = seen(ground);
      if (at !== null) places.push({ ground, at, step: stepOf(i, j) });
    }
  return places.sort((a, b) => b.step - a.step).map(({ ground, at }) => ({ ground, at }));
}

/** The largest power of two that both are whole multiples of. */
function stepOf(i: number, j: number): number {
  let step = 1;
  while (step < COARSEST && i % (step * 2) === 0 && j % (step * 2) === 0) step *= 2;
  return step;
}

/** Where ground is seen on the sheet; null where it is off it, under a roof, or behind what is marked upright. */
function seenOn(scene: NightScene, scale: SolvedScale): (ground: PlanePoint) => PlanPoint | null {
  const { roofs } = spaceOf(scene);
  const upright =
    scene.view === 'plan'
      ? []
      : [
          ...scene.faces.flatMap(({ foot, top }) => (top === null ? [] : [[...foot, ...top.toReversed()]])),
          ...scene.trees.map(({ outline }) => outline),
        ];
  return ({ x, y }) => {
    if (roofs.some((roof) => isUnder(roof, { x, y, z: 0 }))) return null;
    const ground: GroundPoint = { x: meters(x), y: meters(y) };
    const at = scale.sheetFromGround(ground);
    if (at === null || at.x < 0 || at.y < 0 || at.x > scene.widthPx || at.y > scene.heightPx) return null;
    if (upright.some((outline) => isWithin(outline, at))) return null;
    return { x: at.x, y: at.y };
  };
}
