import type { z } from 'zod';
import { type Change, changeSchema, PLAN_SCHEMA_VERSION } from './change.js';
import { type PlanRecord, planRecordSchema } from './records.js';

/**
 * Takes records written in one form to the next. Numbered by the form it starts from; never edited once
 * released, since stored rows and unsent edits of that form may turn up at any time.
 */
export interface PlanMigration {
  readonly from: number;
  /** One record of form `from`, as parsed JSON, in form `from + 1`. Must not need any other record. */
  readonly record: (record: Readonly<Record<string, unknown>>) => Record<string, unknown>;
}

/** In order, one for each form before the present one. */
export const planMigrations: readonly PlanMigration[] = [{ from: 1, record: withLight }];

/** The second form knows where fixtures point and when they are on. */
function withLight(record: Readonly<Record<string, unknown>>): Record<string, unknown> {
  switch (record.kind) {
    case 'sheet':
      return { ...record, whiteLux: null };
    case 'transformer':
    case 'run':
      return { ...record, schedule: null };
    case 'fixture':
      return { ...record, aim: null, mountingHeightMeters: null, zoneId: null };
    case 'area':
    case 'measurement':
      return { ...record, lightTarget: null };
    case 'settings':
      return {
        ...record,
        // Written out: what is usual today may be something else when an old plan is read.
        schedule: { on: { kind: 'sunset', minutesAfter: 0 }, off: { kind: 'clock', at: '23:00' } },
      };
    default:
      return { ...record };
  }
}

export type PlanFormCode = 'plan-schema-newer' | 'plan-schema-unknown' | 'plan-change-invalid';

/** A change or record that can't be read, with a sentence for the person who sent it. */
export class PlanFormError extends Error {
  override readonly name = 'PlanFormError';
  constructor(
    readonly code: PlanFormCode,
    message: string,
    readonly issues: readonly z.core.$ZodIssue[] = [],
  ) {
    super(message);
  }
}

/** The steps and the form that a reader knows; given explicitly only by tests of the migrating itself. */
export interface KnownForms {
  readonly version: number;
  readonly migrations: readonly PlanMigration[];
}
const today: KnownForms = { version: PLAN_SCHEMA_VERSION, migrations: planMigrations };

/** A record stored in form `version`, brought to today's form and checked. */
export function readRecord(version: number, record: unknown, known: KnownForms = today): PlanRecord {
  const parsed = planRecordSchema.safeParse(migrateRecord(version, record, known));
  if (parsed.success) return parsed.data;
  throw new PlanFormError(
    'plan-change-invalid',
    `A record of the plan is not valid: ${parsed.error.issues[0]?.message ?? 'unknown fault'}.`,
    parsed.error.issues,
  );
}

/** A change as received or as stored, brought to today's form and checked. */
export function readChange(input: unknown, known: KnownForms = today): Change {
  const parsed = changeSchema.safeParse(migrateChange(input, known));
  if (parsed.success) return parsed.data;
  const issue = parsed.error.issues[0];
  throw new PlanFormError(
    'plan-change-invalid',
    `The change is not valid at ${issue?.path.join('/') || 'its top'}: ${issue?.message ?? 'unknown fault'}`,
    parsed.error.issues,
  );
}

function migrateChange(input: unknown, known: KnownForms): unknown {
  // Whatever is not even shaped like a change goes to the schema, which says what is wrong with it.
  if (!isObject(input) || typeof input.schema !== 'number' || !isObject(input.put)) return input;
  const version = input.schema;
  checkVersion(version, known);
  if (version === known.version) return input;
  const put = Object.entries(input.put).map(([id, record]) => [id, migrateRecord(version, record, known)]);
  return { ...input, schema: PLAN_SCHEMA_VERSION, put: Object.fromEntries(put) };
}

function migrateRecord(version: number, record: unknown, known: KnownForms): unknown {
  checkVersion(version, known);
  if (!isObject(record)) return record;
  let current: Record<string, unknown> = record;
  for (let from = version; from < known.version; from += 1) {
    const step = known.migrations.find((m) => m.from === from);
    if (!step)
      throw new PlanFormError(
        'plan-schema-unknown',
        `There is no way from plan form ${from} to ${from + 1}; the newest known is ${known.version}.`,
      );
    current = step.record(current);
  }
  return current;
}

function checkVersion(version: number, known: KnownForms): void {
  if (version > known.version)
    throw new PlanFormError(
      'plan-schema-newer',
      `This plan was edited with a newer version of Lampwright (plan form ${version}; this one knows up to ${known.version}). Reload the page to get the newer version; your edits are kept.`,
    );
  if (!Number.isInteger(version) || version < 1)
    throw new PlanFormError('plan-schema-unknown', `${version} is no plan form; they are numbered from 1.`);
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
