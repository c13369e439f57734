import { type IdSource, newId } from '../build.js';
import type { Aim, PlanDocument, PlanPoint, PlanRecord } from '../records.js';
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
    case 'junction':
    case 'note':
      return { ...record, at: shift(record.at) };
    case 'fixture':
      // What it is aimed at stays where it is; a direction goes along.
      return { ...record, at: shift(record.at), aim: shiftedAim(record.aim, shift) };
    case 'cable':
      return record.via.length === 0 ? record : { ...record, via: record.via.map(shift) };
    case 'area':
    case 'measurement':
      return { ...record, points: record.points.map(shift) };
    case 'face':
      return { ...record, foot: record.foot.map(shift), top: record.top?.map(shift) ?? null };
    case 'tree':
      return { ...record, foot: shift(record.foot), outline: record.outline.map(shift) };
    case 'sheet':
    case 'run':
    case 'zone':
    case 'item':
    case 'settings':
      return record;
  }
}

function shiftedAim(aim: Aim | null, shift: (p: PlanPoint) => PlanPoint): Aim | null {
  return aim?.kind === 'tilt' ? { ...aim, toward: shift(aim.toward) } : aim;
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
  if (record.kind === 'face') return [...record.foot, ...(record.top ?? [])].every(fits);
  if (record.kind === 'tree') return [record.foot, ...record.outline].every(fits);
  return true;
}
