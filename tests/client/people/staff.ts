import type { StaffPerson, TwoPersonAct } from '#shared/people/contract.ts';
import { noorSignedIn } from '../clinic/screen.tsx';

export const admin = {
  ...noorSignedIn,
  personId: '0a1b2c3d-4e5f-4a6b-8c7d-9e0f1a2b3c4d',
  name: 'Ada Brandt',
  roles: ['administrator' as const],
};

const person: StaffPerson = {
  id: admin.personId,
  name: admin.name,
  credential: null,
  email: 'ada.brandt@clinic.example',
  phone: null,
  timeZone: null,
  roles: ['administrator'],
  active: true,
  firstSignedInAt: '2026-11-01T09:00:00.000Z',
  lastActivityAt: '2026-12-01T09:00:00.000Z',
  hasSecondFactor: true,
  emailBounced: false,
  invitation: null,
  waiting: [],
};

export const ada = person;

export const noor: StaffPerson = {
  ...person,
  id: noorSignedIn.personId,
  name: noorSignedIn.name,
  credential: 'PT, DPT',
  email: 'noor.haddad@clinic.example',
  roles: ['therapist'],
};

export const act: TwoPersonAct = {
  id: '3c4d5e6f-7a8b-4c9d-8e0f-1a2b3c4d5e6f',
  kind: 'grant-role',
  person: { id: noor.id, name: noor.name },
  role: 'administrator',
  reason: 'Runs the office while Ada is away',
  state: 'waiting',
  requestedBy: { id: ada.id, name: ada.name },
  requestedAt: '2026-12-01T09:00:00.000Z',
  decidedBy: null,
  decidedAt: null,
};
