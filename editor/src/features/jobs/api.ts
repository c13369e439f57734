import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { affairsChanged } from '../../lib/affairs';
import { type Answer, answer, server } from '../../lib/api/client';
import { clientsKey, propertiesKey } from '../../lib/clients';
import { type Job, jobKey, jobsKey } from '../../lib/jobs';
import type { Stage } from '../../lib/stages';
import type { ListAsk } from './list-ask';

type JobList = Answer<'/api/jobs', 'get'>;
export type ListedJob = JobList['items'][number];

export const PAGE_SIZE = 25;

export const jobListQuery = (ask: ListAsk) =>
  queryOptions({
    queryKey: [...jobsKey, 'list', ask],
    queryFn: ({ signal }) =>
      answer(
        server.GET('/api/jobs', {
          signal,
          params: {
            query: {
              search: ask.search || undefined,
              stage: ask.stage ?? undefined,
              archived: ask.archived ? 'true' : undefined,
              sort: ask.sort,
              direction: ask.direction,
              page: ask.page,
              pageSize: PAGE_SIZE,
            },
          },
        }),
      ),
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
    mutationFn: (job: NewJob) => answer(server.POST('/api/jobs', { body: job })),
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

const at = (id: string) => ({ params: { path: { id } } });

function useJobChange<V>(jobId: string, change: (value: V) => Promise<Job>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: async (job) => {
      client.setQueryData(jobKey(jobId), job);
      await affairsChanged(client, jobId);
    },
  });
}

export const useEditJob = (jobId: string) =>
  useJobChange(jobId, (edit: JobEdit) =>
    answer(server.PATCH('/api/jobs/{id}', { ...at(jobId), body: edit })),
  );

export const useArchiveJob = (jobId: string) =>
  useJobChange(jobId, () => answer(server.POST('/api/jobs/{id}/archive', at(jobId))));

export const useRestoreJob = (jobId: string) =>
  useJobChange(jobId, () => answer(server.POST('/api/jobs/{id}/restore', at(jobId))));
