import type { Stage } from './stages';

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

const digging = [
  'Call the utility locate service before digging. Mark private lines too (irrigation, gas, pet fence), and hand-dig near marks.',
  'Burial depth, conduit and everything on the line-voltage side follow local code.',
];
const placing = [
  'Keep away from pools, spas and fountains unless the equipment is listed for it and the code allows it.',
  'Hot lamps keep clear of mulch and leaves. Splices are of a kind listed for burial.',
];

/** The cautions of the work that a job in this stage is about; none where nobody can be hurt. */
export function stageCautions(stage: Stage, device: ProtectiveDevice): readonly string[] {
  switch (stage) {
    case 'enquiry':
      return transformerCautions(device);
    case 'plan':
    case 'prove':
      return [...placing, estimateCaution];
    case 'propose':
      return [estimateCaution];
    case 'prepare':
      return digging;
    case 'install':
      return [
        ...digging,
        ...transformerCautions(device),
        ...placing,
        'Mind ladders and trees: a second person below, and nothing overhead.',
      ];
    case 'commission':
    case 'aftercare':
      return [...transformerCautions(device), 'Mind ladders and trees, at night above all.'];
  }
}
