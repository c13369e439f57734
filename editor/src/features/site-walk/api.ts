import { useMutation, useQueryClient } from '@tanstack/react-query';
import { put } from '../../lib/api/client';
import { jobAddress, jobKey, jobSchema, jobsKey } from '../../lib/jobs';
import type { SiteWalk } from '../../lib/site-walk';

export function useSaveSiteWalk(jobId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (siteWalk: SiteWalk) => put(`${jobAddress(jobId)}/site-walk`, siteWalk, jobSchema),
    onSuccess: async (job) => {
      client.setQueryData(jobKey(jobId), job);
      await client.invalidateQueries({ queryKey: [...jobsKey, 'list'] });
    },
  });
}
