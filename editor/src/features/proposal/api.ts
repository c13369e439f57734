import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { affairsKey, proposalKey, useAffairsChanged } from '../../lib/affairs';
import { type Answer, answer, server } from '../../lib/api/client';
import { useOnce } from '../../lib/once';

export type Proposal = Answer<'/api/jobs/{jobId}/proposal', 'get'>;
export type Revision = Proposal['revisions'][number];
export type ProposalLink = Proposal['links'][number];
export type RevisionDetail = Answer<'/api/jobs/{jobId}/proposal/revisions/{revisionId}', 'get'>;
export type Differences = NonNullable<RevisionDetail['differences']>;
export type RevisionDocument = RevisionDetail['document'];
export type Obstacle = Answer<'/api/jobs/{jobId}/quote', 'get'>['obstacles'][number];
export type ProposalTexts = Answer<'/api/proposal-texts', 'get'>;
export type Words = Proposal['words'];
export type WordsKey = keyof Words;

/** A PDF takes seconds: its progress is asked for this often. */
const PREPARING_MS = 1_000;

export const proposalQuery = (jobId: string) =>
  queryOptions({
    queryKey: proposalKey(jobId),
    queryFn: ({ signal }) =>
      answer(server.GET('/api/jobs/{jobId}/proposal', { signal, params: { path: { jobId } } })),
    staleTime: 0,
    refetchInterval: (query) => (isWaiting(query.state.data) ? PREPARING_MS : false),
  });

/** Something is being made of it: a revision's PDF, or the signed one. */
export function isWaiting(proposal: Proposal | undefined): boolean {
  return (
    proposal?.revisions.some(
      ({ state, failure, approval }) =>
        (state === 'preparing' && failure === null) || (approval !== null && approval.signedPdfUrl === null),
    ) ?? false
  );
}

export const revisionQuery = (jobId: string, revisionId: string) =>
  queryOptions({
    queryKey: [...proposalKey(jobId), 'revision', revisionId],
    queryFn: ({ signal }) =>
      answer(
        server.GET('/api/jobs/{jobId}/proposal/revisions/{revisionId}', {
          signal,
          params: { path: { jobId, revisionId } },
        }),
      ),
  });

/** Of the price as it is now: what it comes to, and what stands in the way of a revision. */
export const priceBriefQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...affairsKey(jobId), 'price'],
    queryFn: async ({ signal }) => {
      const { quote, obstacles } = await answer(
        server.GET('/api/jobs/{jobId}/quote', { signal, params: { path: { jobId } } }),
      );
      return {
        obstacles,
        currency: quote.currency,
        locale: quote.locale,
        /** Null where nothing is priced yet. */
        totalMinor: quote.lines.length === 0 ? null : (quote.combinations[0]?.totalMinor ?? null),
      };
    },
    staleTime: 0,
  });

export function useMakeRevision(jobId: string) {
  return useOnce(
    (_: undefined, headers) =>
      answer(server.POST('/api/jobs/{jobId}/proposal/revisions', { params: { path: { jobId } }, headers })),
    useAffairsChanged(jobId),
  );
}

export interface Recipient {
  readonly name: string;
  readonly email: string;
}
export interface Sending {
  readonly revisionId: string;
  readonly recipients: readonly Recipient[];
  readonly message: string;
}

export function useSendRevision(jobId: string) {
  return useOnce(
    ({ revisionId, recipients, message }: Sending, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/proposal/revisions/{revisionId}/send', {
          params: { path: { jobId, revisionId } },
          headers,
          body: { recipients: [...recipients], message },
        }),
      ),
    useAffairsChanged(jobId),
  );
}

export function useResendLink(jobId: string) {
  return useOnce(
    (linkId: string, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/proposal/links/{linkId}/resend', {
          params: { path: { jobId, linkId } },
          headers,
        }),
      ),
    useAffairsChanged(jobId),
  );
}

export const useRevokeLink = (jobId: string) =>
  useMutation({
    mutationFn: (linkId: string) =>
      answer(
        server.POST('/api/jobs/{jobId}/proposal/links/{linkId}/revoke', {
          params: { path: { jobId, linkId } },
        }),
      ),
    onSuccess: useAffairsChanged(jobId),
  });

export const useWithdrawRevision = (jobId: string) =>
  useMutation({
    mutationFn: (revisionId: string) =>
      answer(
        server.POST('/api/jobs/{jobId}/proposal/revisions/{revisionId}/withdraw', {
          params: { path: { jobId, revisionId } },
        }),
      ),
    onSuccess: useAffairsChanged(jobId),
  });

export const useReleaseRevision = (jobId: string) =>
  useMutation({
    mutationFn: (revisionId: string) =>
      answer(
        server.POST('/api/jobs/{jobId}/proposal/revisions/{revisionId}/release', {
          params: { path: { jobId, revisionId } },
        }),
      ),
    onSuccess: useAffairsChanged(jobId),
  });

/** Puts the job's own words in place of the company's: all of them, each time. */
export const useSetWords = (jobId: string) => {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (own: Partial<Words>) =>
      answer(server.PUT('/api/jobs/{jobId}/proposal/words', { params: { path: { jobId } }, body: own })),
    onSuccess: (proposal) => cache.setQueryData(proposalKey(jobId), proposal),
  });
};

const textsKey = ['proposal-texts'] as const;

export const proposalTextsQuery = queryOptions({
  queryKey: textsKey,
  queryFn: ({ signal }) => answer(server.GET('/api/proposal-texts', { signal })),
});

export const useSaveTexts = () => {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (edit: { baseVersion: number; texts: ProposalTexts['texts'] }) =>
      answer(server.PUT('/api/proposal-texts', { body: edit })),
    onSuccess: async (saved) => {
      cache.setQueryData(textsKey, saved);
      await cache.invalidateQueries({ queryKey: ['affairs'] });
    },
  });
};
