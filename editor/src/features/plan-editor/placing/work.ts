import {
  type LuxUnit,
  type NightScene,
  type NoProposal,
  type Offer,
  type PathToLight,
  type Proposal,
  proposePath,
  proposeTree,
  proposeWall,
  spaceOf,
  type TreeToLight,
  type WallToLight,
} from '@lampwright/geometry/light';
import type { UnitSystem } from '@lampwright/geometry/units';

/** What lights are asked for, in ground metres. A tree's crown is that of the scene. */
export type ToLight =
  | ({ readonly kind: 'path' } & PathToLight)
  | ({ readonly kind: 'tree'; readonly treeId: string } & Omit<TreeToLight, 'crown'>)
  | ({ readonly kind: 'wall' } & WallToLight);

/** All that a proposal is made from: plain data, so that it can be asked of a worker. */
export interface ProposalAsk {
  readonly toLight: ToLight;
  readonly offers: readonly Offer[];
  /** What stops light; its lamps are not counted. */
  readonly scene: NightScene;
  readonly units: { readonly system: UnitSystem; readonly light: LuxUnit };
}

/** Takes up to a second for much ground and many items on offer. */
export function proposalOf({ toLight, offers, scene, units }: ProposalAsk): Proposal | NoProposal {
  const space = spaceOf(scene);
  switch (toLight.kind) {
    case 'path':
      return proposePath(toLight, offers, space, units);
    case 'tree': {
      const crown = space.crowns.find(({ id }) => id === toLight.treeId);
      if (crown === undefined)
        return {
          kind: 'refused',
          message: 'This tree’s crown is not over the ground of this sheet: mark its foot and outline again.',
        };
      return proposeTree({ ...toLight, crown }, offers, space, units.light);
    }
    case 'wall':
      return proposeWall(toLight, offers, space, units);
  }
}
