import { queryOptions, useQuery } from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import { createContext, use } from 'react';
import type { getSession, Me } from '#shared/accounts/contract.ts';
import { actingFor, call, setActingFor, setWriteToken } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';
import { carriedId, keepChoice, recordOf } from './record-choice.ts';

/** Why a session is over, for the sentence on the sign-in page. */
export type EndReason = 'idle' | 'ended' | 'signed-out-elsewhere';

/** Who is signed in here; `ended` says why nobody is any more. */
export type Session = { me: Me | null; ended?: EndReason };

/** Loading the session also arms the calls. Where a record is no longer this person's, what was fetched of it goes. */
export const sessionQuery = queryOptions({
  queryKey: queryPrefixes.session,
  queryFn: async ({ signal, client }): Promise<Session> => {
    const { me } = await call<typeof getSession>('get', '/api/session', {}, { signal });
    const before = actingFor();
    armCalls(me);
    if (before !== null && actingFor() !== before) forgetData(client);
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
  armCalls(me);
  queryClient.setQueryData(sessionQuery.queryKey, { me });
}

/** Hides the person's data, forgets it and leaves the way to the sign-in page with the reason. */
export function endSession(queryClient: QueryClient, ended: EndReason): void {
  forgetPerson(queryClient);
  queryClient.setQueryData(sessionQuery.queryKey, { me: null, ended });
}

/** Writes carry the session's token, and everything the record that this tab acts on where it is somebody else's. */
export function armCalls(me: Me | null): void {
  const record = me && recordOf(me);
  // A choice that was made by itself is kept like any other, so that its end is noticed.
  if (me && record?.caring) keepChoice(me.personId, record.id);
  setWriteToken(me?.writeToken ?? null);
  setActingFor(carriedId(record));
}

function forgetPerson(queryClient: QueryClient): void {
  armCalls(null);
  void queryClient.cancelQueries({ queryKey: queryPrefixes.session });
  forgetData(queryClient);
}

export function forgetData(queryClient: QueryClient): void {
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
