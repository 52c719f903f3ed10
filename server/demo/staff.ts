import type { Role } from '#shared/access/permissions.ts';
import { idOf } from './random.ts';

export type StaffKey = 'noor' | 'callum' | 'petra' | 'dov' | 'joss' | 'mirela' | 'teo';

/** Somebody with an account who is not a patient. */
type StaffMember = {
  key: StaffKey;
  name: string;
  credential: string | null;
  email: string;
  roles: Role[];
  /** How the list of accounts calls them. */
  role: string;
};

export const staff: readonly StaffMember[] = [
  {
    key: 'noor',
    name: 'Noor Haddad',
    credential: 'PT',
    email: 'noor.haddad@orchard-lane.example',
    roles: ['therapist', 'clinical-lead'],
    role: 'therapist and clinical lead',
  },
  {
    key: 'callum',
    name: 'Callum Reyes',
    credential: 'PT',
    email: 'callum.reyes@orchard-lane.example',
    roles: ['therapist'],
    role: 'therapist',
  },
  {
    key: 'petra',
    name: 'Petra Lindqvist',
    credential: 'PA',
    email: 'petra.lindqvist@orchard-lane.example',
    roles: ['on-call-clinician'],
    role: 'on-call clinician',
  },
  {
    key: 'dov',
    name: 'Dov Amsel',
    credential: 'RN',
    email: 'dov.amsel@orchard-lane.example',
    roles: ['on-call-clinician'],
    role: 'on-call clinician',
  },
  {
    key: 'joss',
    name: 'Joss Amory',
    credential: null,
    email: 'joss.amory@orchard-lane.example',
    roles: ['administrator'],
    role: 'administrator',
  },
  {
    key: 'mirela',
    name: 'Mirela Stancu',
    credential: null,
    email: 'mirela.stancu@orchard-lane.example',
    roles: ['billing'],
    role: 'billing',
  },
  {
    key: 'teo',
    name: 'Teo Valcourt',
    credential: null,
    email: 'teo@valcourt.example',
    roles: ['caregiver'],
    role: 'caregiver of Ines',
  },
];

export const staffId = (key: StaffKey): string => idOf('person', key);
