import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type {
  closeThread,
  getThread,
  listMessages,
  listThreads,
  markSeen,
  Message,
  postMessage,
  postThread,
} from '#shared/threads/contract.ts';
import type { RequestOf } from '#shared/http/contract.ts';
import { call } from '#src/lib/api.ts';
import { mayPassLater } from '#src/lib/problem.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';
import { catchUpMessages, mergeBySequence, withoutGap } from './message-order.ts';

const threadKeys = {
  list: [...queryPrefixes.threads, 'list'],
  detail: (threadId: string) => [...queryPrefixes.threads, 'detail', threadId],
  messages: (threadId: string) => [...queryPrefixes.threads, 'messages', threadId],
} as const;

/** The clinic's shell counts the threads only for those who may read them. */
export const useThreads = ({ enabled }: { enabled: boolean } = { enabled: true }) =>
  useQuery({
    queryKey: threadKeys.list,
    queryFn: async ({ signal }) =>
      (await call<typeof listThreads>('get', '/api/threads', {}, { signal })).threads,
    enabled,
  });

export const useThread = (threadId: string) =>
  useQuery({
    queryKey: threadKeys.detail(threadId),
    queryFn: ({ signal }) =>
      call<typeof getThread>('get', '/api/threads/:threadId', { params: { threadId } }, { signal }),
  });

/**
 * Every message of a thread in order. The first fetch reads it whole; each later one (hint, focus, reconnect)
 * asks only for what comes after the last message that is known without a gap.
 */
export function useMessages(threadId: string) {
  const queryClient = useQueryClient();
  const queryKey = threadKeys.messages(threadId);
  const knownNow = () => queryClient.getQueryData<Message[]>(queryKey) ?? [];
  return useQuery({
    queryKey,
    queryFn: async ({ signal }) => {
      const caughtUp = await catchUpMessages(knownNow(), (after) =>
        call<typeof listMessages>(
          'get',
          '/api/threads/:threadId/messages',
          { params: { threadId }, query: { after } },
          { signal },
        ),
      );
      // A message of one's own may have been added while the answer was on its way.
      return mergeBySequence(knownNow(), caughtUp);
    },
    select: withoutGap,
  });
}

type MessageBody = RequestOf<typeof postMessage>['body'];

export function usePostMessage(threadId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: MessageBody) =>
      call<typeof postMessage>('post', '/api/threads/:threadId/messages', { params: { threadId }, body }),
    onSuccess: (message) => {
      queryClient.setQueryData<Message[]>(threadKeys.messages(threadId), (known) =>
        mergeBySequence(known ?? [], [message]),
      );
    },
    // Also after a failure: the message may have arrived though its answer was lost.
    onSettled: () => queryClient.invalidateQueries({ queryKey: queryPrefixes.threads }),
  });
}

export function usePostThread() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: RequestOf<typeof postThread>['body']) =>
      call<typeof postThread>('post', '/api/threads', { body }),
    onSuccess: (thread) => {
      queryClient.setQueryData(threadKeys.detail(thread.id), thread);
      return queryClient.invalidateQueries({ queryKey: threadKeys.list });
    },
  });
}

export function useMarkSeen(threadId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (sequence: number) =>
      call<typeof markSeen>('post', '/api/threads/:threadId/seen', {
        params: { threadId },
        body: { sequence },
      }),
    // Nobody presses it again, so it is repeated by itself.
    retry: (failures, error) => failures < 3 && mayPassLater(error),
    onSuccess: async () => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: threadKeys.list }),
        queryClient.invalidateQueries({ queryKey: queryPrefixes.today }),
      ]);
    },
  });
}

export function useCloseThread(threadId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () =>
      call<typeof closeThread>('post', '/api/threads/:threadId/close', { params: { threadId } }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: queryPrefixes.threads }),
  });
}
