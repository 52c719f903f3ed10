import { queryOptions, useQuery } from '@tanstack/react-query';
import type { getMyPlan, getToday } from '#shared/plans/contract.ts';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

const todayQuery = queryOptions({
  queryKey: queryPrefixes.today,
  queryFn: ({ signal }) => call<typeof getToday>('get', '/api/today', {}, { signal }),
});

export const useToday = () => useQuery(todayQuery);

/** The count on the Messages tab, from what Today has loaded. */
export const useUnseenMessages = (): number =>
  useQuery({ ...todayQuery, select: ({ unseenMessages }) => unseenMessages }).data ?? 0;

export const useMyPlan = () =>
  useQuery({
    queryKey: queryPrefixes.plan,
    queryFn: ({ signal }) => call<typeof getMyPlan>('get', '/api/my-plan', {}, { signal }),
  });
