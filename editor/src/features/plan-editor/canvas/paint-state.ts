import type { Aim } from '@lampwright/geometry/plan';
import type { Camera, Point, Size } from '../../../plan-view/camera';
import type { Scene } from '../../../plan-view/scene';
import type { GroundFigure } from '../night/ground-figures';
import type { DrawnAim } from '../tools/proposed';
import type { Preview } from '../tools/tool';

/** All that the painted layers depend on. */
export interface PaintState {
  readonly scene: Scene;
  readonly camera: Camera;
  readonly size: Size;
  readonly selection: ReadonlySet<string>;
  readonly hoveredId: string | null;
  readonly preview: Preview | null;
  /** The figures shown are of the plan before the last change. */
  readonly stale: boolean;
  /** Over a picture of the night marks step back. */
  readonly night: boolean;
  /** Figures of light on the ground. */
  readonly groundFigures: readonly GroundFigure[];
  readonly lengthText: (points: readonly Point[]) => string;
  /** Where a fixture's light goes, or would with another aim; null for what gives none. */
  readonly aimOf: (fixtureId: string, aim?: Aim | null) => DrawnAim | null;
}
