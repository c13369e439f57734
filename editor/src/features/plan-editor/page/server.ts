import { type CatalogueItem, catalogueItemSchema } from '@lampwright/geometry/catalogue';
import {
  type EstimateAnswer,
  type EstimateRequest,
  estimateAnswerSchema,
} from '@lampwright/geometry/estimate';
import { changeSchema, planRecordSchema } from '@lampwright/geometry/plan';
import { z } from 'zod';
import { ApiProblem } from '../../../lib/api/client';
import { fetchOrProblem } from '../../../lib/api/transport';
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

async function call<T>(schema: z.ZodType<T>, path: string, init: RequestInit = {}): Promise<T> {
  const response = await fetchOrProblem(
    new Request(new URL(path, location.origin), {
      credentials: 'same-origin',
      ...init,
      headers: {
        Accept: 'application/json',
        ...(init.body === undefined ? {} : { 'Content-Type': 'application/json' }),
      },
    }),
  );
  const parsed = schema.safeParse(await response.json());
  if (parsed.success) return parsed.data;
  throw new ApiProblem(
    response.status,
    'unreadable-answer',
    'The server answered in a way that this window does not understand. Reload the page: it may be out of date.',
  );
}

const post = (body: unknown, signal?: AbortSignal): RequestInit => ({
  method: 'POST',
  body: JSON.stringify(body),
  ...(signal === undefined ? {} : { signal }),
});

const planPath = (jobId: string) => `/api/jobs/${encodeURIComponent(jobId)}/plan`;

/** How long to wait before listening again after the server turned a listener away. */
const LISTEN_AGAIN_MS = 10_000;

export function httpTransport(jobId: string): PlanTransport {
  const path = planPath(jobId);
  return {
    load: () => call(planSchema, path),
    changesSince: async (since) => (await call(changesSchema, `${path}/changes?since=${since}`)).changes,
    async save(request) {
      try {
        return { kind: 'saved', ...(await call(savedSchema, `${path}/changes`, post(request))) };
      } catch (error) {
        return failedSave(error);
      }
    },
    follow: (heard) => followVersions(`${path}/events`, heard),
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
  call(estimateAnswerSchema, '/api/estimates', post(request, signal));

export const readHistory = (jobId: string, before: number | null): Promise<HistoryPage> =>
  call(historySchema, `${planPath(jobId)}/history${before === null ? '' : `?before=${before}`}`);

/** Makes the plan what it was at that version, as a new change; the page hears of it like of any other. */
export async function restoreVersion(jobId: string, to: number): Promise<void> {
  await call(savedSchema, `${planPath(jobId)}/restore`, post({ version: to }));
}

const catalogueSchema = z.object({ items: z.array(z.object({ id: z.string(), item: catalogueItemSchema })) });

export async function readCatalogue(): Promise<{ readonly id: string; readonly item: CatalogueItem }[]> {
  return (await call(catalogueSchema, '/api/catalogue')).items;
}
