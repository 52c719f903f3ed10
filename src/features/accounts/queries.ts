import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { signIn } from '#shared/accounts/contract.ts';
import type { getSignInPage } from '#shared/clinic/contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import { beginSession } from '#src/app/session.tsx';
import { tellOtherTabs } from '#src/app/tabs.ts';
import { call } from '#src/lib/api.ts';

/** What the sign-in page shows of the clinic. The page works without it. */
export const useSignInPage = () =>
  useQuery({
    queryKey: ['sign-in-page'],
    queryFn: ({ signal }) => call<typeof getSignInPage>('get', '/api/sign-in-page', {}, { signal }),
    staleTime: Infinity,
  });

export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: RequestOf<typeof signIn>['body']) =>
      call<typeof signIn>('post', '/api/session', { body }),
    onSuccess: ({ me }) => {
      beginSession(queryClient, me);
      tellOtherTabs({ kind: 'signed-in', personId: me.personId });
    },
  });
}
