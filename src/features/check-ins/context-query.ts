import { queryOptions, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import type { getCheckInContext } from '#shared/check-ins/contract.ts';
import { call } from '#src/lib/api.ts';
import { loadWords } from '#src/lib/i18n.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';
import { checkInWords } from './word-files.ts';

const contextQuery = queryOptions({
  queryKey: queryPrefixes.checkInContext,
  queryFn: ({ signal }) => call<typeof getCheckInContext>('get', '/api/check-in-context', {}, { signal }),
});

export const useCheckInContext = () => useQuery(contextQuery);

/**
 * Fetches what a check-in needs while nothing else is going on, so that it opens at once, also when the network
 * has gone meanwhile. `loadScreen` brings the screen's own code.
 */
export function usePreparedCheckIn(wanted: boolean, loadScreen: () => Promise<void>): void {
  const queryClient = useQueryClient();
  const load = useRef(loadScreen);
  useEffect(() => {
    if (!wanted) return undefined;
    const prepare = () => {
      void queryClient.prefetchQuery(contextQuery);
      // A failure needs no word here: the code is asked for again when the check-in is opened.
      Promise.all([load.current(), loadWords(checkInWords)]).catch(() => undefined);
    };
    const timer = setTimeout(prepare, 1_500);
    return () => clearTimeout(timer);
  }, [wanted, queryClient]);
}
