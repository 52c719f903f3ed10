import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type {
  changeCaregiver,
  endCaregiver,
  inviteCaregiver,
  listCaregivers,
} from '#shared/caregivers/contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import type { CaregiverCard } from '#shared/patients/contract.ts';
import { useProven } from '#src/app/proof.tsx';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

/** Only on one's own record. */
export const useCaregivers = (isOwn: boolean) =>
  useQuery({
    enabled: isOwn,
    queryKey: queryPrefixes.caregivers,
    queryFn: async ({ signal }) =>
      (await call<typeof listCaregivers>('get', '/api/caregivers', {}, { signal })).caregivers,
  });

/** Puts the answer of a write into the list at once, and asks for the list again. */
function useListed() {
  const queryClient = useQueryClient();
  return (card: CaregiverCard) => {
    queryClient.setQueryData<CaregiverCard[]>(queryPrefixes.caregivers, (known) =>
      known?.map((old) => (old.id === card.id ? card : old)),
    );
    return queryClient.invalidateQueries({ queryKey: queryPrefixes.caregivers });
  };
}

export function useInviteCaregiver() {
  const withProof = useProven();
  const onSuccess = useListed();
  return useMutation({
    mutationFn: (body: RequestOf<typeof inviteCaregiver>['body']) =>
      withProof(() => call<typeof inviteCaregiver>('post', '/api/caregivers', { body })),
    onSuccess,
  });
}

type Change = { caregiverId: string; body: RequestOf<typeof changeCaregiver>['body'] };

export function useChangeCaregiver() {
  const withProof = useProven();
  const onSuccess = useListed();
  return useMutation({
    mutationFn: ({ caregiverId, body }: Change) =>
      withProof(() =>
        call<typeof changeCaregiver>('put', '/api/caregivers/:caregiverId', {
          params: { caregiverId },
          body,
        }),
      ),
    onSuccess,
  });
}

export function useEndCaregiver() {
  const onSuccess = useListed();
  return useMutation({
    mutationFn: (caregiverId: string) =>
      call<typeof endCaregiver>('delete', '/api/caregivers/:caregiverId', { params: { caregiverId } }),
    onSuccess,
  });
}
