import { keepPreviousData, queryOptions, useMutation } from '@tanstack/react-query';
import { numbersKey } from '../../lib/affairs';
import { type Answer, answer, server } from '../../lib/api/client';
import { fetchOrProblem } from '../../lib/api/transport';
import { saveBlob } from '../../lib/save-blob';
import type { Period } from './period';

export type Numbers = Answer<'/api/numbers', 'get'>;

export const numbersQuery = ({ from, to }: Period) =>
  queryOptions({
    queryKey: [...numbersKey, { from, to }],
    queryFn: ({ signal }) => answer(server.GET('/api/numbers', { signal, params: { query: { from, to } } })),
    placeholderData: keepPreviousData,
  });

/** Every payment and refund of a time as CSV, for the bookkeeping. */
export const useExportPayments = () =>
  useMutation({
    mutationFn: async ({ from, to }: Period) => {
      const url = new URL('/api/payments/export', window.location.origin);
      url.search = new URLSearchParams({ from, to }).toString();
      const response = await fetchOrProblem(new Request(url, { credentials: 'same-origin' }));
      saveBlob(await response.blob(), `payments-${from}-${to}.csv`);
    },
  });
