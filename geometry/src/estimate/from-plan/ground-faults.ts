import { distanceToPolygon, polygonCrossing } from '../../measure/index.js';
import {
  type AreaRecord,
  type CableRecord,
  cablePoints,
  type FixtureRecord,
  itemOf,
  labelOf,
  type PlanDocument,
  type PlanRecord,
  recordsOf,
  type SheetRecord,
  settingsOf,
} from '../../plan/index.js';
import type { SolvedScale } from '../../sheet/index.js';
import { formatLength, type GroundPoint, meters, type UnitSystem } from '../../units/index.js';
import type { PlanFault } from './fault.js';
import { boxOf, type GroundArea, groundArea, near, onGround } from './ground-shapes.js';
import { scaleOfSheet } from './sheet-scale.js';
import { capitalised } from './words.js';

/** How far inside of a building's outline what hangs on its wall may be drawn. */
const ON_THE_WALL_METERS = 1;

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
  const ground = areas.flatMap((area) => groundArea(scale, area) ?? []);
  const faults: PlanFault[] = [];
  for (const cable of recordsOf(doc, 'cable'))
    if (cable.sheetId === sheet.id) faults.push(...cableFaults(doc, scale, cable, ground));
  if (!scale) return faults;
  const clearance = settingsOf(doc).waterClearanceMeters;
  const waters = ground.filter(({ area }) => area.use === 'water');
  for (const fixture of recordsOf(doc, 'fixture')) {
    if (fixture.sheetId !== sheet.id || isWetListed(doc, fixture)) continue;
    const at = onGround(scale, [fixture.at])?.[0];
    if (!at) continue;
    const box = boxOf([at]);
    for (const water of waters)
      if (near(box, water.box, clearance))
        faults.push(
          ...waterFaults(doc, fixture, water.area, distanceToPolygon(at, water.points), clearance, system),
        );
  }
  return faults;
}

function cableFaults(
  doc: PlanDocument,
  scale: SolvedScale | null,
  cable: CableRecord,
  ground: readonly GroundArea[],
): PlanFault[] {
  const points = cablePoints(doc, cable);
  const line = points && onGround(scale, points);
  if (!line) return [];
  const box = boxOf(line);
  return ground
    .filter((other) => near(box, other.box, 0) && goesThrough(doc, scale, cable, line, other))
    .map(({ area }) => ({
      code: area.use === 'building' ? 'cable-through-building' : 'cable-through-water',
      severity: 'fault',
      recordId: cable.id,
      otherId: area.id,
      message: `A cable runs through ${area.name || (area.use === 'building' ? 'a building' : 'water')}; lead it around.`,
    }));
}

/**
 * Whether a cable runs through an area rather than to something in it: a transformer or fixture that is
 * mounted on a wall lies a little inside of the drawn outline, and a light listed for water lies in it.
 */
function goesThrough(
  doc: PlanDocument,
  scale: SolvedScale | null,
  cable: CableRecord,
  line: readonly GroundPoint[],
  { area, points }: GroundArea,
): boolean {
  const { spans } = polygonCrossing(line, points);
  const total = line.reduce((sum, p, i) => sum + (i === 0 ? 0 : distance(line[i - 1] ?? p, p)), 0);
  return spans.some(({ fromMeters, toMeters }) => {
    const atStart = fromMeters <= 0;
    const atEnd = toMeters >= total * (1 - Number.EPSILON * line.length);
    if (!atStart && !atEnd) return true;
    if (area.use === 'water')
      return (
        !(atStart && isWetListed(doc, doc.get(cable.fromId))) &&
        !(atEnd && isWetListed(doc, doc.get(cable.toId)))
      );
    return scale !== null && toMeters - fromMeters > ON_THE_WALL_METERS;
  });
}

function distance(a: GroundPoint, b: GroundPoint): number {
  return Math.hypot(b.x - a.x, b.y - a.y);
}

function isWetListed(doc: PlanDocument, record: PlanRecord | undefined): boolean {
  return record?.kind === 'fixture' && itemOf(doc, record.itemId, 'fixture')?.wetListed === true;
}

function waterFaults(
  doc: PlanDocument,
  fixture: FixtureRecord,
  area: AreaRecord,
  distance: number,
  clearance: number,
  system: UnitSystem,
): PlanFault[] {
  if (distance >= clearance) return [];
  const about = { recordId: fixture.id, otherId: area.id };
  const label = capitalised(labelOf(fixture, doc));
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
