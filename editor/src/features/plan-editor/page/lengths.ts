import { sheetPoint } from '@lampwright/geometry/estimate';
import { polygonAreaSquareMeters } from '@lampwright/geometry/measure';
import { lengthAlong, type MeasuredLength, type SolvedScale } from '@lampwright/geometry/sheet';
import {
  formatArea,
  formatLength,
  formatLengthWithError,
  type GroundPoint,
  meters,
  type UnitSystem,
} from '@lampwright/geometry/units';
import type { Point } from '../../../plan-view/camera';

export function measuredAlong(scale: SolvedScale | null, points: readonly Point[]): MeasuredLength | null {
  return scale === null || points.length < 2 ? null : lengthAlong(scale, points.map(sheetPoint));
}

/** A drawn length with its error; says so where the scale can't carry it. Empty without a scale. */
export function lengthText(scale: SolvedScale | null, points: readonly Point[], system: UnitSystem): string {
  if (scale === null || points.length < 2) return '';
  const length = lengthAlong(scale, points.map(sheetPoint));
  if (length === null) return 'above the horizon';
  const text = formatLengthWithError(length.meters, length.sigmaMeters, { system });
  if (length.trusted) return text;
  return length.reason === 'near-horizon' ? `${text} (near the horizon)` : `${text} (not to be trusted)`;
}

export function plainLength(length: number | null, system: UnitSystem): string {
  return length === null ? '–' : formatLength(meters(length), { system });
}

/** The area of a polygon of the sheet; empty without a scale or above the horizon. */
export function areaText(scale: SolvedScale | null, points: readonly Point[], system: UnitSystem): string {
  const ground = groundOf(scale, points);
  return ground === null ? '' : formatArea(polygonAreaSquareMeters(ground), { system });
}

export function groundOf(scale: SolvedScale | null, points: readonly Point[]): GroundPoint[] | null {
  if (scale === null) return null;
  const ground: GroundPoint[] = [];
  for (const p of points) {
    const g = scale.groundFromSheet(sheetPoint(p));
    if (g === null) return null;
    ground.push(g);
  }
  return ground;
}
