import { type QueryClient, queryOptions, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from './api/client';
import { jobKey, jobsKey } from './jobs';

/** What goes on between company and homeowner over a job: proposal, questions, money, and the story of it. */
export const affairsKey = (jobId: string) => ['affairs', jobId] as const;
export const proposalKey = (jobId: string) => [...affairsKey(jobId), 'proposal'] as const;
export const questionsKey = (jobId: string) => [...affairsKey(jobId), 'questions'] as const;
export const paymentsKey = (jobId: string) => [...affairsKey(jobId), 'payments'] as const;
export const boardKey = ['board'] as const;
export const numbersKey = ['numbers'] as const;

export type Questions = Answer<'/api/jobs/{jobId}/questions', 'get'>;
export type Question = Questions['items'][number];

/** What homeowners asked about a job's proposal, for the pages that show how many wait for an answer. */
export const questionsQuery = (jobId: string) =>
  queryOptions({
    queryKey: questionsKey(jobId),
    queryFn: async ({ signal }) =>
      (await answer(server.GET('/api/jobs/{jobId}/questions', { signal, params: { path: { jobId } } })))
        .items,
    staleTime: 0,
  });

export const openQuestions = (questions: readonly Question[]): readonly Question[] =>
  questions.filter((question) => question.resolvedAt === null);

/** Those that nobody has answered yet: open, with the client's as the last word. */
export const waitingQuestions = (questions: readonly Question[]): readonly Question[] =>
  openQuestions(questions).filter(({ messages }) => messages.at(-1)?.side === 'homeowner');

/** One step may move the job on, be told in its timeline and count in the numbers: all of them are asked anew. */
export const affairsChanged = (client: QueryClient, jobId: string): Promise<unknown> =>
  Promise.all([
    client.invalidateQueries({ queryKey: affairsKey(jobId) }),
    client.invalidateQueries({ queryKey: jobKey(jobId) }),
    client.invalidateQueries({ queryKey: [...jobsKey, 'list'] }),
    client.invalidateQueries({ queryKey: boardKey }),
    client.invalidateQueries({ queryKey: numbersKey }),
  ]);

export function useAffairsChanged(jobId: string): () => Promise<unknown> {
  const client = useQueryClient();
  return () => affairsChanged(client, jobId);
}
