import { queryOptions } from '@tanstack/react-query';
import type { getWaysIn } from '#shared/accounts/ways-in-contract.ts';
import { call } from '#src/lib/api.ts';

export const waysInQuery = queryOptions({
  queryKey: ['ways-in'],
  queryFn: ({ signal }) => call<typeof getWaysIn>('get', '/api/ways-in', {}, { signal }),
});
