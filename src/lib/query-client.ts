import { QueryClient } from '@tanstack/react-query';
import { mayPassLater } from './problem.ts';

/** Fresh enough to show without asking again; hints and a return to the tab ask sooner. */
const staleTimeMs = 10_000;
const mostRetries = 2;

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: staleTimeMs,
        // A lost network is a failure that the screen tells, never a wait without an end.
        networkMode: 'always',
        refetchOnReconnect: true,
        refetchOnWindowFocus: 'always',
        retry: (failures, error) => failures < mostRetries && mayPassLater(error),
        retryDelay: (attempt) => Math.min(1_000 * 2 ** attempt, 8_000),
      },
      mutations: { networkMode: 'always', retry: false },
    },
  });
}
