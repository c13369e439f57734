import type { UnitSystem } from '@lampwright/geometry/units';
import { plainLength } from '../page/lengths';
import type { AimFigures } from '../tools/aim-fields';

/** Where a light points, in words; nearer to plumb than this counts as straight. */
const STRAIGHT_DEGREES = 2;

export function aimInWords(
  { kind, direction, degreesFromDown, distanceMeters, heightMeters }: AimFigures,
  system: UnitSystem,
): string {
  if (kind === 'point') {
    const away = `${plainLength(distanceMeters, system)} away`;
    return heightMeters < 0.005
      ? `At the ground ${away}.`
      : `At a place ${away}, ${plainLength(heightMeters, system)} high.`;
  }
  if (degreesFromDown <= STRAIGHT_DEGREES) return 'Straight down.';
  if (degreesFromDown >= 180 - STRAIGHT_DEGREES) return 'Straight up.';
  const tilt = `${Math.round(degreesFromDown)}° from straight down`;
  return direction === null ? `${tilt}.` : `${tilt}, towards ${Math.round(direction)}° ${side(direction)}.`;
}

const sides = [
  'up',
  'up and right',
  'right',
  'down and right',
  'down',
  'down and left',
  'left',
  'up and left',
];

/** The way on the sheet that a bearing is, in brackets. */
function side(direction: number): string {
  return `(${sides[Math.round(direction / 45) % 8]!})`;
}
