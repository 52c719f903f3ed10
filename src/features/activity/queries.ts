import { useInfiniteQuery } from '@tanstack/react-query';
import type { listActivity } from '#shared/caregivers/contract.ts';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

/** Who opened the record, fifty lines at a time. Only on one's own record. */
export const useActivity = (isOwn: boolean, withOwn: boolean) =>
  useInfiniteQuery({
    enabled: isOwn,
    queryKey: [...queryPrefixes.activity, withOwn ? 'all' : 'others'],
    initialPageParam: null as string | null,
    queryFn: ({ signal, pageParam }) =>
      call<typeof listActivity>(
        'get',
        '/api/activity',
        {
          query: {
            others: withOwn ? 'false' : 'true',
            ...(pageParam === null ? {} : { before: pageParam }),
          },
        },
        { signal },
      ),
    getNextPageParam: ({ lines, more }) => (more ? (lines.at(-1)?.at ?? null) : null),
  });
