import { useQueryClient } from '@tanstack/react-query';
import { isStaff } from '#shared/access/permissions.ts';
import type { Me } from '#shared/accounts/contract.ts';
import { homeOf } from '#src/app/home.ts';
import { beginSession } from '#src/app/session.tsx';
import { tellOtherTabs } from '#src/app/tabs.ts';

/** Puts whoever has just signed in in place of whoever was here, in this tab and in the others. */
export function useBegin(): (me: Me) => void {
  const queryClient = useQueryClient();
  return (me) => {
    beginSession(queryClient, me);
    tellOtherTabs({ kind: 'signed-in', personId: me.personId });
  };
}

/** Where somebody arrives who has just signed in: staff without a second factor may only set one up. */
export const firstPlaceOf = ({ roles, secondFactor }: Me): string =>
  isStaff(roles) && secondFactor === 'missing' ? '/second-factor' : homeOf(roles);
