import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { act, post } from '../../lib/api/client';
import { meKey, roleSchema } from '../../lib/me';

const email = z.email();
/** The length is what makes a password hard to guess; no rules about kinds of characters. */
export const newPassword = z
  .string()
  .min(10, { error: 'At least 10 characters. A few unrelated words are easy to remember.' })
  .max(200);

export const signInSchema = z.object({ email, password: z.string().min(1) });
export const signUpSchema = z.object({
  companyName: z.string().trim().min(1).max(120),
  name: z.string().trim().min(1).max(120),
  email,
  password: newPassword,
  region: z.string().min(1),
});
export const forgotSchema = z.object({ email });
export const resetSchema = z.object({ password: newPassword });
export const joinSchema = z.object({ name: z.string().trim().min(1).max(120), password: newPassword });

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
      await act('POST', '/api/auth/sign-in', input);
      await renew();
    },
  });
}

export function useSignUp() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (input: SignUp) => {
      await act('POST', '/api/auth/sign-up', input);
      await renew();
    },
  });
}

export const useForgotPassword = () =>
  useMutation({
    mutationFn: (input: { email: string }) => act('POST', '/api/auth/forgot-password', input),
  });

export const useResetPassword = () =>
  useMutation({
    mutationFn: (input: { token: string; password: string }) =>
      act('POST', '/api/auth/reset-password', input),
  });

export function useConfirmEmail() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (token: string) => {
      await act('POST', '/api/auth/confirm-email', { token });
      await renew();
    },
  });
}

const invitationSchema = z.object({
  companyName: z.string(),
  email: z.string(),
  role: roleSchema,
  invitedBy: z.string().nullish(),
  /** The address already has an account: no name or password is asked for. */
  hasAccount: z.boolean(),
});
export type InvitationLook = z.infer<typeof invitationSchema>;

/** What an invitation says. Looking counts nothing and accepts nothing. */
export const useInvitation = (token: string) =>
  useQuery({
    queryKey: ['invitation', token],
    queryFn: ({ signal }) => post('/api/invitations/look', { token }, invitationSchema, { signal }),
    enabled: token !== '',
    retry: false,
  });

export function useAcceptInvitation() {
  const renew = useNewIdentity();
  return useMutation({
    mutationFn: async (input: { token: string; name?: string; password?: string }) => {
      await act('POST', '/api/invitations/accept', input);
      await renew();
    },
  });
}
