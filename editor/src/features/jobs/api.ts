import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { get, patch, post } from '../../lib/api/client';
import { clientsKey, propertiesKey } from '../../lib/clients';
import { type Job, jobAddress, jobKey, jobSchema, jobsKey } from '../../lib/jobs';
import { type Stage, stageSchema } from '../../lib/stages';
import type { ListAsk } from './list-ask';

const listedJobSchema = z.object({
  id: z.string(),
  name: z.string(),
  stage: stageSchema,
  existingSystem: z.boolean(),
  client: z.object({ id: z.string(), name: z.string() }),
  property: z.object({ id: z.string(), name: z.string(), address: z.string() }),
  thumbnailUrl: z.string().nullable(),
  /** Of the plan, as the server last worked them out; null before it has. */
  faults: z.number().nullable(),
  cautions: z.number().nullable(),
  fixtures: z.number().nullable(),
  updatedAt: z.string(),
  archivedAt: z.string().nullable(),
});
export type ListedJob = z.infer<typeof listedJobSchema>;

export const jobListSchema = z.object({
  items: z.array(listedJobSchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});

export const PAGE_SIZE = 25;

export const jobListQuery = (ask: ListAsk) =>
  queryOptions({
    queryKey: [...jobsKey, 'list', ask],
    queryFn: ({ signal }) =>
      get('/api/jobs', jobListSchema, {
        signal,
        query: {
          search: ask.search,
          stage: ask.stage,
          archived: ask.archived ? 'true' : undefined,
          sort: ask.sort,
          direction: ask.direction,
          page: ask.page,
          pageSize: PAGE_SIZE,
        },
      }),
    placeholderData: keepPreviousData,
  });

export interface NewJob {
  readonly name: string;
  readonly client: { id: string } | { name: string; email?: string | null; phone?: string | null };
  readonly property: { id: string } | { name: string; address: string; accessNotes?: string };
  readonly existingSystem?: boolean;
  readonly notes?: string;
}

export function useCreateJob() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (job: NewJob) => post('/api/jobs', job, jobSchema),
    onSuccess: async (job) => {
      client.setQueryData(jobKey(job.id), job);
      await Promise.all([
        client.invalidateQueries({ queryKey: [...jobsKey, 'list'] }),
        client.invalidateQueries({ queryKey: clientsKey }),
        client.invalidateQueries({ queryKey: propertiesKey }),
      ]);
    },
  });
}

export interface JobEdit {
  readonly name?: string;
  readonly stage?: Stage;
  readonly notes?: string;
  readonly siteWalkOn?: string | null;
  readonly installOn?: string | null;
  readonly existingSystem?: boolean;
}

function useJobChange<V>(jobId: string, change: (value: V) => Promise<Job>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: async (job) => {
      client.setQueryData(jobKey(jobId), job);
      await client.invalidateQueries({ queryKey: [...jobsKey, 'list'] });
    },
  });
}

export const useEditJob = (jobId: string) =>
  useJobChange(jobId, (edit: JobEdit) => patch(jobAddress(jobId), edit, jobSchema));

export const useArchiveJob = (jobId: string) =>
  useJobChange(jobId, () => post(`${jobAddress(jobId)}/archive`, {}, jobSchema));

export const useRestoreJob = (jobId: string) =>
  useJobChange(jobId, () => post(`${jobAddress(jobId)}/restore`, {}, jobSchema));
