import {
  groundLux,
  type LuxFigures,
  type LuxUnit,
  luxOnSheet,
  type NeighbourCaution,
  type NightScene,
  neighbourCautions,
  spaceOf,
} from '@lampwright/geometry/light';
import type { PlanDocument, PlanPoint } from '@lampwright/geometry/plan';
import type { PlanePoint } from '@lampwright/geometry/sheet';

/** A path or an area whose light is told, in sheet pixels. */
export interface Subject {
  readonly id: string;
  readonly kind: 'path' | 'area';
  readonly points: readonly PlanPoint[];
}

/** What is asked of whoever works out figures: a scene with the lamps that are on, and what to look at in it. */
export interface FiguresAsk {
  readonly scene: NightScene;
  readonly doc: PlanDocument;
  readonly unit: LuxUnit;
  readonly subjects: readonly Subject[];
  /** Places on the ground, in metres. */
  readonly places: readonly PlanePoint[];
}

export interface FiguresAnswer {
  /** By subject; null for one that is not on the ground. */
  readonly figures: ReadonlyMap<string, LuxFigures | null>;
  readonly cautions: readonly NeighbourCaution[];
  /** Lux of each place. */
  readonly lux: readonly number[];
}

/** Figures of light, by the laws of light alone: nothing of the picture goes into them. */
export function figuresOf({ scene, doc, unit, subjects, places }: FiguresAsk): FiguresAnswer {
  const space = spaceOf(scene);
  return {
    figures: new Map(
      subjects.map(({ id, kind, points }) => [id, luxOnSheet(scene, space, { kind, points })]),
    ),
    cautions: neighbourCautions(doc, scene, space, unit),
    lux: places.map(({ x, y }) => groundLux(space, x, y)),
  };
}
