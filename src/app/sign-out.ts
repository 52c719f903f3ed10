import { useMutation } from '@tanstack/react-query';
import type { signOut } from '#shared/accounts/contract.ts';
import { call } from '#src/lib/api.ts';
import { clearDeviceStore } from '#src/lib/device-store.ts';
import { tellOtherTabs } from './tabs.ts';

/**
 * Ends the session on the server, then forgets everything here: the page is loaded anew, so that nothing of
 * the person stays in this tab's memory. Where the server cannot be reached the person stays signed in and is
 * told so, since the cookie could not be ended.
 */
export function useSignOut() {
  return useMutation({
    mutationFn: () => call<typeof signOut>('delete', '/api/session', {}),
    onSuccess: () => {
      clearDeviceStore();
      tellOtherTabs({ kind: 'signed-out' });
      window.location.replace('/sign-in');
    },
  });
}
