import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { signOut } from '#shared/accounts/contract.ts';
import { call } from '#src/lib/api.ts';
import { forgetDevice } from './forget-device.ts';
import { dropBrowserPush } from './push.ts';
import { tellOtherTabs } from './tabs.ts';

/**
 * Ends the session on the server, then forgets everything here: the page is loaded anew, so that nothing of
 * the person stays in this tab's memory. Where the server cannot be reached the person stays signed in and is
 * told so, since the cookie could not be ended.
 */
export function useSignOut() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: async () => {
      // Off line a browser may refuse this. The sign-out goes on: the server forgets this device with the
      // session, and with the service worker goes what the browser holds of it.
      await dropBrowserPush().catch(() => undefined);
      await call<typeof signOut>('delete', '/api/session', {}, { record: null });
    },
    onSuccess: async () => {
      queryClient.clear();
      await forgetDevice();
      tellOtherTabs({ kind: 'signed-out' });
      window.location.replace('/sign-in');
    },
  });
}
