import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { RequestOf } from '#shared/http/contract.ts';
import type {
  claimFlag,
  closeFlag,
  getFlag,
  listFlags,
  releaseFlag,
  replyToFlag,
  seeFlag,
} from '#shared/triage/contract.ts';
import { call } from '#src/lib/api.ts';
import { mayPassLater } from '#src/lib/problem.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

const flagKeys = {
  round: [...queryPrefixes.flags, 'round'],
  case: (flagId: string) => [...queryPrefixes.flags, 'case', flagId],
} as const;

/** The shell counts the round only for those who may see it. */
export const useMorningRound = ({ enabled }: { enabled: boolean } = { enabled: true }) =>
  useQuery({
    queryKey: flagKeys.round,
    queryFn: ({ signal }) => call<typeof listFlags>('get', '/api/flags', {}, { signal }),
    enabled,
  });

export const useFlagCase = (flagId: string) =>
  useQuery({
    queryKey: flagKeys.case(flagId),
    queryFn: ({ signal }) =>
      call<typeof getFlag>('get', '/api/flags/:flagId', { params: { flagId } }, { signal }),
  });

/**
 * After each move, done or refused, the round and the case are fetched again; a button stays busy until they
 * are, so that nobody presses on what is no longer so.
 */
function useFlagMove<Input, Output>(move: (input: Input) => Promise<Output>) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: move,
    onSettled: () => queryClient.invalidateQueries({ queryKey: queryPrefixes.flags }),
  });
}

export const useClaimFlag = (flagId: string) =>
  useFlagMove(() => call<typeof claimFlag>('post', '/api/flags/:flagId/claim', { params: { flagId } }));

export const useReleaseFlag = (flagId: string) =>
  useFlagMove(() => call<typeof releaseFlag>('post', '/api/flags/:flagId/release', { params: { flagId } }));

export const useCloseFlag = (flagId: string) =>
  useFlagMove((body: RequestOf<typeof closeFlag>['body']) =>
    call<typeof closeFlag>('post', '/api/flags/:flagId/close', { params: { flagId }, body }),
  );

export const useReplyToFlag = (flagId: string) =>
  useFlagMove((body: RequestOf<typeof replyToFlag>['body']) =>
    call<typeof replyToFlag>('post', '/api/flags/:flagId/replies', { params: { flagId }, body }),
  );

/** The record that this clinician has the case on the screen. Nobody presses it again, so it repeats by itself. */
export const useSeeFlag = (flagId: string) =>
  useMutation({
    mutationFn: () => call<typeof seeFlag>('post', '/api/flags/:flagId/seen', { params: { flagId } }),
    retry: (failures, error) => failures < 3 && mayPassLater(error),
  });
