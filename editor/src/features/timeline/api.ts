import { queryOptions } from '@tanstack/react-query';
import { affairsKey } from '../../lib/affairs';
import { type Answer, answer, server } from '../../lib/api/client';

export type Timeline = Answer<'/api/jobs/{jobId}/timeline', 'get'>;
export type TimelineEvent = Timeline['items'][number];

export const timelineQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...affairsKey(jobId), 'timeline'],
    queryFn: ({ signal }) =>
      answer(server.GET('/api/jobs/{jobId}/timeline', { signal, params: { path: { jobId } } })),
    staleTime: 0,
  });
