import { queryOptions } from '@tanstack/react-query';
import { paymentsKey, useAffairsChanged } from '../../lib/affairs';
import { type Answer, answer, server } from '../../lib/api/client';
import { useOnce } from '../../lib/once';

export type JobPayments = Answer<'/api/jobs/{jobId}/payments', 'get'>;
export type Due = JobPayments['dues'][number];
export type Payment = JobPayments['payments'][number];
export type Refund = JobPayments['refunds'][number];
export type MoneyDocument = JobPayments['documents'][number];

/** A paper that is being made, or a refund under way, is asked for this often. */
const WAITING_MS = 2_000;

export const paymentsQuery = (jobId: string) =>
  queryOptions({
    queryKey: paymentsKey(jobId),
    queryFn: ({ signal }) =>
      answer(server.GET('/api/jobs/{jobId}/payments', { signal, params: { path: { jobId } } })),
    staleTime: 0,
    refetchInterval: (query) => (isWaiting(query.state.data) ? WAITING_MS : false),
  });

export const isWaiting = (payments: JobPayments | undefined): boolean =>
  payments !== undefined &&
  (payments.documents.some(({ pdfUrl }) => pdfUrl === null) ||
    payments.refunds.some(({ status }) => status === 'pending'));

export function useRequestDue(jobId: string) {
  return useOnce(
    (dueId: string, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/dues/{dueId}/request', {
          params: { path: { jobId, dueId } },
          headers,
        }),
      ),
    useAffairsChanged(jobId),
  );
}

export interface Recording {
  readonly method: 'cheque' | 'transfer' | 'cash';
  readonly amountMinor: number;
  readonly receivedOn: string;
  readonly note: string;
}

export function useRecordPayment(jobId: string, dueId: string) {
  return useOnce(
    (body: Recording, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/dues/{dueId}/payments', {
          params: { path: { jobId, dueId } },
          headers,
          body,
        }),
      ),
    useAffairsChanged(jobId),
  );
}

export interface Refunding {
  readonly amountMinor: number;
  readonly reason: string;
}

export function useRefund(jobId: string, paymentId: string) {
  return useOnce(
    (body: Refunding, headers) =>
      answer(
        server.POST('/api/jobs/{jobId}/payments/{paymentId}/refunds', {
          params: { path: { jobId, paymentId } },
          headers,
          body,
        }),
      ),
    useAffairsChanged(jobId),
  );
}
