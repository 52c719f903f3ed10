import type { Role } from '#shared/access/permissions.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { isGuardedRole, mayLead } from '#shared/people/two-person-acts.ts';

/**
 * What cannot be is not offered, and why stands in its place. The server decides; where it knows better, its
 * refusal is shown in its own words.
 */
type Limits = { person: StaffPerson; people: StaffPerson[]; meId: string };

/** The one active administrator of the clinic, without whom nobody could let anybody in. */
const isLastAdministrator = ({ person, people }: Limits): boolean =>
  person.active &&
  person.roles.includes('administrator') &&
  !people.some(({ id, active, roles }) => id !== person.id && active && roles.includes('administrator'));

export function whyNotRemove(limits: Limits, role: Role): string | null {
  const { person, meId } = limits;
  if (role === 'administrator' && isLastAdministrator(limits)) {
    return 'The last administrator stays one. Give somebody else the role first.';
  }
  if (role === 'administrator' && person.id === meId) return 'Another administrator takes your role.';
  const left = person.roles.filter((held) => held !== role);
  if (left.length === 0) return 'Their only role. End their access instead.';
  if (left.includes('clinical-lead') && !mayLead(left)) {
    return 'A clinical lead is a therapist or clinician on call as well. Take the lead’s role first.';
  }
  return null;
}

export function whyNotGive({ person, meId }: Limits, role: Role): string | null {
  if (role === 'clinical-lead' && !mayLead(person.roles)) {
    return 'For a therapist or clinician on call only. Give one of those roles first.';
  }
  if (person.id === meId && !isGuardedRole(role)) return 'Another administrator gives you roles.';
  return null;
}

export function whyNotDeactivate(limits: Limits): string | null {
  if (limits.person.id === limits.meId) return 'You cannot end your own access. Ask another administrator.';
  return isLastAdministrator(limits)
    ? 'This is the clinic’s last administrator. Give somebody else the role first.'
    : null;
}
