import { queryOptions, useQuery } from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import { createContext, use } from 'react';
import type { getSession, Me } from '#shared/accounts/contract.ts';
import { call, setWriteToken } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

/** Why a session is over, for the sentence on the sign-in page. */
export type EndReason = 'idle' | 'ended' | 'signed-out-elsewhere';

/** Who is signed in here; `ended` says why nobody is any more. */
export type Session = { me: Me | null; ended?: EndReason };

/** Loading the session also arms the writes with its token. */
export const sessionQuery = queryOptions({
  queryKey: queryPrefixes.session,
  queryFn: async ({ signal }): Promise<Session> => {
    const { me } = await call<typeof getSession>('get', '/api/session', {}, { signal });
    setWriteToken(me?.writeToken ?? null);
    return { me };
  },
  // Another tab may have signed in somebody else: each return to the tab asks.
  staleTime: 0,
  gcTime: Infinity,
});

export const useSession = () => useQuery(sessionQuery);

/** Puts a person who has just signed in in place of whoever was here before. */
export function beginSession(queryClient: QueryClient, me: Me): void {
  forgetPerson(queryClient);
  setWriteToken(me.writeToken);
  queryClient.setQueryData(sessionQuery.queryKey, { me });
}

/** Hides the person's data, forgets it and leaves the way to the sign-in page with the reason. */
export function endSession(queryClient: QueryClient, ended: EndReason): void {
  forgetPerson(queryClient);
  queryClient.setQueryData(sessionQuery.queryKey, { me: null, ended });
}

function forgetPerson(queryClient: QueryClient): void {
  setWriteToken(null);
  void queryClient.cancelQueries({ queryKey: queryPrefixes.session });
  // The session's own entry stays, since the screens watch it to learn that the session is over.
  queryClient.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== queryPrefixes.session[0] });
  queryClient.getMutationCache().clear();
}

export const MeContext = createContext<Me | null>(null);

/** The person who is signed in; only below `RequireRole`, which sees to it that there is one. */
export function useMe(): Me {
  const me = use(MeContext);
  if (!me) throw new Error('useMe needs RequireRole above it.');
  return me;
}
