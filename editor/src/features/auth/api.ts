import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { type Answer, answer, server } from '../../lib/api/client';
import { meKey } from '../../lib/me';
import { newPasswordSchema } from '../../lib/password';
import { regionCodes } from '../../lib/regions';

const email = z.email();

export const signInSchema = z.object({ email, password: z.string().min(1) });
export const signUpSchema = z.object({
  companyName: z.string().trim().min(1).max(120),
  name: z.string().trim().min(1).max(120),
  email,
  password: newPasswordSchema,
  region: z.enum(regionCodes),
});
export const forgotSchema = z.object({ email });
export const resetSchema = z.object({ password: newPasswordSchema });
export const joinSchema = z.object({ name: z.string().trim().min(1).max(120), password: newPasswordSchema });

export type SignIn = z.infer<typeof signInSchema>;
export type SignUp = z.infer<typeof signUpSchema>;

/** After any of these the person is another one: ask again who it is, and forget what was read before. */
function useNewIdentity() {
  const client = useQueryClient();
  return async () => {
    client.removeQueries({ predicate: (query) => query.queryKey[0] !== meKey[0] });
    await client.refetchQueries({ queryKey: meKey, type: 'all' });
  };
}

export function useSignIn() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (input: SignIn) => {
      await server.POST('/api/auth/sign-in', { body: input });
      await renew();
    },
  });
}

export function useSignUp() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (input: SignUp) => {
      await server.POST('/api/auth/sign-up', { body: input });
      await renew();
    },
  });
}

export const useForgotPassword = () =>
  useMutation({
    mutationFn: (input: { email: string }) => server.POST('/api/auth/forgot-password', { body: input }),
  });

export const useResetPassword = () =>
  useMutation({
    mutationFn: (input: { token: string; password: string }) =>
      server.POST('/api/auth/reset-password', { body: input }),
  });

export function useConfirmEmail() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (token: string) => {
      await server.POST('/api/auth/confirm-email', { body: { token } });
      await renew();
    },
  });
}

export type InvitationLook = Answer<'/api/invitations/look', 'post'>;

/** What an invitation says. Looking counts nothing and accepts nothing. */
export const useInvitation = (token: string) =>
  useQuery({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => answer(server.POST('/api/invitations/look', { signal, body: { token } })),
    enabled: token !== '',
    retry: false,
  });

export function useAcceptInvitation() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (input: { token: string; name?: string; password?: string }) => {
      await server.POST('/api/invitations/accept', { body: input });
      await renew();
    },
  });
}
