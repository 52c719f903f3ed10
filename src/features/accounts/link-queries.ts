import { useMutation, useQueryClient } from '@tanstack/react-query';
import type {
  askPasswordReset,
  useEmailChange,
  usePasswordReset,
} from '#shared/accounts/ways-in-contract.ts';
import { sessionQuery } from '#src/app/session.tsx';
import { call } from '#src/lib/api.ts';

/** Everything that goes by a mail's link, and needs nobody to be signed in. */
export const useAskReset = () =>
  useMutation({
    mutationFn: (email: string) =>
      call<typeof askPasswordReset>('post', '/api/password-resets', { body: { email } }),
  });

export function useReset(token: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (password: string) =>
      call<typeof usePasswordReset>('post', '/api/password-resets/use', { body: { token, password } }),
    // It ended every session of that person, perhaps the one of this browser: the sign-in page must know.
    onSuccess: () => queryClient.refetchQueries(sessionQuery),
  });
}

export const useConfirmEmail = (token: string) =>
  useMutation({
    mutationFn: () => call<typeof useEmailChange>('post', '/api/email-changes/use', { body: { token } }),
  });
