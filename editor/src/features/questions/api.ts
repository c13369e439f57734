import { useMutation } from '@tanstack/react-query';
import { useAffairsChanged } from '../../lib/affairs';
import { answer, server } from '../../lib/api/client';
import { useOnce } from '../../lib/once';

export interface Answering {
  readonly questionId: string;
  readonly text: string;
}

export function useAnswer(jobId: string) {
  return useOnce(
    ({ questionId, text }: Answering, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/questions/{questionId}/messages', {
          params: { path: { jobId, questionId } },
          headers,
          body: { text },
        }),
      ),
    useAffairsChanged(jobId),
  );
}

export const useResolve = (jobId: string) =>
  useMutation({
    mutationFn: (questionId: string) =>
      answer(
        server.POST('/api/jobs/{jobId}/questions/{questionId}/resolve', {
          params: { path: { jobId, questionId } },
        }),
      ),
    onSuccess: useAffairsChanged(jobId),
  });

export const useReopen = (jobId: string) =>
  useMutation({
    mutationFn: (questionId: string) =>
      answer(
        server.POST('/api/jobs/{jobId}/questions/{questionId}/reopen', {
          params: { path: { jobId, questionId } },
        }),
      ),
    onSuccess: useAffairsChanged(jobId),
  });
