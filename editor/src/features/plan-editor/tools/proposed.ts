import type { Reach } from '@lampwright/geometry/light';
import type { Aim, ItemChoice, PlanPoint } from '@lampwright/geometry/plan';
import type { Point } from '../../../plan-view/camera';

/** What is drawn of a light's aim, in sheet pixels. */
export interface DrawnAim {
  /** Where the fixture is marked. */
  readonly mark: Point;
  /** The light itself, above its mark. */
  readonly from: Point;
  /** What the middle of its beam meets. */
  readonly to: Point;
  readonly on: Reach['on'];
  /** The edge of the beam at half of its peak, as lines; none where it has no edge. */
  readonly edge: readonly (readonly Point[])[];
}

/** Lights as they are about to be placed, all alike, in sheet pixels. */
export interface LightsToPlace {
  readonly sheetId: string;
  readonly fixture: ItemChoice;
  readonly lamp: ItemChoice | null;
  readonly lights: readonly { readonly at: PlanPoint; readonly aim: Aim | null }[];
}

/** Lights that are proposed, with what is drawn of them. */
export interface ProposedPreview extends LightsToPlace {
  readonly kind: 'proposed';
  readonly initial: string;
  readonly aims: readonly DrawnAim[];
}
