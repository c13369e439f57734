import { faultOfCalibration } from './checks.js';
import { solvePerspective } from './perspective.js';
import type { Calibration, CalibrationFault } from './references.js';
import type { SolvedScale } from './scale.js';
import { solveSimilarity } from './similarity.js';

export type {
  Calibration,
  CalibrationFault,
  CalibrationFaultCode,
  DrawingScale,
  LengthReference,
  RectangleReference,
  ScaleReference,
} from './references.js';
export {
  type GroundReading,
  lengthAlong,
  lengthBetween,
  type MeasuredLength,
  MISFIT_LIMIT,
  type ReferenceResidual,
  type SolvedScale,
  TRUSTED_RELATIVE_ERROR,
} from './scale.js';

export interface CalibrationOptions {
  /** One standard deviation of a click, in each coordinate, in sheet pixels. Default 1. */
  readonly clickSigmaPixels?: number;
}

export type CalibrationResult = { readonly ok: true; readonly scale: SolvedScale } | CalibrationFault;

/**
 * Turns what a person said about a sheet's scale into a map between sheet and ground, with its error.
 *
 * A plan gets one scale (`solveSimilarity`), with ground (0, 0) at the sheet's top left corner. A photo gets
 * a homography (`solvePerspective`): any number of rectangles, the first of which fixes the ground's frame
 * (origin in its middle, x along the side that points most to the right), and any number of lengths.
 * Corners may go round either way, since the ground is known to be seen from above; which side is the width
 * is taken from their order as given. Corners in a crossed order are refused rather than guessed at.
 */
export function solveCalibration(
  calibration: Calibration,
  options: CalibrationOptions = {},
): CalibrationResult {
  const clickSigmaPixels = options.clickSigmaPixels ?? 1;
  if (!(clickSigmaPixels > 0 && Number.isFinite(clickSigmaPixels))) {
    throw new RangeError(`clickSigmaPixels is ${clickSigmaPixels}; expected a positive number of pixels`);
  }
  const fault = faultOfCalibration(calibration);
  if (fault) return fault;
  switch (calibration.view) {
    case 'plan': {
      const drawingScale = calibration.drawingScale ?? null;
      return { ok: true, scale: solveSimilarity(calibration.references, drawingScale, clickSigmaPixels) };
    }
    case 'photo':
      return solvePerspective(calibration.references, clickSigmaPixels);
  }
}
