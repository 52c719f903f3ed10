import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import type { RequestOf } from '#shared/http/contract.ts';
import type {
  changeNotificationSettings,
  getNotificationSettings,
  listPushSubscriptions,
  removePushSubscription,
  testChannel,
  testPushSubscription,
} from '#shared/notifications/contract.ts';
import { browserSubscription, turnPushOff, turnPushOn } from '#src/app/push.ts';
import { call } from '#src/lib/api.ts';
import { queryPrefixes } from '#src/lib/query-prefixes.ts';

export const useNotificationSettings = () =>
  useQuery({
    queryKey: queryPrefixes.notificationSettings,
    queryFn: ({ signal }) =>
      call<typeof getNotificationSettings>('get', '/api/notification-settings', {}, { signal }),
    // A form stands on them: what somebody is changing is not changed under their hands.
    refetchOnWindowFocus: false,
  });

export function useChangeSettings() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: RequestOf<typeof changeNotificationSettings>['body']) =>
      call<typeof changeNotificationSettings>('put', '/api/notification-settings', { body }),
    onSuccess: (settings) => queryClient.setQueryData(queryPrefixes.notificationSettings, settings),
  });
}

/** One's devices that may be woken, and whether this very browser still holds its subscription. */
export const useDevices = () =>
  useQuery({
    queryKey: queryPrefixes.pushSubscriptions,
    queryFn: async ({ signal }) => {
      const [{ subscriptions }, here] = await Promise.all([
        call<typeof listPushSubscriptions>('get', '/api/push-subscriptions', {}, { signal }),
        browserSubscription(),
      ]);
      return { subscriptions, current: here && (subscriptions.find(({ current }) => current) ?? null) };
    },
  });

function useAfterDevices() {
  const queryClient = useQueryClient();
  return () => queryClient.invalidateQueries({ queryKey: queryPrefixes.pushSubscriptions });
}

/** The answer says whether the person allowed it. */
export function useTurnOn() {
  const onSettled = useAfterDevices();
  return useMutation({ mutationFn: turnPushOn, onSettled });
}

export function useTurnOff() {
  const onSettled = useAfterDevices();
  return useMutation({ mutationFn: turnPushOff, onSettled });
}

export function useRemoveDevice() {
  const onSettled = useAfterDevices();
  return useMutation({
    mutationFn: (subscriptionId: string) =>
      call<typeof removePushSubscription>('delete', '/api/push-subscriptions/:subscriptionId', {
        params: { subscriptionId },
      }),
    onSettled,
  });
}

export const useTestDevice = () =>
  useMutation({
    mutationFn: (subscriptionId: string) =>
      call<typeof testPushSubscription>('post', '/api/push-subscriptions/:subscriptionId/test', {
        params: { subscriptionId },
      }),
  });

export type TestedChannel = RequestOf<typeof testChannel>['body']['channel'];

export const useTestChannel = () =>
  useMutation({
    mutationFn: (channel: TestedChannel) =>
      call<typeof testChannel>('post', '/api/notification-tests', { body: { channel } }),
  });
