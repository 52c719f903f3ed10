import { isClinician, type Role } from '../access/permissions.ts';

/** What one person may not do alone. */
export const twoPersonActKinds = ['grant-role', 'remove-second-factor'] as const;
export type TwoPersonActKind = (typeof twoPersonActKinds)[number];

export const twoPersonActStates = ['waiting', 'confirmed', 'refused', 'withdrawn'] as const;
export type TwoPersonActState = (typeof twoPersonActStates)[number];

/** Roles that give power over others: giving one takes a second person. */
const guardedRoles = ['administrator', 'clinical-lead'] as const satisfies readonly Role[];

export const isGuardedRole = (role: Role): boolean => (guardedRoles as readonly Role[]).includes(role);

/** Roles that an administrator gives; the others come with a record or an invitation of their own. */
export const staffRoles = [
  'therapist',
  'on-call-clinician',
  'clinical-lead',
  'administrator',
  'billing',
] as const satisfies readonly Role[];

/** A clinical lead is a therapist or clinician with publishing rights, so it takes one of those roles as well. */
export const mayLead = (held: readonly Role[]): boolean =>
  isClinician(held.filter((role) => role !== 'clinical-lead'));
