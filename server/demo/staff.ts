import type { Role } from '#shared/access/permissions.ts';
import { idOf } from './random.ts';

export type StaffKey = 'noor' | 'callum' | 'petra' | 'dov' | 'joss' | 'mirela' | 'teo';

/** Somebody with an account who is not a patient. */
type StaffMember = {
  key: StaffKey;
  name: string;
  credential: string | null;
  email: string;
  /** What pages ring, in the reserved block. */
  phone: string | null;
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
    phone: '+15185550112',
    roles: ['therapist', 'clinical-lead'],
    role: 'therapist and clinical lead',
  },
  {
    key: 'callum',
    name: 'Callum Reyes',
    credential: 'PT',
    email: 'callum.reyes@orchard-lane.example',
    phone: '+15185550113',
    roles: ['therapist'],
    role: 'therapist',
  },
  {
    key: 'petra',
    name: 'Petra Lindqvist',
    credential: 'PA',
    email: 'petra.lindqvist@orchard-lane.example',
    phone: '+15185550114',
    roles: ['on-call-clinician'],
    role: 'on-call clinician',
  },
  {
    key: 'dov',
    name: 'Dov Amsel',
    credential: 'RN',
    email: 'dov.amsel@orchard-lane.example',
    phone: '+15185550115',
    roles: ['on-call-clinician'],
    role: 'on-call clinician',
  },
  {
    key: 'joss',
    name: 'Joss Amory',
    credential: null,
    email: 'joss.amory@orchard-lane.example',
    phone: '+15185550116',
    roles: ['administrator'],
    role: 'administrator',
  },
  {
    key: 'mirela',
    name: 'Mirela Stancu',
    credential: null,
    email: 'mirela.stancu@orchard-lane.example',
    phone: null,
    roles: ['billing'],
    role: 'billing',
  },
  {
    key: 'teo',
    name: 'Teo Valcourt',
    credential: null,
    email: 'teo@valcourt.example',
    phone: '+15185550117',
    roles: ['caregiver'],
    role: 'caregiver of Ines and a neighbor',
  },
];

export const staffId = (key: StaffKey): string => idOf('person', key);
