/**
 * The cautions of the trade, wherever the work can hurt: shown by the screens, printed on papers. They defer
 * to local code and to licensed people.
 */

/** The protective device of outdoor outlets in the company's region: GFCI or RCD. */
export type ProtectiveDevice = string;

/** What estimates are, and what they are not. */
export const estimateCaution =
  'Estimates assist judgement. They do not replace local code or the equipment’s instructions.';

/** For whoever opens, mounts or measures at a transformer. */
export const transformerCautions = (device: ProtectiveDevice): readonly string[] => [
  `Line-voltage work belongs to a licensed electrician; the outlet is ${device}-protected, with an in-use cover.`,
  'Disconnect before working in the box. Live readings only by a competent person, with insulated probes and the line side covered.',
];

export const diggingCautions: readonly string[] = [
  'Call the utility locate service before digging. Mark private lines too (irrigation, gas, pet fence), and hand-dig near marks.',
  'Burial depth, conduit and everything on the line-voltage side follow local code.',
];

export const placingCautions: readonly string[] = [
  'Keep away from pools, spas and fountains unless the equipment is listed for it and the code allows it.',
  'Hot lamps keep clear of mulch and leaves. Splices are of a kind listed for burial.',
];

/** All that a proposal says, to whoever will live with the work. */
export const proposalCautions = (device: ProtectiveDevice): readonly string[] => [
  ...transformerCautions(device),
  ...diggingCautions,
  ...placingCautions,
  estimateCaution,
];
