import type { PatientLine, PatientRecord } from '#shared/patients/contract.ts';
import type { InvitationCard } from '#shared/people/contract.ts';

export const clinicians = [
  { personId: '7a4d6f0e-0f38-4a5f-a1a5-0d5b3f2c9e31', name: 'Noor Haddad', credential: 'PT, DPT' },
  { personId: '5b1f7c22-9d3e-4f6a-8b1c-2d3e4f5a6b7c', name: 'Petra Lindqvist', credential: null },
];

export const openInvitation: InvitationCard = {
  id: '9c0d1e2f-3a4b-4c5d-8e6f-7a8b9c0d1e2f',
  state: 'open',
  createdAt: '2026-12-02T15:00:00.000Z',
  expiresAt: '2126-12-16T15:00:00.000Z',
  byEmail: true,
  askedAgainAt: null,
};

export const line: PatientLine = {
  id: '1f2e3d4c-5b6a-4978-8c6d-7e8f9a0b1c2d',
  name: 'Tobias Ahlgren',
  chartNumber: 'OL-1042',
  state: 'active',
  stateSince: null,
  backOn: null,
  day: 12,
  leadName: 'Noor Haddad',
  mine: true,
  invitation: openInvitation,
  firstSignedInAt: null,
  firstCheckInAt: null,
  emailBounced: false,
};

export const record: PatientRecord = {
  ...line,
  personId: '2a3b4c5d-6e7f-4a8b-9c0d-1e2f3a4b5c6d',
  revision: 'as-it-was-opened',
  identity: {
    name: line.name,
    email: 'tobias.ahlgren@mail.example',
    chartNumber: line.chartNumber,
    birthDate: '1957-03-09',
    phone: '+12025550142',
    address: '12 Mill Lane, Port Ellery',
    timeZone: 'America/New_York',
    language: 'English',
    dominantHand: 'right',
    emergencyContact: 'Karin Ahlgren, 555-0143',
    bloodThinner: null,
    allergies: 'penicillin',
    mainMedicines: null,
    equipmentAtHome: null,
  },
  operation: {
    procedure: 'reverse-replacement',
    arm: 'right',
    surgeryDate: '2026-11-20',
    surgeon: 'Dr. Mbeki-Stone',
    approach: 'deltopectoral',
    subscapularis: 'repaired',
    biceps: 'tenodesis',
    tuberosity: null,
    limits: null,
    block: 'single',
    dressingUntilDay: 7,
  },
  careTeam: [{ ...clinicians[0]!, isLead: true }],
  consent: { on: '2026-11-12', how: 'signed', recordedBy: 'Noor Haddad' },
  changes: [],
  moves: ['pause', 'discharge', 'end'],
  caregivers: [],
  openFlags: 0,
};
