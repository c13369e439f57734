import type { SheetPoint } from '../units/brand.js';
import type {
  Calibration,
  CalibrationFault,
  CalibrationFaultCode,
  DrawingScale,
  LengthReference,
  RectangleReference,
  ScaleReference,
} from './references.js';

/** Below this two clicks, each good to a pixel or so, can't be told apart. */
export const LEAST_SPAN_PIXELS = 2;

/** A yard's references are shorter than this; a longer one is a slip of the unit. */
export const LONGEST_REFERENCE_METERS = 10_000;

/** The first thing that keeps a calibration from being solved, as a sentence; null when there is none. */
export function faultOfCalibration(calibration: Calibration): CalibrationFault | null {
  const { view, references } = calibration;
  const drawingScale = calibration.drawingScale ?? null;
  if (view === 'photo' && drawingScale) {
    return fault(
      'drawing-scale-on-photo',
      'A drawing scale is for plans; in a photo the scale changes with distance.',
    );
  }
  if (view === 'plan' && references.length === 0 && !drawingScale) {
    return fault(
      'no-reference',
      'Mark two points and type the distance between them, or type the drawing’s scale.',
    );
  }
  if (view === 'photo' && !references.some((r) => r.kind === 'rectangle')) {
    return fault(
      'needs-rectangle',
      'A photo needs one rectangle on the ground with known sides, such as a patio or a slab.',
    );
  }
  if (drawingScale) {
    const bad = faultOfDrawingScale(drawingScale);
    if (bad) return bad;
  }
  for (const reference of references) {
    const bad = faultOfReference(reference);
    if (bad) return bad;
  }
  return null;
}

function faultOfDrawingScale(scale: DrawingScale): CalibrationFault | null {
  if (isPositive(scale.groundMetersPerPaperMeter) && isPositive(scale.pixelsPerPaperMeter)) return null;
  return fault('bad-number', 'The drawing’s scale must be a positive number, such as 1 in = 10 ft or 1:100.');
}

function faultOfReference(reference: ScaleReference): CalibrationFault | null {
  switch (reference.kind) {
    case 'length':
      return faultOfLength(reference);
    case 'rectangle':
      return faultOfRectangle(reference);
  }
}

function faultOfLength(reference: LengthReference): CalibrationFault | null {
  const { id, a, b } = reference;
  if (!isPlace(a) || !isPlace(b))
    return fault('bad-number', 'A point of this length has no place on the sheet.', id);
  if (!isReferenceLength(reference.meters)) {
    return fault('bad-length', 'The distance must be more than nothing and at most 10 km.', id);
  }
  const sigma = reference.sigmaMeters ?? 0;
  if (!(sigma >= 0 && sigma < reference.meters)) {
    return fault('bad-length', 'The error of the distance must be smaller than the distance.', id);
  }
  if (Math.hypot(a.x - b.x, a.y - b.y) < LEAST_SPAN_PIXELS) {
    return fault('points-coincide', 'The two points are at the same place; mark two points well apart.', id);
  }
  return null;
}

function faultOfRectangle(reference: RectangleReference): CalibrationFault | null {
  const { id, corners } = reference;
  if (!corners.every(isPlace)) {
    return fault('bad-number', 'A corner of this rectangle has no place on the sheet.', id);
  }
  if (!isReferenceLength(reference.widthMeters) || !isReferenceLength(reference.depthMeters)) {
    return fault('bad-length', 'Both sides must be more than nothing and at most 10 km.', id);
  }
  const turns = [0, 1, 2, 3].map((i) => turnAt(corners[(i + 3) % 4]!, corners[i]!, corners[(i + 1) % 4]!));
  if (turns.some((turn) => Math.abs(turn) < LEAST_SPAN_PIXELS)) {
    return fault(
      'corners-collinear',
      'Three of the corners lie on one line (or two at one place); mark the four corners of a rectangle.',
      id,
    );
  }
  const leftTurns = turns.filter((turn) => turn > 0).length;
  if (leftTurns === 2) {
    return fault('corners-crossed', 'The sides cross; mark the corners in order around the rectangle.', id);
  }
  if (leftTurns === 1 || leftTurns === 3) {
    return fault(
      'corners-folded',
      'One corner lies inside the other three; a rectangle on the ground never looks like that.',
      id,
    );
  }
  return null;
}

/** How far a corner stands off the line through its neighbours, in pixels, positive on one side of it. */
function turnAt(before: SheetPoint, at: SheetPoint, after: SheetPoint): number {
  const dx = after.x - before.x;
  const dy = after.y - before.y;
  const chord = Math.hypot(dx, dy);
  return chord === 0 ? 0 : (dx * (at.y - before.y) - dy * (at.x - before.x)) / chord;
}

function isPlace(p: SheetPoint): boolean {
  return Number.isFinite(p.x) && Number.isFinite(p.y);
}

function isPositive(n: number): boolean {
  return n > 0 && Number.isFinite(n);
}

function isReferenceLength(n: number): boolean {
  return n > 0 && n <= LONGEST_REFERENCE_METERS;
}

export function fault(code: CalibrationFaultCode, message: string, referenceId?: string): CalibrationFault {
  return { ok: false, code, message, ...(referenceId === undefined ? {} : { referenceId }) };
}
