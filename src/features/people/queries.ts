import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { RequestOf } from '#shared/http/contract.ts';
import type {
  askSecondFactorRemoval,
  changeStaff,
  deactivateStaff,
  decideTwoPersonAct,
  getInvitationLetter,
  grantRole,
  inviteStaff,
  listStaff,
  listTwoPersonActs,
  reactivateStaff,
  reinviteStaff,
  removeRole,
} from '#shared/people/contract.ts';
import { useProven } from '#src/app/proof.tsx';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

const actsFreshMs = 60_000;

type BodyOf<C> = RequestOf<C> extends { body: infer Body } ? Body : never;

export const useStaff = () =>
  useQuery({
    queryKey: queryPrefixes.people,
    queryFn: async ({ signal }) =>
      (await call<typeof listStaff>('get', '/api/people', {}, { signal })).people,
  });

/** Each reading is on record, so the count in the rail asks no more than once a minute. */
export const useTwoPersonActs = (enabled: boolean) =>
  useQuery({
    queryKey: queryPrefixes.twoPersonActs,
    queryFn: async ({ signal }) =>
      (await call<typeof listTwoPersonActs>('get', '/api/two-person-acts', {}, { signal })).acts,
    enabled,
    staleTime: actsFreshMs,
    refetchOnWindowFocus: true,
  });

/** A code that opens a record is not kept in memory longer than it is shown. */
export const useInvitationLetter = (invitationId: string) =>
  useQuery({
    queryKey: ['invitation-letter', invitationId],
    queryFn: ({ signal }) =>
      call<typeof getInvitationLetter>(
        'get',
        '/api/invitations/:invitationId/letter',
        { params: { invitationId } },
        { signal },
      ),
    staleTime: Infinity,
    gcTime: 0,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });

/** A write on somebody's access. Done or refused, people and what waits are fetched again. */
function useStaffWrite<Input, Output>(write: (input: Input) => Promise<Output>) {
  const queryClient = useQueryClient();
  const withProof = useProven();
  return useMutation({
    mutationFn: (input: Input) => withProof(() => write(input)),
    onSettled: () =>
      Promise.all([
        queryClient.invalidateQueries({ queryKey: queryPrefixes.people }),
        queryClient.invalidateQueries({ queryKey: queryPrefixes.twoPersonActs }),
      ]),
  });
}

export const useInviteStaff = () =>
  useStaffWrite((body: BodyOf<typeof inviteStaff>) =>
    call<typeof inviteStaff>('post', '/api/people', { body }),
  );

export const useChangeStaff = (personId: string) =>
  useStaffWrite((body: BodyOf<typeof changeStaff>) =>
    call<typeof changeStaff>('put', '/api/people/:personId', { params: { personId }, body }),
  );

export const useReinviteStaff = (personId: string) =>
  useStaffWrite((byEmail: boolean) =>
    call<typeof reinviteStaff>('post', '/api/people/:personId/invitations', {
      params: { personId },
      body: { byEmail },
    }),
  );

export const useDeactivateStaff = (personId: string) =>
  useStaffWrite((reason: string) =>
    call<typeof deactivateStaff>('post', '/api/people/:personId/deactivation', {
      params: { personId },
      body: { reason },
    }),
  );

export const useReactivateStaff = (personId: string) =>
  useStaffWrite((reason: string) =>
    call<typeof reactivateStaff>('post', '/api/people/:personId/reactivation', {
      params: { personId },
      body: { reason },
    }),
  );

export const useGrantRole = (personId: string) =>
  useStaffWrite((body: BodyOf<typeof grantRole>) =>
    call<typeof grantRole>('post', '/api/people/:personId/roles', { params: { personId }, body }),
  );

export const useRemoveRole = (personId: string) =>
  useStaffWrite((role: RequestOf<typeof removeRole>['params']['role']) =>
    call<typeof removeRole>('delete', '/api/people/:personId/roles/:role', { params: { personId, role } }),
  );

export const useAskSecondFactorRemoval = (personId: string) =>
  useStaffWrite((reason: string) =>
    call<typeof askSecondFactorRemoval>('post', '/api/people/:personId/second-factor-removal', {
      params: { personId },
      body: { reason },
    }),
  );

export const useDecideTwoPersonAct = () =>
  useStaffWrite(({ actId, decision }: { actId: string } & BodyOf<typeof decideTwoPersonAct>) =>
    call<typeof decideTwoPersonAct>('post', '/api/two-person-acts/:actId/decision', {
      params: { actId },
      body: { decision },
    }),
  );
