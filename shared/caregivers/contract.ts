import { z } from 'zod';
import { emailField, nameField } from '../accounts/fields.ts';
import { contract } from '../http/contract.ts';
import { caregiverCard, clinicCaregiverCard } from '../patients/contract.ts';
import { activityCodes } from './activity-codes.ts';

const limits = {
  relationship: z
    .string()
    .trim()
    .min(1, 'Say who this is, such as a daughter or a neighbor.')
    .max(60, 'That is too long.'),
  mayCheckIn: z.boolean(),
  mayMessage: z.boolean(),
  /** The last day; null for as long as nobody ends it. */
  until: z.iso.date('Enter a date.').nullable(),
};

const invitation = {
  /** Made by the client: sending it twice invites once. */
  id: z.uuid(),
  name: nameField,
  email: emailField,
  ...limits,
};

const caregiverParams = z.object({ caregiverId: z.uuid() });

export const listCaregivers = contract({
  method: 'get',
  path: '/api/caregivers',
  summary: 'Whom the patient has let in, also those who no longer are.',
  status: 200,
  output: z.object({ caregivers: z.array(caregiverCard) }),
});

export const inviteCaregiverBody = z.strictObject(invitation);

export const inviteCaregiver = contract({
  method: 'post',
  path: '/api/caregivers',
  summary: 'The patient invites somebody to help. Needs a fresh proof.',
  status: 201,
  body: inviteCaregiverBody,
  output: caregiverCard,
});

export const changeCaregiver = contract({
  method: 'put',
  path: '/api/caregivers/:caregiverId',
  summary: 'Change what a caregiver may do, and until when. Needs a fresh proof.',
  status: 200,
  params: caregiverParams,
  body: z.strictObject(limits),
  output: caregiverCard,
});

export const endCaregiver = contract({
  method: 'delete',
  path: '/api/caregivers/:caregiverId',
  summary: 'End somebody’s help at once, also on screens that are open.',
  status: 200,
  params: caregiverParams,
  output: caregiverCard,
});

export const clinicInviteCaregiverBody = z.strictObject({
  ...invitation,
  byEmail: z.boolean(),
  /** How and when the patient agreed. */
  consent: z.string().trim().min(3, 'Say how and when the patient agreed.').max(500, 'That is too long.'),
});

export const clinicInviteCaregiver = contract({
  method: 'post',
  path: '/api/patients/:patientId/caregivers',
  summary: 'The clinic invites a caregiver with the patient’s recorded consent.',
  status: 201,
  params: z.object({ patientId: z.uuid() }),
  body: clinicInviteCaregiverBody,
  output: clinicCaregiverCard,
});

export const clinicEndCaregiver = contract({
  method: 'delete',
  path: '/api/patients/:patientId/caregivers/:caregiverId',
  summary: 'The clinic ends a caregiver’s help at once.',
  status: 200,
  params: z.object({ patientId: z.uuid(), caregiverId: z.uuid() }),
  output: clinicCaregiverCard,
});

/** One line of the patient's "Who opened my record". */
const activityLine = z.object({
  id: z.uuid(),
  at: z.iso.datetime(),
  /** The name, and what they are to the patient. */
  who: z.string(),
  as: z.enum(['you', 'caregiver', 'care-team', 'clinic', 'system']),
  what: z.enum(activityCodes),
  /** Why, where it was outside the care team: in the person's own words, or `covering`. */
  reason: z.string().nullable(),
});
export type ActivityLine = z.output<typeof activityLine>;

export const listActivity = contract({
  method: 'get',
  path: '/api/activity',
  summary: 'Who opened or changed the patient’s record, newest first, fifty at a time.',
  status: 200,
  query: z.object({
    /** Lines before this instant; the last page’s last line. */
    before: z.iso.datetime().optional(),
    /** Leave out what the patient did. */
    others: z.enum(['true', 'false']).default('true'),
  }),
  output: z.object({ lines: z.array(activityLine), more: z.boolean() }),
});
