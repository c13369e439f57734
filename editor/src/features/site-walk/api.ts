import { useMutation, useQueryClient } from '@tanstack/react-query';
import { answer, server } from '../../lib/api/client';
import { jobKey, jobsKey } from '../../lib/jobs';
import type { SiteWalk } from '../../lib/site-walk';

export function useSaveSiteWalk(jobId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (siteWalk: SiteWalk) =>
      answer(server.PUT('/api/jobs/{id}/site-walk', { params: { path: { id: jobId } }, body: siteWalk })),
    onSuccess: async (job) => {
      client.setQueryData(jobKey(jobId), job);
      await client.invalidateQueries({ queryKey: [...jobsKey, 'list'] });
    },
  });
}
