import { distanceToPolygon, polygonCrossing } from '../../measure/index.js';
import {
  type AreaRecord,
  cablePoints,
  type FixtureRecord,
  itemOf,
  labelOf,
  type PlanDocument,
  type PlanPoint,
  recordsOf,
  type SheetRecord,
  settingsOf,
} from '../../plan/index.js';
import type { SolvedScale } from '../../sheet/index.js';
import { formatLength, type GroundPoint, meters, type UnitSystem } from '../../units/index.js';
import type { PlanFault } from './fault.js';
import { scaleOfSheet, sheetPoint } from './sheet-scale.js';
import { capitalised } from './words.js';

/** What areas mean for cable and fixtures on each sheet: buildings and water in the way, water too near. */
export function groundFaults(doc: PlanDocument, system: UnitSystem): PlanFault[] {
  const areasOf = new Map<string, AreaRecord[]>();
  for (const area of recordsOf(doc, 'area'))
    if (area.use === 'building' || area.use === 'water')
      areasOf.set(area.sheetId, [...(areasOf.get(area.sheetId) ?? []), area]);
  const faults: PlanFault[] = [];
  for (const sheet of recordsOf(doc, 'sheet')) {
    const areas = areasOf.get(sheet.id);
    if (areas) faults.push(...sheetFaults(doc, sheet, areas, system));
  }
  return faults;
}

function sheetFaults(
  doc: PlanDocument,
  sheet: SheetRecord,
  areas: readonly AreaRecord[],
  system: UnitSystem,
): PlanFault[] {
  const solved = scaleOfSheet(sheet);
  const scale = solved.ok ? solved.scale : null;
  const faults: PlanFault[] = [];
  const ground = areas.flatMap((area) => {
    const points = onGround(scale, area.points);
    return points ? [{ area, points }] : [];
  });
  for (const cable of recordsOf(doc, 'cable')) {
    if (cable.sheetId !== sheet.id) continue;
    const points = cablePoints(doc, cable);
    const line = points && onGround(scale, points);
    if (!line) continue;
    for (const { area, points: polygon } of ground) {
      if (polygonCrossing(line, polygon).insideMeters <= 0) continue;
      faults.push({
        code: area.use === 'building' ? 'cable-through-building' : 'cable-through-water',
        severity: 'fault',
        recordId: cable.id,
        otherId: area.id,
        message: `A cable runs through ${area.name || (area.use === 'building' ? 'a building' : 'water')}; lead it around.`,
      });
    }
  }
  if (!scale) return faults;
  const clearance = settingsOf(doc).waterClearanceMeters;
  for (const fixture of recordsOf(doc, 'fixture')) {
    if (fixture.sheetId !== sheet.id) continue;
    const at = onGround(scale, [fixture.at])?.[0];
    if (!at || itemOf(doc, fixture.itemId, 'fixture')?.wetListed) continue;
    for (const { area, points } of ground)
      if (area.use === 'water')
        faults.push(...waterFaults(fixture, area, distanceToPolygon(at, points), clearance, system));
  }
  return faults;
}

function waterFaults(
  fixture: FixtureRecord,
  area: AreaRecord,
  distance: number,
  clearance: number,
  system: UnitSystem,
): PlanFault[] {
  if (distance >= clearance) return [];
  const about = { recordId: fixture.id, otherId: area.id };
  const label = capitalised(labelOf(fixture));
  const water = area.name || 'water';
  if (distance === 0)
    return [
      {
        ...about,
        code: 'fixture-in-water',
        severity: 'fault',
        message: `${label} stands in ${water} and is not listed for it.`,
      },
    ];
  const length = (value: number) => formatLength(meters(value), { system });
  return [
    {
      ...about,
      code: 'near-water',
      severity: 'caution',
      message: `${label} is ${length(distance)} from ${water}; keep ${length(clearance)} unless it is listed for less and the code allows it.`,
    },
  ];
}

/**
 * Points on the ground; null where one of them is not. Without a scale the sheet stands in: what lies inside
 * of what is the same there, only lengths mean nothing.
 */
function onGround(scale: SolvedScale | null, points: readonly PlanPoint[]): GroundPoint[] | null {
  const ground: GroundPoint[] = [];
  for (const point of points) {
    const p = scale ? scale.groundFromSheet(sheetPoint(point)) : { x: meters(point.x), y: meters(-point.y) };
    if (!p) return null;
    ground.push(p);
  }
  return ground;
}
