import type { ReferenceRecord, SheetRecord } from '@lampwright/geometry/plan';
import type { SceneMeasurement } from '../../../plan-view/scene';

type LengthText = (meters: number) => string;

/** A sheet's references as lines to draw while its scale is worked on. */
export function referenceLines(sheet: SheetRecord, length: LengthText): SceneMeasurement[] {
  return sheet.references.map((reference) => lineOf(reference, length));
}

function lineOf(reference: ReferenceRecord, length: LengthText): SceneMeasurement {
  switch (reference.kind) {
    case 'length':
      return { id: reference.id, points: [reference.a, reference.b], text: length(reference.meters) };
    case 'rectangle':
      return {
        id: reference.id,
        points: [...reference.corners, reference.corners[0]],
        text: `${length(reference.widthMeters)} by ${length(reference.depthMeters)}`,
      };
  }
}
