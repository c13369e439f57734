import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';
import { type Me, meKey } from '../../lib/me';
import { forgetPerson } from '../../lib/session';

export type Session = Answer<'/api/account/sessions', 'get'>['items'][number];
const sessionsKey = ['sessions'] as const;

export interface AccountEdit {
  readonly name?: string;
  readonly preferences?: Partial<Me['user']['preferences']>;
}

export function useEditAccount() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (edit: AccountEdit) => answer(server.PATCH('/api/account', { body: edit })),
    onSuccess: (me) => cache.setQueryData<Me | null>(meKey, me),
  });
}

export function useChangePassword() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (change: { current: string; next: string }) =>
      server.POST('/api/account/password', { body: change }),
    // Every other session is ended with it.
    onSuccess: () => cache.invalidateQueries({ queryKey: sessionsKey }),
  });
}

export const useChangeEmail = () =>
  useMutation({
    mutationFn: (change: { password: string; email: string }) =>
      server.POST('/api/account/email', { body: change }),
  });

export const sessionsQuery = queryOptions({
  queryKey: sessionsKey,
  queryFn: async ({ signal }) => (await answer(server.GET('/api/account/sessions', { signal }))).items,
});

export function useEndSession() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (id: string) => server.DELETE('/api/account/sessions/{id}', { params: { path: { id } } }),
    onSuccess: () => cache.invalidateQueries({ queryKey: sessionsKey }),
  });
}

/** After either, nobody is signed in here any more. */
function useLeave<V>(leave: (value: V) => Promise<unknown>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: leave,
    onSuccess: () => forgetPerson(cache),
  });
}

export const useSignOutEverywhere = () => useLeave<void>(() => server.POST('/api/auth/sign-out-everywhere'));

export const useDeleteAccount = () =>
  useLeave((password: string) => server.DELETE('/api/account', { body: { password } }));
