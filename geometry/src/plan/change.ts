import { z } from 'zod';
import { sameData } from './equal.js';
import { type PlanDocument, type PlanRecord, planRecordSchema, recordIdSchema } from './records.js';

/** The form of records and changes written today; see migrations.ts for what older ones become. */
export const PLAN_SCHEMA_VERSION = 2;

/** The most records that one change may put and remove together. */
export const MAX_RECORDS_PER_CHANGE = 5000;

/**
 * One edit of a plan: whole records put, and ids removed. The id is made by whoever makes the change, so
 * that sending it twice is harmless.
 */
export const changeSchema = z
  .strictObject({
    id: recordIdSchema,
    schema: z.literal(PLAN_SCHEMA_VERSION),
    put: z.record(recordIdSchema, planRecordSchema),
    remove: z.array(recordIdSchema).max(MAX_RECORDS_PER_CHANGE),
  })
  .superRefine((change, ctx) => {
    const count = Object.keys(change.put).length + change.remove.length;
    if (count > MAX_RECORDS_PER_CHANGE)
      ctx.addIssue({
        code: 'custom',
        path: ['put'],
        message: `A change holds at most ${MAX_RECORDS_PER_CHANGE} records; this one holds ${count}.`,
      });
    for (const [key, record] of Object.entries(change.put))
      if (key !== record.id)
        ctx.addIssue({
          code: 'custom',
          path: ['put', key, 'id'],
          message: `The record under ${key} calls itself ${record.id}.`,
        });
    change.remove.forEach((id, i) => {
      if (Object.hasOwn(change.put, id) || change.remove.indexOf(id) !== i)
        ctx.addIssue({
          code: 'custom',
          path: ['remove', i],
          message: `Record ${id} is named twice in this change.`,
        });
    });
  });
export type Change = z.infer<typeof changeSchema>;

/** What a change comes from when nobody has named it yet. */
export type ChangeBody = Pick<Change, 'put' | 'remove'>;

export const emptyPlan: PlanDocument = new Map();

export function planOf(records: Iterable<PlanRecord>): PlanDocument {
  return new Map([...records].map((record) => [record.id, record]));
}

/** Ids that the change puts or removes. */
export function touched(change: ChangeBody): string[] {
  return [...Object.keys(change.put), ...change.remove];
}

export function isEmpty(change: ChangeBody): boolean {
  return change.remove.length === 0 && Object.keys(change.put).length === 0;
}

/** What a record is after the change, or undefined when the change removes it. Ask only about touched ids. */
export function after(change: ChangeBody, id: string): PlanRecord | undefined {
  return Object.hasOwn(change.put, id) ? change.put[id] : undefined;
}

/**
 * The plan with the change made. Records are shared with the old plan; only the table of them is copied
 * (0.1 ms for 5000). Removing what is not there is harmless, so that replaying twice is too.
 */
export function apply(doc: PlanDocument, change: ChangeBody): PlanDocument {
  if (isEmpty(change)) return doc;
  const next = new Map(doc);
  for (const id of change.remove) next.delete(id);
  for (const [id, record] of Object.entries(change.put)) next.set(id, record);
  return next;
}

export function applyAll(doc: PlanDocument, changes: Iterable<ChangeBody>): PlanDocument {
  const next = new Map(doc);
  for (const change of changes) {
    for (const id of change.remove) next.delete(id);
    for (const [id, record] of Object.entries(change.put)) next.set(id, record);
  }
  return next;
}

/** The change that takes `after` of each id, undefined meaning removed, where it differs from the plan. */
export function changeTo(
  doc: PlanDocument,
  wanted: Iterable<readonly [string, PlanRecord | undefined]>,
  id: string,
): Change {
  const put: Record<string, PlanRecord> = {};
  const remove: string[] = [];
  for (const [recordId, record] of wanted) {
    const present = doc.get(recordId);
    if (record === undefined) {
      if (present !== undefined) remove.push(recordId);
    } else if (!sameData(present, record)) put[recordId] = record;
  }
  return { id, schema: PLAN_SCHEMA_VERSION, put, remove };
}

/** What undoes the change, given the plan BEFORE it. */
export function inverse(doc: PlanDocument, change: ChangeBody, id: string): Change {
  const put: Record<string, PlanRecord> = {};
  const remove: string[] = [];
  for (const recordId of touched(change)) {
    const old = doc.get(recordId);
    if (old !== undefined) put[recordId] = old;
    else if (after(change, recordId) !== undefined) remove.push(recordId);
  }
  return { id, schema: PLAN_SCHEMA_VERSION, put, remove };
}

/** One change that does what `first` and then `second` do. */
export function compose(first: ChangeBody, second: ChangeBody, id: string): Change {
  const outcome = new Map<string, PlanRecord | undefined>();
  for (const change of [first, second])
    for (const recordId of touched(change)) outcome.set(recordId, after(change, recordId));
  const put: Record<string, PlanRecord> = {};
  const remove: string[] = [];
  for (const [recordId, record] of outcome) {
    if (record === undefined) remove.push(recordId);
    else put[recordId] = record;
  }
  return { id, schema: PLAN_SCHEMA_VERSION, put, remove };
}
