import { MessageSquare, Settings2, Sunrise, Users } from 'lucide-react';
import { may } from '#shared/access/permissions.ts';
import type { Permission, Role } from '#shared/access/permissions.ts';
import type { NavigationItem } from '#src/components/navigation.ts';
import { clinicPlaces } from '#src/features/clinic/clinic-places.ts';
import { useWorkerHealth } from '#src/features/clinic/queries.ts';
import { useTwoPersonActs } from '#src/features/people/queries.ts';
import { useThreads } from '#src/features/threads/queries.ts';
import { useMorningRound } from '#src/features/triage/queries.ts';

/** What waits for this person's word: what they asked for themselves waits for somebody else's. */
function useToConfirm(roles: readonly Role[], meId: string): number {
  const acts = useTwoPersonActs(may(roles, 'two-person:decide')).data ?? [];
  return acts.filter(
    ({ state, requestedBy, person }) => state === 'waiting' && requestedBy.id !== meId && person.id !== meId,
  ).length;
}

/** The numbers beside Clinic in words, for those who hear them. */
function clinicBadge(toConfirm: number, unsent: number) {
  const parts = [
    toConfirm > 0 ? `${toConfirm} to confirm` : null,
    unsent > 0 ? `${unsent} not delivered` : null,
  ].filter((part) => part !== null);
  return { count: toConfirm + unsent, label: parts.join(', ') };
}

/** The places of the clinic that a person may use, with what waits there. */
export function useClinicRail(roles: readonly Role[], meId: string): NavigationItem[] {
  const allowed = (permission: Permission) => may(roles, permission);
  const toSee = useMorningRound({ enabled: allowed('flag:read') }).data?.flags.length ?? 0;
  const threads = useThreads({ enabled: allowed('thread:read') }).data ?? [];
  const waiting = threads.filter(({ state }) => state === 'waiting-on-us').length;
  const toConfirm = useToConfirm(roles, meId);
  const unsent = useWorkerHealth().data?.unsent ?? 0;
  const [firstOfClinic, ...othersOfClinic] = clinicPlaces.filter(({ permission }) => allowed(permission));

  const places: NavigationItem[] = [];
  if (allowed('flag:read')) {
    places.push({
      to: '/round',
      label: 'Morning round',
      icon: Sunrise,
      badge: { count: toSee, label: `${toSee} to see` },
    });
  }
  if (allowed('patient:list')) places.push({ to: '/caseload', label: 'Caseload', icon: Users });
  if (allowed('thread:read')) {
    places.push({
      to: '/clinic/messages',
      label: 'Messages',
      icon: MessageSquare,
      badge: { count: waiting, label: `${waiting} waiting on us` },
    });
  }
  if (firstOfClinic) {
    places.push({
      to: firstOfClinic.to,
      others: othersOfClinic.map(({ to }) => to),
      label: 'Clinic',
      icon: Settings2,
      badge: clinicBadge(toConfirm, allowed('delivery:manage') ? unsent : 0),
    });
  }
  return places;
}
