import { useQuery } from '@tanstack/react-query';
import type { getWorkerHealth } from '#shared/clinic/contract.ts';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

const askEveryMs = 10_000;

/** Asked over and over, since a worker that has died sends no hint. */
export const useWorkerHealth = () =>
  useQuery({
    queryKey: queryPrefixes.worker,
    queryFn: ({ signal }) => call<typeof getWorkerHealth>('get', '/api/worker', {}, { signal }),
    refetchInterval: askEveryMs,
  });
