import { queryOptions } from '@tanstack/react-query';
import { type Answer, answer, server } from './api/client';

/** A job with its client, property, site walk and sheets. */
export type Job = Answer<'/api/jobs/{id}', 'get'>;

export const jobsKey = ['jobs'] as const;
export const jobKey = (jobId: string) => [...jobsKey, 'one', jobId] as const;

export const jobQuery = (jobId: string) =>
  queryOptions({
    queryKey: jobKey(jobId),
    queryFn: ({ signal }) =>
      answer(server.GET('/api/jobs/{id}', { signal, params: { path: { id: jobId } } })),
  });
