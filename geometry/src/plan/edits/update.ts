import { type IdSource, isKind, newId } from '../build.js';
import { changeProblems } from '../integrity.js';
import type { PlanDocument, PlanRecord, RecordKind, RecordOf } from '../records.js';
import { Draft } from './draft.js';
import { ensureItem, type ItemChoice } from './items.js';
import { assignRuns } from './network.js';
import { type EditResult, made, missing, refuse } from './result.js';

/** Fields that may be set on records of a kind; what joins records together has edits of its own. */
export type Fields<K extends RecordKind> = Partial<
  Omit<RecordOf<K>, 'kind' | 'id' | 'sheetId' | 'fromId' | 'toId' | 'runId' | 'transformerId'>
>;

/**
 * Sets the same fields on every record of the kind in the selection; the rest of it is left alone. Refused
 * with the rule's own sentence when a rule of the plan would break.
 */
export function setFields<K extends RecordKind>(
  doc: PlanDocument,
  selection: Iterable<string>,
  kind: K,
  fields: Fields<K>,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const chosen: string[] = [];
  for (const id of selection) {
    const record = doc.get(id);
    if (!record || !isKind(record, kind)) continue;
    draft.put({ ...record, ...fields } as PlanRecord);
    chosen.push(id);
  }
  return checked(draft, chosen);
}

/** Gives every record of the selection that takes such an item another one, copied from the catalogue. */
export function setItem(
  doc: PlanDocument,
  selection: Iterable<string>,
  field: 'itemId' | 'lampId',
  choice: ItemChoice,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const itemId = ensureItem(draft, choice);
  const category = draft.of(itemId, 'item')?.item.category;
  if (!category) return missing('item');
  const chosen: string[] = [];
  for (const id of selection) {
    const record = doc.get(id);
    if (!record || !takes(record, field, category)) continue;
    draft.put({ ...record, [field]: itemId } as PlanRecord);
    chosen.push(id);
  }
  if (chosen.length === 0) return refuse('wrong-item', `Nothing selected takes a ${category}.`);
  return checked(draft, chosen);
}

function takes(record: PlanRecord, field: 'itemId' | 'lampId', category: string): boolean {
  if (field === 'lampId') return record.kind === 'fixture' && category === 'lamp';
  switch (record.kind) {
    case 'fixture':
    case 'transformer':
    case 'cable':
      return record.kind === category;
    case 'junction':
      return category === (record.style === 'hub' ? 'hub' : 'connector');
    default:
      return false;
  }
}

/** Puts whole records, as the calibration and shape tools make them, and brings runs up to date. */
export function putRecords(
  doc: PlanDocument,
  records: Iterable<PlanRecord>,
  ids: IdSource = newId,
): EditResult {
  const draft = new Draft(doc, ids);
  const chosen: string[] = [];
  for (const record of records) {
    draft.put(record);
    chosen.push(record.id);
  }
  assignRuns(draft);
  return checked(draft, chosen);
}

function checked(draft: Draft, chosen: string[]): EditResult {
  const result = made(draft, chosen);
  const problem = changeProblems(draft.before, result.change)[0];
  if (!problem) return result;
  return refuse(problem.code === 'wrong-item' ? 'wrong-item' : 'unknown-terminal', problem.message);
}
