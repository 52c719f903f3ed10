import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { getAlert, PostCheckIn, postCheckIn } from '#shared/check-ins/contract.ts';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

/** How often the clinic's side of an alert is asked for where no hint comes through. */
const lookEveryMs = 5_000;

/** Who at the clinic has seen an alert. Only once the server has it. */
export const useAlertReceipt = (alertId: string, received: boolean) =>
  useQuery({
    queryKey: [...queryPrefixes.alerts, alertId],
    queryFn: ({ signal }) =>
      call<typeof getAlert>('get', '/api/alerts/:alertId', { params: { alertId } }, { signal }),
    enabled: received,
    refetchInterval: ({ state }) => (state.data?.seen ? false : lookEveryMs),
    refetchIntervalInBackground: true,
  });

/** Sends a check-in about the record that it was begun for (null: one's own), whichever one the tab is on by then. */
export function usePostCheckIn(recordId: string | null) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: PostCheckIn) =>
      call<typeof postCheckIn>('post', '/api/check-ins', { body }, { record: recordId }),
    onSuccess: async () => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: queryPrefixes.today }),
        queryClient.invalidateQueries({ queryKey: queryPrefixes.checkInContext }),
      ]);
    },
  });
}
