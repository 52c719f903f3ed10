import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { listDeliveries, sendAgain } from '#shared/notifications/contract.ts';
import { useProven } from '#src/app/proof.tsx';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

export const useDeliveries = () =>
  useQuery({
    queryKey: queryPrefixes.deliveries,
    queryFn: ({ signal }) => call<typeof listDeliveries>('get', '/api/deliveries', {}, { signal }),
  });

export function useSendAgain() {
  const queryClient = useQueryClient();
  const withProof = useProven();
  return useMutation({
    mutationFn: (deliveryId: string) =>
      withProof(() =>
        call<typeof sendAgain>('post', '/api/deliveries/:deliveryId/again', { params: { deliveryId } }),
      ),
    // The banner over every clinic screen counts what failed, so it asks again as well.
    onSettled: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: queryPrefixes.deliveries }),
        queryClient.invalidateQueries({ queryKey: queryPrefixes.worker }),
      ]),
  });
}
