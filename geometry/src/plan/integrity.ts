import type { CatalogueCategory } from '../catalogue/index.js';
import { isNode, itemOf, labelOf, recordOf, recordsOf, sourceTransformerId } from './build.js';
import { apply, type ChangeBody, touched } from './change.js';
import type { CableRecord, PlanDocument, PlanRecord, RunRecord } from './records.js';

export type IntegrityCode =
  /** Names a record that is not there, or is of the wrong kind. */
  | 'dangling-reference'
  | 'wrong-item'
  | 'kind-changed'
  | 'cable-to-itself'
  | 'cable-between-sources'
  | 'cable-across-sheets'
  | 'unknown-tap'
  | 'unknown-common'
  | 'different-windings';

/** A rule that a plan would break. `recordId` breaks it; `refersTo` is the record it should have found. */
export interface IntegrityProblem {
  readonly code: IntegrityCode;
  readonly recordId: string;
  readonly refersTo: string | null;
  readonly message: string;
}

/** Ids of other records that this one names. */
export function referencesOf(record: PlanRecord): string[] {
  switch (record.kind) {
    case 'sheet':
    case 'item':
    case 'settings':
    case 'zone':
      return [];
    case 'transformer':
      return [record.sheetId, record.itemId];
    case 'feed':
      return [record.sheetId, record.transformerId];
    case 'fixture':
      return [
        record.sheetId,
        record.itemId,
        ...(record.lampId === null ? [] : [record.lampId]),
        ...(record.zoneId === null ? [] : [record.zoneId]),
      ];
    case 'junction':
      return [record.sheetId, ...(record.itemId === null ? [] : [record.itemId])];
    case 'run':
      return [record.transformerId];
    case 'cable':
      return [
        record.sheetId,
        record.fromId,
        record.toId,
        record.itemId,
        ...(record.runId === null ? [] : [record.runId]),
      ];
    case 'area':
    case 'face':
    case 'tree':
    case 'measurement':
    case 'note':
      return [record.sheetId];
  }
}

/** Every broken rule of the whole plan. */
export function planProblems(doc: PlanDocument): IntegrityProblem[] {
  return [...doc.values()].flatMap((record) => recordProblems(doc, record));
}

/**
 * Rules that the plan would break with the change made: looks only at what the change touches and at what
 * refers to that. A sound plan stays sound when this finds nothing.
 */
export function changeProblems(doc: PlanDocument, change: ChangeBody): IntegrityProblem[] {
  const next = apply(doc, change);
  const problems: IntegrityProblem[] = [];
  for (const [id, record] of Object.entries(change.put)) {
    const old = doc.get(id);
    if (old !== undefined && old.kind !== record.kind)
      problems.push({
        code: 'kind-changed',
        recordId: id,
        refersTo: null,
        message: `A ${old.kind} can't become a ${record.kind}; remove it and place a new one.`,
      });
  }
  for (const record of affected(doc, next, change)) problems.push(...recordProblems(next, record));
  return problems;
}

/** Records of `next` that the change may have broken. */
function affected(doc: PlanDocument, next: PlanDocument, change: ChangeBody): Iterable<PlanRecord> {
  const found = new Map<string, PlanRecord>(Object.entries(change.put));
  // What is new can't be named by anything outside of the change, so only older records need a look.
  const old = new Set(touched(change).filter((id) => doc.has(id)));
  if (old.size === 0) return found.values();
  const transformers = new Set(old);
  for (const record of next.values()) {
    if (!referencesOf(record).some((id) => old.has(id))) continue;
    found.set(record.id, record);
    // A run's terminals are those of the item of its transformer: two steps away.
    if (record.kind === 'transformer') transformers.add(record.id);
  }
  for (const run of recordsOf(next, 'run')) if (transformers.has(run.transformerId)) found.set(run.id, run);
  return found.values();
}

/** Rules that one record breaks in its plan. */
export function recordProblems(doc: PlanDocument, record: PlanRecord): IntegrityProblem[] {
  const problems: IntegrityProblem[] = [];
  const add = (code: IntegrityCode, message: string, refersTo: string | null = null) =>
    problems.push({ code, recordId: record.id, refersTo, message });
  const wantKind = (id: string, kind: 'sheet' | 'transformer' | 'run' | 'zone') => {
    if (!recordOf(doc, id, kind))
      add('dangling-reference', `The ${kind} that ${labelOf(record, doc)} belongs to is gone.`, id);
  };
  const wantItem = (id: string, category: CatalogueCategory) => {
    if (!recordOf(doc, id, 'item'))
      add('dangling-reference', `The plan's copy of the item of ${labelOf(record, doc)} is gone.`, id);
    else if (!itemOf(doc, id, category))
      add('wrong-item', `The item of ${labelOf(record, doc)} must be from the category ${category}.`, id);
  };
  if ('sheetId' in record) wantKind(record.sheetId, 'sheet');
  switch (record.kind) {
    case 'transformer':
      wantItem(record.itemId, 'transformer');
      break;
    case 'feed':
      wantKind(record.transformerId, 'transformer');
      break;
    case 'fixture':
      wantItem(record.itemId, 'fixture');
      if (record.lampId !== null) wantItem(record.lampId, 'lamp');
      if (record.zoneId !== null) wantKind(record.zoneId, 'zone');
      break;
    case 'junction':
      if (record.itemId !== null) wantItem(record.itemId, record.style === 'hub' ? 'hub' : 'connector');
      break;
    case 'run':
      wantKind(record.transformerId, 'transformer');
      terminalFaults(doc, record, add);
      break;
    case 'cable':
      wantItem(record.itemId, 'cable');
      if (record.runId !== null) wantKind(record.runId, 'run');
      cableFaults(doc, record, add);
      break;
    case 'sheet':
    case 'area':
    case 'face':
    case 'tree':
    case 'zone':
    case 'measurement':
    case 'note':
    case 'item':
    case 'settings':
      break;
  }
  return problems;
}

type Add = (code: IntegrityCode, message: string, refersTo?: string | null) => void;

function terminalFaults(doc: PlanDocument, run: RunRecord, add: Add): void {
  const transformer = recordOf(doc, run.transformerId, 'transformer');
  const item = transformer && itemOf(doc, transformer.itemId, 'transformer');
  if (!item) return;
  const tap = item.terminals.find((t) => t.type === 'tap' && t.id === run.tapId);
  const common = item.terminals.find((t) => t.type === 'common' && t.id === run.commonId);
  if (!tap)
    add('unknown-tap', `${labelOf(transformer, doc)} has no tap ${run.tapId} for ${labelOf(run, doc)}.`);
  if (!common)
    add(
      'unknown-common',
      `${labelOf(transformer, doc)} has no common ${run.commonId} for ${labelOf(run, doc)}.`,
    );
  if (tap && common && tap.winding !== common.winding)
    add(
      'different-windings',
      `Tap ${tap.id} and common ${common.id} of ${labelOf(transformer, doc)} are on different windings, so ${labelOf(run, doc)} would not light.`,
    );
}

function cableFaults(doc: PlanDocument, cable: CableRecord, add: Add): void {
  if (cable.fromId === cable.toId) add('cable-to-itself', 'A cable must join two different things.');
  const ends = [cable.fromId, cable.toId].map((id) => {
    const end = doc.get(id);
    if (!isNode(end)) {
      add('dangling-reference', 'What a cable ends at is gone.', id);
      return undefined;
    }
    if (end.sheetId !== cable.sheetId)
      add(
        'cable-across-sheets',
        `A cable and what it ends at (${labelOf(end, doc)}) must be on one sheet.`,
        id,
      );
    return end;
  });
  if (ends.every((end) => sourceTransformerId(end) !== null))
    add('cable-between-sources', 'A cable straight from one feed to another would short or do nothing.');
}
