import { recordIdSchema } from '@lampwright/geometry/plan';
import { z } from 'zod';

/** The most changes in one request; a client with more sends them one request after another. */
export const MAX_CHANGES_PER_SAVE = 500;
/** The most that one answer of changes holds; `more` says that there are others. */
export const CHANGES_PER_PAGE = 500;

const version = z.number().int().min(0);

export const saveSchema = z.strictObject({
  /** The editing session that made the changes; its earlier ones are no news to them. */
  session: recordIdSchema.optional(),
  /** The version of the plan that the changes were made on. */
  baseVersion: version,
  /** Further changes, made elsewhere, that the author had in view although they came after the base. */
  own: z.array(recordIdSchema).max(5000).optional(),
  /** In order. Checked after they are brought to the present form. */
  changes: z.array(z.unknown()).min(1).max(MAX_CHANGES_PER_SAVE),
});
export type Save = z.infer<typeof saveSchema>;

/** Records and changes have a schema of their own (the plan's), which is not repeated in answers. */
const recordSchema = z.looseObject({ kind: z.string(), id: z.string() });
const changeSchema = z.object({
  id: z.string(),
  schema: z.number().int(),
  put: z.record(z.string(), recordSchema),
  remove: z.array(z.string()),
});
const committedSchema = z.object({ version, change: changeSchema });

export const planSchema = z.object({ version, records: z.array(recordSchema) });
export type Plan = z.infer<typeof planSchema>;

export const changesQuerySchema = z.strictObject({ since: z.coerce.number().int().min(0) });
export type ChangesQuery = z.infer<typeof changesQuerySchema>;

export const changesSchema = z.object({
  /** The present version. */
  version,
  changes: z.array(committedSchema),
  /** Ask again from the last version of these. */
  more: z.boolean(),
});
export type Changes = z.infer<typeof changesSchema>;

export const savedSchema = z.object({
  version,
  applied: z.array(z.object({ id: z.string(), version })),
  others: z.array(committedSchema),
});
export type Saved = z.infer<typeof savedSchema>;

const conflictSchema = z.object({
  changeId: z.string(),
  recordId: z.string(),
  reason: z.enum(['changed', 'missing']),
  message: z.string(),
  base: recordSchema.nullable(),
  theirs: recordSchema.nullable(),
  mine: recordSchema.nullable(),
});

/** The problem details of a save in conflict; nothing of it was saved. */
export const saveConflictSchema = z.object({
  status: z.literal(409),
  code: z.literal('plan-conflict'),
  detail: z.string(),
  version,
  conflicts: z.array(conflictSchema),
  others: z.array(committedSchema),
});

export const historyQuerySchema = z.strictObject({
  before: z.coerce.number().int().min(1).optional(),
  limit: z.coerce.number().int().min(1).max(200).optional(),
});
export type HistoryQuery = z.infer<typeof historyQuerySchema>;

export const historySchema = z.object({
  items: z.array(
    z.object({
      version,
      changeId: z.string(),
      at: z.iso.datetime(),
      /** Null for the product itself; the name is empty for a person who was deleted. */
      author: z.object({ id: z.string(), name: z.string() }).nullable(),
      label: z.string(),
      put: z.number().int(),
      removed: z.number().int(),
    }),
  ),
  /** Ask with this as `before` for the next page; null at the beginning of the plan. */
  next: z.number().int().nullable(),
});
export type History = z.infer<typeof historySchema>;

export const restoreSchema = z.strictObject({
  version,
  /** Made by the caller, so that asking twice restores once. */
  changeId: recordIdSchema.optional(),
});
export type Restore = z.infer<typeof restoreSchema>;

const severitySchema = z.enum(['fault', 'caution', 'advice']);
const volts = z.number().nullable();

/** What the server computed from a version of the plan. */
export const planSummarySchema = z.object({
  planVersion: version,
  solverVersion: z.string(),
  fixtures: z.number().int(),
  /** Fixtures that no run feeds, and those whose cable has no length yet. */
  unwired: z.number().int(),
  waiting: z.number().int(),
  counts: z.object({ fault: z.number().int(), caution: z.number().int(), advice: z.number().int() }),
  lowestVolts: volts,
  highestVolts: volts,
  /** Of all cable, slack and rise in; and of what runs under paving, as drawn. */
  cableMeters: z.number(),
  conduitMeters: z.number(),
  /** Why there are no volts, where that is so although there is cable. */
  failure: z.string().nullable(),
  transformers: z.array(
    z.object({ id: z.string(), label: z.string(), voltAmps: z.number(), loadPercent: z.number() }),
  ),
  runs: z.array(
    z.object({
      id: z.string(),
      label: z.string(),
      lowestVolts: volts,
      highestVolts: volts,
      lengthMeters: z.number(),
    }),
  ),
  /** The worst ones; `counts` says how many there are of each severity. */
  faults: z.array(
    z.object({
      code: z.string(),
      severity: severitySchema,
      recordId: z.string(),
      otherId: z.string().nullable(),
      message: z.string(),
    }),
  ),
});
export type PlanSummary = z.infer<typeof planSummarySchema>;

export const summaryAnswerSchema = z.object({
  /** The plan as it is now; the summary may still be of an older version. */
  version,
  summary: planSummarySchema.nullable(),
});
export type SummaryAnswer = z.infer<typeof summaryAnswerSchema>;
