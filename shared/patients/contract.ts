import { z } from 'zod';
import { reasonField } from '../accounts/fields.ts';
import { contract } from '../http/contract.ts';
import { invitationCard } from '../people/contract.ts';
import { careTeamField, consentFields, consentWays, identityFields, operationCardFields } from './record.ts';
import { patientMoves, patientStates } from './states.ts';

const patientParams = z.object({ patientId: z.uuid() });

/** Names and states: what an administrator may see of a patient too. */
export const patientLine = z.object({
  id: z.uuid(),
  name: z.string(),
  chartNumber: z.string(),
  state: z.enum(patientStates),
  stateSince: z.iso.datetime().nullable(),
  backOn: z.iso.date().nullable(),
  day: z.number().int(),
  leadName: z.string().nullable(),
  /** The asker is on the care team. */
  mine: z.boolean(),
  invitation: invitationCard.nullable(),
  /** Null until the person has signed in for the first time. */
  firstSignedInAt: z.iso.datetime().nullable(),
  /** Null until the first check-in arrived. */
  firstCheckInAt: z.iso.datetime().nullable(),
  emailBounced: z.boolean(),
});
export type PatientLine = z.output<typeof patientLine>;

export const patientFilters = ['all', 'mine', 'never-started', 'paused', 'discharged'] as const;

export const listPatients = contract({
  method: 'get',
  path: '/api/patients',
  summary:
    'The clinic’s patients by name and state. Never started: watched, day 1 or later, and no check-in yet.',
  status: 200,
  // A name that is searched for stays on the screen: addresses are kept in histories and in logs.
  query: z.object({ filter: z.enum(patientFilters).default('all') }),
  output: z.object({ patients: z.array(patientLine), neverStarted: z.number().int() }),
});

export const enrolPatientBody = z.strictObject({
  /** Made by the client: sending it twice enrols once. */
  id: z.uuid(),
  identity: z.strictObject(identityFields),
  operation: z.strictObject(operationCardFields),
  careTeam: careTeamField,
  consent: consentFields,
  invite: z.enum(['email', 'letter', 'not-yet'], 'Choose how the patient is invited.'),
});
export type EnrolPatient = z.output<typeof enrolPatientBody>;

const stateChange = z.object({
  from: z.enum(patientStates),
  to: z.enum(patientStates),
  reason: z.string(),
  backOn: z.iso.date().nullable(),
  by: z.string(),
  at: z.iso.datetime(),
});

/**
 * Somebody whom the patient let in, as the patient sees it: with the name that was typed, and nothing that tells
 * whether the clinic knew the address before.
 */
export const caregiverCard = z.object({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  relationship: z.string(),
  mayCheckIn: z.boolean(),
  mayMessage: z.boolean(),
  until: z.iso.date().nullable(),
  /** Who let them in, and where it was the clinic, how the patient agreed. */
  grantedBy: z.string(),
  byClinic: z.boolean(),
  consent: z.string().nullable(),
  createdAt: z.iso.datetime(),
  endedAt: z.iso.datetime().nullable(),
  /** Null until they looked at this record for the first time. */
  firstOpenedAt: z.iso.datetime().nullable(),
});
export type CaregiverCard = z.output<typeof caregiverCard>;

/** The same for the clinic, which may know who has an account: with their own name. */
export const clinicCaregiverCard = caregiverCard.extend({
  /** Null where they had a way in already, or were to get another. */
  invitation: invitationCard.nullable(),
});
export type ClinicCaregiverCard = z.output<typeof clinicCaregiverCard>;

export const patientRecord = patientLine.extend({
  personId: z.uuid(),
  /** Names identity, operation and care team as they stand: a change says which ones it was made from. */
  revision: z.string(),
  identity: z.object({
    name: z.string(),
    email: z.string(),
    chartNumber: z.string(),
    birthDate: z.string(),
    phone: z.string(),
    address: z.string(),
    timeZone: z.string(),
    language: z.string(),
    dominantHand: z.enum(['left', 'right']),
    emergencyContact: z.string(),
    bloodThinner: z.string().nullable(),
    allergies: z.string().nullable(),
    mainMedicines: z.string().nullable(),
    equipmentAtHome: z.string().nullable(),
  }),
  operation: z.object({
    ...operationCardFields,
    surgeon: z.string(),
    surgeryDate: z.string(),
    tuberosity: z.string().nullable(),
    limits: z.string().nullable(),
    dressingUntilDay: z.number().int(),
  }),
  careTeam: z.array(
    z.object({
      personId: z.uuid(),
      name: z.string(),
      credential: z.string().nullable(),
      isLead: z.boolean(),
    }),
  ),
  consent: z
    .object({ on: z.string(), how: z.enum(consentWays), recordedBy: z.string().nullable() })
    .nullable(),
  changes: z.array(stateChange),
  moves: z.array(z.enum(patientMoves)),
  caregivers: z.array(clinicCaregiverCard),
  openFlags: z.number().int(),
});
export type PatientRecord = z.output<typeof patientRecord>;

export const enrolPatient = contract({
  method: 'post',
  path: '/api/patients',
  summary: 'Enrol a patient: record, operation card, care team, plan and, where asked for, the invitation.',
  status: 201,
  body: enrolPatientBody,
  output: patientRecord,
});

export const getPatient = contract({
  method: 'get',
  path: '/api/patients/:patientId',
  summary:
    'A patient’s record. From outside the care team it asks for a reason first (problem reason-needed).',
  status: 200,
  params: patientParams,
  output: patientRecord,
});

export const openChart = contract({
  method: 'post',
  path: '/api/patients/:patientId/openings',
  summary: 'Say why a chart outside one’s care teams is opened; the patient reads it. Good for 12 hours.',
  status: 204,
  params: patientParams,
  body: z.strictObject({ reason: reasonField }),
});

export const changePatient = contract({
  method: 'put',
  path: '/api/patients/:patientId',
  summary:
    'Change identity, safety facts, operation card and care team, from the revision that was looked at.',
  status: 200,
  params: patientParams,
  body: z.strictObject({
    revision: z.string(),
    identity: z.strictObject(identityFields),
    operation: z.strictObject(operationCardFields),
    careTeam: careTeamField,
  }),
  output: patientRecord,
});

export const movePatient = contract({
  method: 'post',
  path: '/api/patients/:patientId/moves',
  summary: 'Pause, resume, discharge, take back or end, with the reason.',
  status: 200,
  params: patientParams,
  body: z.strictObject({
    move: z.enum(patientMoves),
    reason: reasonField,
    /** For a pause: when the patient is expected back. */
    backOn: z.iso.date('Enter a date.').nullable().default(null),
  }),
  output: patientRecord,
});

export const reinvitePatient = contract({
  method: 'post',
  path: '/api/patients/:patientId/invitations',
  summary: 'A new invitation for the patient; the old one opens nothing any more.',
  status: 201,
  params: patientParams,
  body: z.strictObject({ byEmail: z.boolean() }),
  output: invitationCard,
});

export const listClinicians = contract({
  method: 'get',
  path: '/api/clinicians',
  summary: 'Who can be on a care team: the clinic’s active clinicians by name.',
  status: 200,
  output: z.object({
    clinicians: z.array(
      z.object({ personId: z.uuid(), name: z.string(), credential: z.string().nullable() }),
    ),
  }),
});
