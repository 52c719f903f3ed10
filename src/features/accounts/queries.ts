import { useMutation, useQuery } from '@tanstack/react-query';
import type {
  askPasskeySecondFactor,
  askPasskeySignIn,
  giveSecondFactor,
  signIn,
  signInByPasskey,
} from '#shared/accounts/contract.ts';
import type { getSignInPage } from '#shared/clinic/contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import { call } from '#src/lib/api.ts';
import { answerWithPasskey } from '#src/lib/passkeys.ts';
import { useBegin } from './begin.ts';
import { remember } from './device-memory.ts';

/** What the pages before the sign-in show of the clinic. They work without it. */
export const useSignInPage = () =>
  useQuery({
    queryKey: ['sign-in-page'],
    queryFn: ({ signal }) => call<typeof getSignInPage>('get', '/api/sign-in-page', {}, { signal }),
    staleTime: Infinity,
  });

export function useSignIn() {
  const begin = useBegin();
  return useMutation({
    mutationFn: (body: RequestOf<typeof signIn>['body']) =>
      call<typeof signIn>('post', '/api/session', { body }),
    onSuccess: (step, { staySignedIn }) => {
      remember('own-phone', staySignedIn === true);
      if (step.next === 'none') begin(step.me);
    },
  });
}

export function usePasskeySignIn() {
  const begin = useBegin();
  return useMutation({
    mutationFn: async (staySignedIn: boolean) => {
      const question = await call<typeof askPasskeySignIn>('post', '/api/session/passkey-question', {});
      const passkey = await answerWithPasskey(question);
      return call<typeof signInByPasskey>('post', '/api/session/passkey', {
        body: { passkey, staySignedIn },
      });
    },
    onSuccess: ({ me }, staySignedIn) => {
      remember('passkey-used', true);
      remember('own-phone', staySignedIn);
      begin(me);
    },
  });
}

export function useGiveSecondFactor(pendingId: string) {
  const begin = useBegin();
  return useMutation({
    mutationFn: (answer: { way: 'authenticator' | 'recovery-code'; code: string }) =>
      call<typeof giveSecondFactor>('post', '/api/session/second-factor', { body: { pendingId, answer } }),
    onSuccess: ({ me }) => begin(me),
  });
}

export function useGivePasskey(pendingId: string) {
  const begin = useBegin();
  return useMutation({
    mutationFn: async () => {
      const question = await call<typeof askPasskeySecondFactor>(
        'post',
        '/api/session/second-factor/passkey-question',
        { body: { pendingId } },
      );
      const passkey = await answerWithPasskey(question);
      return call<typeof giveSecondFactor>('post', '/api/session/second-factor', {
        body: { pendingId, answer: { way: 'passkey', passkey } },
      });
    },
    onSuccess: ({ me }) => {
      remember('passkey-used', true);
      begin(me);
    },
  });
}
