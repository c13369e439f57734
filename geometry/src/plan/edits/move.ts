import { type IdSource, newId } from '../build.js';
import type { PlanDocument, PlanPoint, PlanRecord } from '../records.js';
import { Draft } from './draft.js';
import { type EditResult, made, refuse } from './result.js';

/** Sheet pixels beyond which the plan has no room (the same bound that records are checked against). */
const FARTHEST_PIXEL = 100_000;

/** A record moved by so many sheet pixels; the same record when it has no place of its own. */
export function moved(record: PlanRecord, dx: number, dy: number): PlanRecord {
  const shift = (p: PlanPoint): PlanPoint => ({ x: p.x + dx, y: p.y + dy });
  switch (record.kind) {
    case 'transformer':
    case 'feed':
    case 'fixture':
    case 'junction':
    case 'note':
      return { ...record, at: shift(record.at) };
    case 'cable':
      return record.via.length === 0 ? record : { ...record, via: record.via.map(shift) };
    case 'area':
    case 'measurement':
      return { ...record, points: record.points.map(shift) };
    case 'sheet':
    case 'run':
    case 'item':
    case 'settings':
      return record;
  }
}

/**
 * Moves the selection by so many sheet pixels. Cable ends follow what they end at, since they name it; bends
 * stay where they are unless their cable is selected too.
 */
export function moveRecords(
  doc: PlanDocument,
  selection: Iterable<string>,
  dx: number,
  dy: number,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const chosen = [...selection];
  for (const id of chosen) {
    const record = doc.get(id);
    if (!record) continue;
    const next = moved(record, dx, dy);
    if (!onPlan(next)) return refuse('out-of-range', 'That is too far outside of the sheet.');
    draft.put(next);
  }
  return made(draft, chosen);
}

function onPlan(record: PlanRecord): boolean {
  const fits = (p: PlanPoint) => Math.abs(p.x) <= FARTHEST_PIXEL && Math.abs(p.y) <= FARTHEST_PIXEL;
  if ('at' in record) return fits(record.at);
  if (record.kind === 'cable') return record.via.every(fits);
  if (record.kind === 'area' || record.kind === 'measurement') return record.points.every(fits);
  return true;
}
