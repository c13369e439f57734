import {
  type IdSource,
  initialOf,
  newId,
  nextFixtureNumber,
  nextNumber,
  sourceTransformerId,
} from '../build.js';
import type { PlanDocument, PlanRecord } from '../records.js';
import { Draft } from './draft.js';
import { moved } from './move.js';
import { assignRuns } from './network.js';
import { type EditResult, made } from './result.js';

/**
 * Copies what is selected, moved by so many sheet pixels, with new ids and the next numbers. A cable is
 * copied when both of its ends are, or when one is and the other is a transformer or feed, which then feeds
 * the copy too on the same run. A copied transformer gets copies of the runs of its copied cables. Selects
 * the copies.
 */
export function duplicate(
  doc: PlanDocument,
  selection: Iterable<string>,
  offset: { readonly dx: number; readonly dy: number },
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const chosen = new Set(selection);
  const copies = new Map<string, string>();
  for (const id of chosen) {
    const record = doc.get(id);
    if (!record || record.kind === 'cable') continue;
    const copy = copyOf(draft, record, offset.dx, offset.dy);
    if (copy) copies.set(id, draft.put(copy).id);
  }
  const runs = new Map<string, string>();
  for (const id of chosen) {
    const cable = draft.of(id, 'cable');
    if (!cable) continue;
    const ends = [cable.fromId, cable.toId].map((end) => {
      const copy = copies.get(end);
      return copy ?? (sourceTransformerId(doc.get(end)) !== null ? end : undefined);
    });
    const [fromId, toId] = ends;
    if (fromId === undefined || toId === undefined) continue;
    if (fromId === cable.fromId && toId === cable.toId) continue;
    const bends = moved(cable, offset.dx, offset.dy);
    if (bends.kind !== 'cable') continue;
    const runId = runFor(draft, runs, copies, cable.runId);
    const copy = draft.put({ ...bends, id: draft.ids(), fromId, toId, runId });
    copies.set(id, copy.id);
  }
  assignRuns(draft);
  return made(draft, [...copies.values()]);
}

/** The run of a copied cable: a copy of the run when its transformer was copied, else the run itself. */
function runFor(
  draft: Draft,
  runs: Map<string, string>,
  copies: ReadonlyMap<string, string>,
  runId: string | null,
): string | null {
  const run = draft.of(runId, 'run');
  const transformerId = run && copies.get(run.transformerId);
  if (!run || !transformerId) return runId;
  const known = runs.get(run.id);
  if (known) return known;
  const copy = draft.put({
    ...run,
    id: draft.ids(),
    number: nextNumber(draft.plan, 'run'),
    transformerId,
  });
  runs.set(run.id, copy.id);
  return copy.id;
}

function copyOf(draft: Draft, record: PlanRecord, dx: number, dy: number): PlanRecord | undefined {
  const id = draft.ids();
  switch (record.kind) {
    case 'fixture': {
      const number = nextFixtureNumber(draft.plan, initialOf(draft.plan, record));
      return { ...moved(record, dx, dy), id, number } as PlanRecord;
    }
    case 'transformer':
    case 'junction':
      return { ...moved(record, dx, dy), id, number: nextNumber(draft.plan, record.kind) } as PlanRecord;
    case 'feed':
    case 'area':
    case 'face':
    case 'tree':
    case 'measurement':
    case 'note':
      return { ...moved(record, dx, dy), id } as PlanRecord;
    case 'sheet':
    case 'run':
    case 'cable':
    case 'zone':
    case 'item':
    case 'settings':
      return undefined;
  }
}
