export * from './path.js';
export {
  type Candidate,
  candidatesOf,
  type NoProposal,
  type Offer,
  onSheet,
  type Proposal,
  type ProposedLight,
  proposedKinds,
  spaceOfLights,
} from './proposal.js';
export * from './tree.js';
export * from './wall.js';
