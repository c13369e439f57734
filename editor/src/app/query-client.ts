import { QueryClient } from '@tanstack/react-query';
import { ApiProblem, onSignedOut } from '../lib/api/client';
import { meKey } from '../lib/me';

const RETRIES = 2;

/** Tries again only where a second try can help: no answer, or a server that is not ready. */
function worthRetrying(failures: number, error: Error): boolean {
  if (failures >= RETRIES) return false;
  if (!(error instanceof ApiProblem)) return false;
  return error.status === 0 || error.status === 502 || error.status === 503 || error.status === 504;
}

export function createQueryClient(): QueryClient {
  const client = new QueryClient({
    defaultOptions: {
      queries: { staleTime: 15_000, retry: worthRetrying },
      mutations: { retry: false },
    },
  });
  // The pages behind the sign-in watch this and lead to it, keeping where the person was.
  onSignedOut(() => client.setQueryData(meKey, null));
  return client;
}
