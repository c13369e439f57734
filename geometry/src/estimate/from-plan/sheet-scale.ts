import type { ReferenceRecord, SheetRecord } from '../../plan/index.js';
import {
  type CalibrationResult,
  type DrawingScale,
  type ScaleReference,
  solveCalibration,
} from '../../sheet/index.js';
import { meters, pixels, type SheetPoint } from '../../units/index.js';

const solved = new WeakMap<SheetRecord, CalibrationResult>();

/** The scale of a sheet from its references. Records never change, so each is solved once. */
export function scaleOfSheet(sheet: SheetRecord): CalibrationResult {
  const known = solved.get(sheet);
  if (known) return known;
  const result = solveCalibration({
    view: sheet.view,
    references: sheet.references.map(scaleReference),
    drawingScale: drawingScaleOf(sheet),
  });
  solved.set(sheet, result);
  return result;
}

export function sheetPoint(point: { readonly x: number; readonly y: number }): SheetPoint {
  return { x: pixels(point.x), y: pixels(point.y) };
}

/** A typed scale means something only on a drawing whose paper's resolution is known. */
function drawingScaleOf(sheet: SheetRecord): DrawingScale | null {
  const { view, groundMetersPerPaperMeter, pixelsPerPaperMeter } = sheet;
  if (view === 'photo') return null;
  if (groundMetersPerPaperMeter === null || pixelsPerPaperMeter === null) return null;
  return { kind: 'drawing-scale', groundMetersPerPaperMeter, pixelsPerPaperMeter };
}

function scaleReference(reference: ReferenceRecord): ScaleReference {
  switch (reference.kind) {
    case 'length':
      return {
        ...reference,
        a: sheetPoint(reference.a),
        b: sheetPoint(reference.b),
        meters: meters(reference.meters),
      };
    case 'rectangle': {
      const [c0, c1, c2, c3] = reference.corners;
      return {
        ...reference,
        corners: [sheetPoint(c0), sheetPoint(c1), sheetPoint(c2), sheetPoint(c3)],
        widthMeters: meters(reference.widthMeters),
        depthMeters: meters(reference.depthMeters),
      };
    }
  }
}
