import { polygonCrossing } from '../../measure/index.js';
import { cablePoints, type PlanDocument, recordsOf } from '../../plan/index.js';
import { type Meters, meters } from '../../units/index.js';
import { boxOf, type GroundArea, groundArea, near, onGround } from './ground-shapes.js';
import { scaleOfSheet } from './sheet-scale.js';

/**
 * Metres of each cable that run under paving and so go in conduit, as drawn; ids of cables that meet no
 * paving, or lie on a sheet without a scale, are left out. Paving that overlaps counts once.
 */
export function conduitLengths(doc: PlanDocument): Map<string, Meters> {
  const lengths = new Map<string, Meters>();
  const pavings = [...recordsOf(doc, 'area')].filter((area) => area.use === 'paved');
  if (pavings.length === 0) return lengths;
  for (const sheet of recordsOf(doc, 'sheet')) {
    const solved = scaleOfSheet(sheet);
    if (!solved.ok) continue;
    const ground = pavings
      .filter((area) => area.sheetId === sheet.id)
      .flatMap((area) => groundArea(solved.scale, area) ?? []);
    if (ground.length === 0) continue;
    for (const cable of recordsOf(doc, 'cable')) {
      if (cable.sheetId !== sheet.id) continue;
      const points = cablePoints(doc, cable);
      const line = points && onGround(solved.scale, points);
      const under = line ? metersUnder(line, ground) : 0;
      if (under > 0) lengths.set(cable.id, meters(under));
    }
  }
  return lengths;
}

function metersUnder(line: Parameters<typeof boxOf>[0], pavings: readonly GroundArea[]): number {
  const box = boxOf(line);
  const spans = pavings
    .filter((paving) => near(box, paving.box, 0))
    .flatMap((paving) => polygonCrossing(line, paving.points).spans)
    .sort((a, b) => a.fromMeters - b.fromMeters);
  let total = 0;
  let reached = 0;
  for (const { fromMeters, toMeters } of spans) {
    total += Math.max(0, toMeters - Math.max(fromMeters, reached));
    reached = Math.max(reached, toMeters);
  }
  return total;
}
