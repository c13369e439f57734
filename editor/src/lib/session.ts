import { useMutation, useQueryClient } from '@tanstack/react-query';
import { server } from './api/client';
import { meKey } from './me';

/** Ends this session. Everything that was read for the person is forgotten. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => server.POST('/api/auth/sign-out'),
    onSuccess: () => {
      client.clear();
      client.setQueryData(meKey, null);
    },
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
