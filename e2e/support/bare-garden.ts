import { randomUUID } from 'node:crypto';
import { type APIRequestContext, expect, type Page } from '@playwright/test';
import { yardPhotoFile } from './files.js';
import { jobWithSheet } from './jobs.js';

/** The form that records are written in today. */
const PLAN_FORM = 2;

type Json = Record<string, unknown>;

/**
 * A job of its own with the plan and the groups of the demo's job with a photo, before anybody marked a wall or a
 * tree on it or aimed a light. Gives the job's id.
 */
export async function bareGarden(page: Page): Promise<string> {
  const { request } = page;
  const jobId = await jobWithSheet(page, yardPhotoFile, 'photo');
  const from = await demoJob(request);
  const [source, target] = [await planOf(request, from), await planOf(request, jobId)];
  const sheet = target.records.find(({ kind }) => kind === 'sheet')!;
  const sourceSheet = source.records.find(({ kind }) => kind === 'sheet')!;
  const put: Record<string, Json> = {
    [sheet.id as string]: { ...sheet, references: sourceSheet.references },
  };
  for (const record of source.records) {
    if (['sheet', 'face', 'tree'].includes(record.kind as string)) continue;
    put[record.id as string] = {
      ...record,
      ...('sheetId' in record && { sheetId: sheet.id }),
      ...(record.kind === 'fixture' && { aim: null }),
    };
  }
  const saved = await request.post(`/api/jobs/${jobId}/plan/changes`, {
    data: {
      baseVersion: target.version,
      changes: [{ id: randomUUID(), schema: PLAN_FORM, put, remove: [] }],
    },
  });
  expect(saved.ok(), await saved.text()).toBe(true);
  const { pricing } = await pricingOf(request, from);
  const { version } = await pricingOf(request, jobId);
  const priced = await request.put(`/api/jobs/${jobId}/pricing`, { data: { baseVersion: version, pricing } });
  expect(priced.ok(), await priced.text()).toBe(true);
  return jobId;
}

async function demoJob(request: APIRequestContext): Promise<string> {
  const { items } = (await json(request.get('/api/jobs?search=Harrow'))) as {
    items: { id: string; name: string }[];
  };
  return items.find(({ name }) => name.startsWith('Harrow Bank'))!.id;
}

const planOf = async (request: APIRequestContext, jobId: string) =>
  (await json(request.get(`/api/jobs/${jobId}/plan`))) as { version: number; records: Json[] };

const pricingOf = async (request: APIRequestContext, jobId: string) =>
  (await json(request.get(`/api/jobs/${jobId}/pricing`))) as { version: number; pricing: Json };

async function json(asked: ReturnType<APIRequestContext['get']>): Promise<unknown> {
  const answer = await asked;
  expect(answer.ok(), await answer.text()).toBe(true);
  return answer.json();
}
