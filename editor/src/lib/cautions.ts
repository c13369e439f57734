import {
  diggingCautions,
  estimateCaution,
  type ProtectiveDevice,
  placingCautions,
  transformerCautions,
} from '@lampwright/geometry/cautions';
import type { Stage } from './stages';

/** The cautions of the work that a job in this stage is about; none where nobody can be hurt. */
export function stageCautions(stage: Stage, device: ProtectiveDevice): readonly string[] {
  switch (stage) {
    case 'enquiry':
      return transformerCautions(device);
    case 'plan':
    case 'prove':
      return [...placingCautions, estimateCaution];
    case 'propose':
      return [estimateCaution];
    case 'prepare':
      return diggingCautions;
    case 'install':
      return [
        ...diggingCautions,
        ...transformerCautions(device),
        ...placingCautions,
        'Mind ladders and trees: a second person below, and nothing overhead.',
      ];
    case 'commission':
    case 'aftercare':
      return [...transformerCautions(device), 'Mind ladders and trees, at night above all.'];
  }
}
