import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { affairsChanged, boardKey } from '../../lib/affairs';
import { answer, server } from '../../lib/api/client';
import { jobKey } from '../../lib/jobs';
import { type Board, type Moving, moved } from './move';

/** Others work on it too, and homeowners answer at any hour. */
const REFRESH_MS = 30_000;

export const boardQuery = queryOptions({
  queryKey: boardKey,
  queryFn: ({ signal }) => answer(server.GET('/api/board', { signal })),
  staleTime: 0,
  refetchInterval: REFRESH_MS,
});

/** Moves a job to another stage: on the screen at once, back again if the server refuses. */
export function useMoveJob() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: ({ jobId, to }: Moving) =>
      answer(server.PATCH('/api/jobs/{id}', { params: { path: { id: jobId } }, body: { stage: to } })),
    onMutate: async (moving) => {
      await cache.cancelQueries({ queryKey: boardKey });
      const before = cache.getQueryData<Board>(boardKey);
      if (before !== undefined) cache.setQueryData(boardKey, moved(before, moving));
      return before;
    },
    onError: (_error, _moving, before) => {
      if (before !== undefined) cache.setQueryData(boardKey, before);
    },
    onSuccess: (job) => cache.setQueryData(jobKey(job.id), job),
    onSettled: (_job, _error, { jobId }) => affairsChanged(cache, jobId),
  });
}
