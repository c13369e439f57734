import { meters, pixels, type SheetPoint } from '../units/brand.js';
import type { DrawingScale, ScaleReference } from './references.js';
import { type GroundReading, growthOfErrors, type ReferenceResidual, type SolvedScale } from './scale.js';

/**
 * How far a printed drawing is off its written scale: paper stretch and the page's rounding to whole
 * pixels stay within about a thousandth. Two well-spaced points on a large sheet can do better, and then
 * they count for more.
 */
export const DRAWING_SCALE_RELATIVE_SIGMA = 0.001;

interface Observation {
  readonly referenceId: string;
  readonly side: ReferenceResidual['side'];
  readonly lengthMeters: number;
  readonly lengthSigma: number;
  readonly lengthPixels: number;
  readonly pixelSigma: number;
}

/**
 * One scale for a whole sheet, in pixels per metre, by least squares on the pixel lengths, each weighted by
 * its click error and the error of its stated length. A click error σ in each coordinate makes a pixel
 * length uncertain by √2·σ (only the component along the line counts, once at either end). A rectangle
 * stands for its four sides: at a right angle the errors of neighbouring sides are independent.
 * The references must have been checked; at least one, or a drawing scale.
 */
export function solveSimilarity(
  references: readonly ScaleReference[],
  drawingScale: DrawingScale | null,
  clickSigmaPixels: number,
): SolvedScale {
  const observations = references.flatMap((r) => observationsOf(r, clickSigmaPixels * Math.SQRT2));
  if (drawingScale) observations.push(observationOfDrawing(drawingScale));
  let pixelsPerMeter = 0;
  let information = 0;
  // The weights hold the scale itself (through the stated lengths' own errors); they settle at once.
  for (let pass = 0; pass < 4; pass++) {
    let fit = 0;
    information = 0;
    for (const o of observations) {
      const scale = pixelsPerMeter || o.lengthPixels / o.lengthMeters;
      const weight = 1 / (o.pixelSigma ** 2 + (scale * o.lengthSigma) ** 2);
      fit += weight * o.lengthMeters * o.lengthPixels;
      information += weight * o.lengthMeters ** 2;
    }
    pixelsPerMeter = fit / information;
  }
  const metersPerPixel = 1 / pixelsPerMeter;
  const misfit = misfitOf(observations, pixelsPerMeter);
  const variance = (metersPerPixel ** 4 / information) * growthOfErrors(misfit);
  return {
    view: 'plan',
    groundFromSheet: (p) => ({ x: meters(p.x * metersPerPixel), y: meters(-p.y * metersPerPixel) }),
    sheetFromGround: (g) => ({ x: pixels(g.x * pixelsPerMeter), y: pixels(-g.y * pixelsPerMeter) }),
    groundMatrix: [metersPerPixel, 0, 0, 0, -metersPerPixel, 0, 0, 0, 1],
    read: (p) => readingAt(p, metersPerPixel),
    residuals: observations.map((o) => residualOf(o, metersPerPixel)),
    misfit,
    clickSigmaPixels,
    covariance: Float64Array.of(variance),
  };
}

function readingAt(p: SheetPoint, metersPerPixel: number): GroundReading {
  return {
    ground: { x: meters(p.x * metersPerPixel), y: meters(-p.y * metersPerPixel) },
    byClick: [metersPerPixel, 0, 0, -metersPerPixel],
    xByParameter: Float64Array.of(p.x),
    yByParameter: Float64Array.of(-p.y),
    nearHorizon: false,
  };
}

function observationsOf(reference: ScaleReference, pixelSigma: number): Observation[] {
  if (reference.kind === 'length') {
    return [
      {
        referenceId: reference.id,
        side: null,
        lengthMeters: reference.meters,
        lengthSigma: reference.sigmaMeters ?? 0,
        lengthPixels: Math.hypot(reference.a.x - reference.b.x, reference.a.y - reference.b.y),
        pixelSigma,
      },
    ];
  }
  return ([0, 1, 2, 3] as const).map((side) => {
    const from = reference.corners[side];
    const to = reference.corners[((side + 1) % 4) as 0 | 1 | 2 | 3];
    return {
      referenceId: reference.id,
      side,
      lengthMeters: side % 2 === 0 ? reference.widthMeters : reference.depthMeters,
      lengthSigma: 0,
      lengthPixels: Math.hypot(from.x - to.x, from.y - to.y),
      pixelSigma,
    };
  });
}

/** A drawing scale is a length without clicks: one metre of paper. */
function observationOfDrawing(scale: DrawingScale): Observation {
  return {
    referenceId: scale.kind,
    side: null,
    lengthMeters: scale.groundMetersPerPaperMeter,
    lengthSigma: 0,
    lengthPixels: scale.pixelsPerPaperMeter,
    pixelSigma: scale.pixelsPerPaperMeter * DRAWING_SCALE_RELATIVE_SIGMA,
  };
}

function residualOf(o: Observation, metersPerPixel: number): ReferenceResidual {
  const got = o.lengthPixels * metersPerPixel;
  return {
    referenceId: o.referenceId,
    side: o.side,
    expectedMeters: meters(o.lengthMeters),
    gotMeters: meters(got),
    relative: got / o.lengthMeters - 1,
  };
}

function misfitOf(observations: readonly Observation[], pixelsPerMeter: number): number | null {
  const freedom = observations.length - 1;
  if (freedom < 1) return null;
  let sum = 0;
  for (const o of observations) {
    const error = o.lengthPixels - pixelsPerMeter * o.lengthMeters;
    sum += error ** 2 / (o.pixelSigma ** 2 + (pixelsPerMeter * o.lengthSigma) ** 2);
  }
  return Math.sqrt(sum / freedom);
}
