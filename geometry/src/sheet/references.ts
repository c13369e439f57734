import type { Meters, SheetPoint } from '../units/brand.js';

/** Two clicked points and the distance between them on the ground. */
export interface LengthReference {
  readonly id: string;
  readonly kind: 'length';
  readonly a: SheetPoint;
  readonly b: SheetPoint;
  readonly meters: Meters;
  /** One standard deviation of the stated length itself (a tape, a survey); left out: taken as exact. */
  readonly sigmaMeters?: Meters;
}

/**
 * A rectangle that lies on the ground. The corners go in order around it, either way round;
 * the width is the side from corner 0 to corner 1, the depth the side from corner 1 to corner 2.
 */
export interface RectangleReference {
  readonly id: string;
  readonly kind: 'rectangle';
  readonly corners: readonly [SheetPoint, SheetPoint, SheetPoint, SheetPoint];
  readonly widthMeters: Meters;
  readonly depthMeters: Meters;
}

export type ScaleReference = LengthReference | RectangleReference;

/** A scale written on a drawing, with the resolution at which its page became the sheet. */
export interface DrawingScale {
  readonly kind: 'drawing-scale';
  /** 1 in = 10 ft is 120; 1:100 is 100. */
  readonly groundMetersPerPaperMeter: number;
  /** 200 dots per inch are 200 / 0.0254. */
  readonly pixelsPerPaperMeter: number;
}

/** What a person has said about the scale of one sheet. */
export interface Calibration {
  /** `plan`: drawn from straight above, one scale everywhere. `photo`: the ground in perspective. */
  readonly view: 'plan' | 'photo';
  readonly references: readonly ScaleReference[];
  readonly drawingScale?: DrawingScale | null;
}

export type CalibrationFaultCode =
  | 'no-reference'
  | 'needs-rectangle'
  | 'drawing-scale-on-photo'
  | 'bad-number'
  | 'bad-length'
  | 'points-coincide'
  | 'corners-collinear'
  | 'corners-crossed'
  | 'corners-folded'
  | 'over-horizon'
  | 'references-contradict';

export interface CalibrationFault {
  readonly ok: false;
  readonly code: CalibrationFaultCode;
  /** A sentence for the person who set the scale. */
  readonly message: string;
  /** The reference at fault, where it is one. */
  readonly referenceId?: string;
}
