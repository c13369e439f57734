import { type QueryClient, useMutation, useQueryClient } from '@tanstack/react-query';
import { server } from './api/client';
import { meKey } from './me';

/**
 * Nobody is signed in here any more: whoever watches that is told, and all else that was read for the person
 * is forgotten. Clearing the whole cache would tell nobody.
 */
export function forgetPerson(client: QueryClient): void {
  client.setQueryData(meKey, null);
  client.removeQueries({ predicate: (query) => query.queryKey[0] !== meKey[0] });
}

/** Ends this session. Everything that was read for the person is forgotten. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => server.POST('/api/auth/sign-out'),
    onSuccess: () => forgetPerson(client),
  });
}

/** Makes another of the person's companies the active one; nothing of the former stays in memory. */
export function useSwitchCompany() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (companyId: string) => server.POST('/api/auth/active-company', { body: { companyId } }),
    onSuccess: async () => {
      client.removeQueries({ predicate: (query) => query.queryKey[0] !== meKey[0] });
      await client.refetchQueries({ queryKey: meKey });
    },
  });
}
