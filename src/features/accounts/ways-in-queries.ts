import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { endOtherSessions, endSession, listSessions } from '#shared/accounts/contract.ts';
import type {
  addPasskey,
  askEmailChange,
  askNewPasskey,
  changePassword,
  confirmAuthenticator,
  newRecoveryCodes,
  removeAuthenticator,
  removePasskey,
  startAuthenticator,
  WaysIn,
} from '#shared/accounts/ways-in-contract.ts';
import { useProven } from '#src/app/proof.tsx';
import { call } from '#src/lib/api.ts';
import { makePasskey } from '#src/lib/passkeys.ts';
import { remember } from './device-memory.ts';
import { waysInQuery } from './ways-in-query.ts';

const sessionsKey = ['sign-in-sessions'];

export const useWaysIn = () => useQuery(waysInQuery);

/** An act whose answer is the new state of the ways in. */
function useWaysInAct<Input>(act: (input: Input) => Promise<WaysIn>) {
  const withProof = useProven();
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (input: Input) => withProof(() => act(input)),
    onSuccess: (waysIn) => queryClient.setQueryData(waysInQuery.queryKey, waysIn),
  });
}

export const useAddPasskey = () =>
  useWaysInAct<void>(async () => {
    const question = await call<typeof askNewPasskey>('post', '/api/passkeys/question', {});
    const passkey = await makePasskey(question);
    const waysIn = await call<typeof addPasskey>('post', '/api/passkeys', { body: { passkey } });
    remember('passkey-used', true);
    return waysIn;
  });

export const useRemovePasskey = () =>
  useWaysInAct((passkeyId: string) =>
    call<typeof removePasskey>('delete', '/api/passkeys/:passkeyId', { params: { passkeyId } }),
  );

export const useChangePassword = () =>
  useWaysInAct((password: string) =>
    call<typeof changePassword>('put', '/api/password', { body: { password } }),
  );

export const useAskEmailChange = () =>
  useWaysInAct((email: string) =>
    call<typeof askEmailChange>('post', '/api/email-changes', { body: { email } }),
  );

export const useRemoveAuthenticator = () =>
  useWaysInAct<void>(() => call<typeof removeAuthenticator>('delete', '/api/authenticator', {}));

export function useStartAuthenticator() {
  const withProof = useProven();
  return useMutation({
    mutationFn: () => withProof(() => call<typeof startAuthenticator>('post', '/api/authenticator', {})),
  });
}

export const useConfirmAuthenticator = () =>
  useMutation({
    mutationFn: (code: string) =>
      call<typeof confirmAuthenticator>('post', '/api/authenticator/confirmation', { body: { code } }),
  });

export function useNewRecoveryCodes() {
  const withProof = useProven();
  return useMutation({
    mutationFn: () => withProof(() => call<typeof newRecoveryCodes>('post', '/api/recovery-codes', {})),
  });
}

export const useSessions = () =>
  useQuery({
    queryKey: sessionsKey,
    queryFn: ({ signal }) => call<typeof listSessions>('get', '/api/sessions', {}, { signal }),
  });

export function useEndSession() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (sessionId: string) =>
      call<typeof endSession>('delete', '/api/sessions/:sessionId', { params: { sessionId } }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: sessionsKey }),
  });
}

export function useEndOtherSessions() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => call<typeof endOtherSessions>('delete', '/api/sessions', {}),
    onSettled: () => queryClient.invalidateQueries({ queryKey: sessionsKey }),
  });
}
