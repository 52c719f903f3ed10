import type { Permission } from '#shared/access/permissions.ts';

type ClinicPlace = { to: string; label: string; permission: Permission };

/** What stands below Clinic in the rail. */
export const clinicPlaces: readonly ClinicPlace[] = [
  { to: '/clinic/people', label: 'People', permission: 'person:manage' },
  { to: '/clinic/confirmations', label: 'Confirmations', permission: 'two-person:decide' },
  { to: '/clinic/deliveries', label: 'Deliveries', permission: 'delivery:manage' },
];
