import type { Role } from '#shared/access/permissions.ts';
import type { StaffPerson, TwoPersonAct } from '#shared/people/contract.ts';
import { comingWords } from '#src/lib/invitation-words.ts';

export const roleWords: Record<Role, string> = {
  patient: 'Patient',
  caregiver: 'Caregiver',
  therapist: 'Therapist',
  'on-call-clinician': 'Clinician on call',
  'clinical-lead': 'Clinical lead',
  administrator: 'Administrator',
  billing: 'Billing',
};

export const roleDetails: Partial<Record<Role, string>> = {
  therapist: 'Patients, morning round, messages.',
  'on-call-clinician': 'The same, and answers for the whole clinic.',
  'clinical-lead': 'For a therapist or clinician on call: confirms what takes two, publishes.',
  administrator: 'People, roles, settings, deliveries. Names and states, no answers of patients.',
  billing: 'Days and minutes. No answers of patients.',
};

/** "Give the role Administrator", as it stands in a list of what waits. */
export function actWords({ kind, role }: Pick<TwoPersonAct, 'kind' | 'role'>): string {
  if (kind === 'remove-second-factor') return 'Remove the second factor';
  return role === null ? 'Give a role' : `Give the role ${roleWords[role]}`;
}

export const actStateWords: Record<TwoPersonAct['state'], string> = {
  waiting: 'Waiting',
  confirmed: 'Confirmed',
  refused: 'Refused',
  withdrawn: 'Withdrawn',
};

export const nameAndTitle = ({ name, credential }: Pick<StaffPerson, 'name' | 'credential'>): string =>
  credential === null || credential === '' ? name : `${name}, ${credential}`;

/** Active, on the way in, or no longer let in. */
export function staffStateWords(person: StaffPerson, nowMs: number, timeZone: string): string {
  if (!person.active) return 'Deactivated';
  return comingWords(person, nowMs, timeZone) ?? 'Active';
}
