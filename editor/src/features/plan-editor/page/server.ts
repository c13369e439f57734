import { type CatalogueItem, catalogueItemSchema } from '@lampwright/geometry/catalogue';
import {
  type EstimateAnswer,
  type EstimateRequest,
  estimateAnswerSchema,
} from '@lampwright/geometry/estimate';
import { changeSchema, planRecordSchema } from '@lampwright/geometry/plan';
import { z } from 'zod';
import { ApiProblem, server } from '../../../lib/api/client';
import type { PlanTransport, SaveAnswer } from '../store';

/** The plan's routes. Answers are parsed with the plan's own schemas, which the OpenAPI document does not repeat. */

const version = z.number().int().min(0);
const planSchema = z.object({ version, records: z.array(planRecordSchema) });
const committedSchema = z.object({ version, change: changeSchema });
const changesSchema = z.object({ version, changes: z.array(committedSchema), more: z.boolean() });
const savedSchema = z.object({
  version,
  applied: z.array(z.object({ id: z.string(), version })),
  others: z.array(committedSchema),
});
const conflictSchema = z.object({
  version,
  conflicts: z.array(
    z.object({
      recordId: z.string(),
      reason: z.enum(['changed', 'missing']),
      message: z.string(),
      base: planRecordSchema.nullable(),
      theirs: planRecordSchema.nullable(),
      mine: planRecordSchema.nullable(),
    }),
  ),
  others: z.array(committedSchema),
});
const heardSchema = z.object({ version });

const historySchema = z.object({
  items: z.array(
    z.object({
      version,
      at: z.iso.datetime(),
      author: z.object({ id: z.string(), name: z.string() }).nullable(),
      label: z.string(),
    }),
  ),
  next: z.number().int().nullable(),
});
export type HistoryPage = z.infer<typeof historySchema>;

/** The body of an answer, of the plan's own shape. */
async function read<T>(schema: z.ZodType<T>, call: Promise<{ data?: unknown }>): Promise<T> {
  const parsed = schema.safeParse((await call).data);
  if (parsed.success) return parsed.data;
  throw new ApiProblem(
    200,
    'unreadable-answer',
    'The server answered in a way that this window does not understand. Reload the page: it may be out of date.',
  );
}

const at = (jobId: string) => ({ params: { path: { jobId } } });

/** How long to wait before listening again after the server turned a listener away. */
const LISTEN_AGAIN_MS = 10_000;

export function httpTransport(jobId: string): PlanTransport {
  return {
    load: () => read(planSchema, server.GET('/api/jobs/{jobId}/plan', at(jobId))),
    async changesSince(since) {
      const params = { path: { jobId }, query: { since } };
      const page = await read(changesSchema, server.GET('/api/jobs/{jobId}/plan/changes', { params }));
      return page.changes;
    },
    async save({ session, baseVersion, own, changes }) {
      const body = { session, baseVersion, own: [...own], changes: [...changes] };
      try {
        const saved = server.POST('/api/jobs/{jobId}/plan/changes', { ...at(jobId), body });
        return { kind: 'saved', ...(await read(savedSchema, saved)) };
      } catch (error) {
        return failedSave(error);
      }
    },
    follow: (heard) => followVersions(`/api/jobs/${encodeURIComponent(jobId)}/plan/events`, heard),
  };
}

/** What a failed save means for what is unsent. */
export function failedSave(error: unknown): SaveAnswer {
  if (!(error instanceof ApiProblem)) return { kind: 'offline' };
  if (error.status === 401) return { kind: 'signed-out' };
  if (error.status === 409) {
    const conflict = conflictSchema.safeParse(error.body);
    if (conflict.success) return { kind: 'conflict', ...conflict.data };
  }
  // No answer, too many at once, or a server in trouble: all pass.
  if (error.status === 0 || error.status === 429 || error.status >= 500) return { kind: 'offline' };
  return { kind: 'refused', message: error.detail };
}

/** Listens to new versions. EventSource reconnects by itself but for a refusal, after which it is made anew. */
function followVersions(path: string, heard: (version: number) => void): () => void {
  let source: EventSource | null = null;
  let again: ReturnType<typeof setTimeout> | null = null;
  const open = (): void => {
    again = null;
    source = new EventSource(path);
    source.onmessage = (event) => {
      const parsed = heardSchema.safeParse(parseJson(event.data));
      if (parsed.success) heard(parsed.data.version);
    };
    source.onerror = () => {
      if (source?.readyState !== EventSource.CLOSED || again !== null) return;
      again = setTimeout(open, LISTEN_AGAIN_MS);
    };
  };
  open();
  return () => {
    source?.close();
    if (again !== null) clearTimeout(again);
  };
}

function parseJson(data: unknown): unknown {
  try {
    return typeof data === 'string' ? JSON.parse(data) : null;
  } catch {
    return null;
  }
}

export const askEstimate = (request: EstimateRequest, signal: AbortSignal): Promise<EstimateAnswer> =>
  read(estimateAnswerSchema, server.POST('/api/estimates', { body: request, signal }));

export const readHistory = (jobId: string, before: number | null): Promise<HistoryPage> => {
  const params = { path: { jobId }, query: before === null ? {} : { before } };
  return read(historySchema, server.GET('/api/jobs/{jobId}/plan/history', { params }));
};

/** Makes the plan what it was at that version, as a new change; the page hears of it like of any other. */
export async function restoreVersion(jobId: string, version: number): Promise<void> {
  await server.POST('/api/jobs/{jobId}/plan/restore', { ...at(jobId), body: { version } });
}

const catalogueSchema = z.object({ items: z.array(z.object({ id: z.string(), item: catalogueItemSchema })) });

export async function readCatalogue(): Promise<{ readonly id: string; readonly item: CatalogueItem }[]> {
  return (await read(catalogueSchema, server.GET('/api/catalogue'))).items;
}
