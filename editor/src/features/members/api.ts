import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';
import { meKey, type Role } from '../../lib/me';

export type Member = Answer<'/api/members', 'get'>['items'][number];
export type Invitation = Answer<'/api/invitations', 'get'>['items'][number];

const membersKey = ['members'] as const;
const invitationsKey = ['invitations'] as const;

export const membersQuery = queryOptions({
  queryKey: membersKey,
  queryFn: async ({ signal }) => (await answer(server.GET('/api/members', { signal }))).items,
});

/** Those that still wait; only owners may read them. */
export const invitationsQuery = queryOptions({
  queryKey: invitationsKey,
  queryFn: async ({ signal }) => (await answer(server.GET('/api/invitations', { signal }))).items,
});

function useMembersChange<V>(change: (value: V) => Promise<unknown>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: () =>
      Promise.all([
        cache.invalidateQueries({ queryKey: membersKey }),
        // The person may have changed their own role.
        cache.invalidateQueries({ queryKey: meKey }),
      ]),
  });
}

export const useChangeRole = () =>
  useMembersChange(({ userId, role }: { userId: string; role: Role }) =>
    server.PATCH('/api/members/{userId}', { params: { path: { userId } }, body: { role } }),
  );

export const useRemoveMember = () =>
  useMembersChange((userId: string) =>
    server.DELETE('/api/members/{userId}', { params: { path: { userId } } }),
  );

function useInvitationsChange<V>(change: (value: V) => Promise<unknown>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: () => cache.invalidateQueries({ queryKey: invitationsKey }),
  });
}

export interface NewInvitation {
  readonly email: string;
  readonly role: Role;
}

export const useInvite = () =>
  useInvitationsChange((invitation: NewInvitation) => server.POST('/api/invitations', { body: invitation }));

export const useResendInvitation = () =>
  useInvitationsChange((id: string) =>
    server.POST('/api/invitations/{id}/resend', { params: { path: { id } } }),
  );

export const useRevokeInvitation = () =>
  useInvitationsChange((id: string) => server.DELETE('/api/invitations/{id}', { params: { path: { id } } }));
