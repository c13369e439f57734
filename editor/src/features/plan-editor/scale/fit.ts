import { sheetPoint } from '@lampwright/geometry/estimate';
import { lengthBetween, type SolvedScale } from '@lampwright/geometry/sheet';
import { formatLengthWithError, type UnitSystem } from '@lampwright/geometry/units';
import type { Size } from '../../../plan-view/camera';

/** Beyond this, in units of the expected error, some reference is wrong rather than only rough. */
const WRONG_MISFIT = 3;

/** How well the references agree, in a sentence. */
export function fitOf(scale: SolvedScale): string {
  if (scale.misfit === null) return 'The scale is set. One more reference would check it.';
  if (scale.misfit > WRONG_MISFIT)
    return 'The references contradict each other: one of them is measured or clicked wrong.';
  return 'The references agree as well as clicks can.';
}

/** Rows of a sheet that are looked at for the horizon. */
const STEPS = 24;

/** What the scale is worth on this sheet: the error of a short length low on it, and where it ends. */
export function horizonText(scale: SolvedScale, sheet: Size, system: UnitSystem): string {
  const sample = probe(scale, sheet);
  const said =
    sample === null
      ? ''
      : `In the middle of the ground a length reads ${formatLengthWithError(sample.meters, sample.sigmaMeters, { system })}.`;
  if (scale.view === 'plan') return said;
  const limit = trustedFrom(scale, sheet);
  if (limit === null) return `${said} No part of this photo can be trusted with lengths.`.trim();
  if (limit === 0) return said;
  return `${said} In the top ${Math.round(limit * 100)} % of the photo, towards the horizon, it can’t be trusted.`.trim();
}

function probe(scale: SolvedScale, sheet: Size) {
  const step = sheet.width / 10;
  for (const share of [0.7, 0.8, 0.9]) {
    const at = { x: sheet.width / 2, y: sheet.height * share };
    const length = lengthBetween(scale, sheetPoint(at), sheetPoint({ x: at.x + step, y: at.y }));
    if (length?.trusted) return length;
  }
  return null;
}

/** The share of the height, from the top, below which lengths of a tenth of the width can be trusted. */
export function trustedFrom(scale: SolvedScale, sheet: Size): number | null {
  let limit: number | null = null;
  for (let i = STEPS; i >= 0; i--) {
    const y = (sheet.height * i) / STEPS;
    const x = sheet.width / 2;
    const across = lengthBetween(scale, sheetPoint({ x, y }), sheetPoint({ x: x + sheet.width / 10, y }));
    if (!across?.trusted) break;
    limit = i / STEPS;
  }
  return limit;
}
