import { z } from 'zod';
import { roles } from '../access/permissions.ts';
import { emailField, nameField, phoneField, reasonField, timeZoneField } from '../accounts/fields.ts';
import { contract } from '../http/contract.ts';
import { invitationStates } from './invitations.ts';
import { staffRoles, twoPersonActKinds, twoPersonActStates } from './two-person-acts.ts';

const personParams = z.object({ personId: z.uuid() });

/** The newest invitation of somebody. */
export const invitationCard = z.object({
  id: z.uuid(),
  state: z.enum(invitationStates),
  createdAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
  byEmail: z.boolean(),
  askedAgainAt: z.iso.datetime().nullable(),
});
export type InvitationCard = z.output<typeof invitationCard>;

export const twoPersonAct = z.object({
  id: z.uuid(),
  kind: z.enum(twoPersonActKinds),
  person: z.object({ id: z.uuid(), name: z.string() }),
  role: z.enum(roles).nullable(),
  reason: z.string(),
  state: z.enum(twoPersonActStates),
  requestedBy: z.object({ id: z.uuid(), name: z.string() }),
  requestedAt: z.iso.datetime(),
  decidedBy: z.string().nullable(),
  decidedAt: z.iso.datetime().nullable(),
});
export type TwoPersonAct = z.output<typeof twoPersonAct>;

export const staffPerson = z.object({
  id: z.uuid(),
  name: z.string(),
  credential: z.string().nullable(),
  email: z.string(),
  phone: z.string().nullable(),
  timeZone: z.string().nullable(),
  roles: z.array(z.enum(roles)),
  active: z.boolean(),
  firstSignedInAt: z.iso.datetime().nullable(),
  lastActivityAt: z.iso.datetime().nullable(),
  hasSecondFactor: z.boolean(),
  emailBounced: z.boolean(),
  invitation: invitationCard.nullable(),
  /** What waits for a second person. */
  waiting: z.array(twoPersonAct),
});
export type StaffPerson = z.output<typeof staffPerson>;

export const listStaff = contract({
  method: 'get',
  path: '/api/people',
  summary: 'Everybody who works for the clinic, with roles and state. No answers of patients.',
  status: 200,
  output: z.object({ people: z.array(staffPerson) }),
});

const personDetails = {
  name: nameField,
  credential: z.string().trim().max(20, 'Twenty characters at most.').nullable(),
  phone: phoneField.nullable(),
  timeZone: timeZoneField.nullable(),
};

export const inviteStaffBody = z.strictObject({
  /** Made by the client: sending it twice invites once. */
  id: z.uuid(),
  ...personDetails,
  email: emailField,
  roles: z.array(z.enum(staffRoles)).min(1, 'Choose at least one role.'),
  /** Asked for a guarded role, which a second person confirms. */
  reason: reasonField.optional(),
});

export const inviteStaff = contract({
  method: 'post',
  path: '/api/people',
  summary:
    'Invite somebody to work for the clinic. A guarded role waits for a second person. Needs a fresh proof.',
  status: 201,
  body: inviteStaffBody,
  output: staffPerson,
});

export const changeStaff = contract({
  method: 'put',
  path: '/api/people/:personId',
  summary: 'Change name, title, telephone number or time zone. Needs a fresh proof.',
  status: 200,
  params: personParams,
  body: z.strictObject(personDetails),
  output: staffPerson,
});

export const reinviteStaff = contract({
  method: 'post',
  path: '/api/people/:personId/invitations',
  summary: 'A new invitation for somebody who has not come yet; the old one opens nothing any more.',
  status: 201,
  params: personParams,
  body: z.strictObject({ byEmail: z.boolean() }),
  output: staffPerson,
});

export const deactivateStaff = contract({
  method: 'post',
  path: '/api/people/:personId/deactivation',
  summary: 'End somebody’s access at once: sessions, sockets, push. Needs a fresh proof.',
  status: 200,
  params: personParams,
  body: z.strictObject({ reason: reasonField }),
  output: staffPerson,
});

export const reactivateStaff = contract({
  method: 'post',
  path: '/api/people/:personId/reactivation',
  summary: 'Let somebody in again. Needs a fresh proof.',
  status: 200,
  params: personParams,
  body: z.strictObject({ reason: reasonField }),
  output: staffPerson,
});

export const grantRole = contract({
  method: 'post',
  path: '/api/people/:personId/roles',
  summary: 'Give a role; a guarded one waits for a second person. Needs a fresh proof.',
  status: 200,
  params: personParams,
  body: z.strictObject({ role: z.enum(staffRoles), reason: reasonField }),
  output: staffPerson,
});

export const removeRole = contract({
  method: 'delete',
  path: '/api/people/:personId/roles/:role',
  summary: 'Take a role away at once. The last administrator stays one. Needs a fresh proof.',
  status: 200,
  params: personParams.extend({ role: z.enum(staffRoles) }),
  output: staffPerson,
});

export const askSecondFactorRemoval = contract({
  method: 'post',
  path: '/api/people/:personId/second-factor-removal',
  summary:
    'Somebody lost their second factor: once a second person confirms, they set up a new one. Needs a fresh proof.',
  status: 201,
  params: personParams,
  body: z.strictObject({ reason: reasonField }),
  output: staffPerson,
});

export const listTwoPersonActs = contract({
  method: 'get',
  path: '/api/two-person-acts',
  summary: 'What waits for a second person, and what was decided in the last 90 days.',
  status: 200,
  output: z.object({ acts: z.array(twoPersonAct) }),
});

export const decideTwoPersonAct = contract({
  method: 'post',
  path: '/api/two-person-acts/:actId/decision',
  summary: 'Confirm or refuse as the second person, or withdraw as the first. Needs a fresh proof.',
  status: 200,
  params: z.object({ actId: z.uuid() }),
  body: z.strictObject({ decision: z.enum(['confirm', 'refuse', 'withdraw']) }),
  output: twoPersonAct,
});

/** What the printable letter shows. */
export const invitationLetter = z.object({
  name: z.string(),
  clinic: z.object({ name: z.string(), phone: z.string(), emergencyNumber: z.string() }),
  /** The address to type, without a secret. */
  startAddress: z.string(),
  /** In groups, as it is printed. */
  code: z.string(),
  /** The link as a QR code, an SVG as a data address; and the link itself, to open on this screen. */
  picture: z.string(),
  link: z.string(),
  expiresAt: z.iso.datetime(),
});
export type InvitationLetter = z.output<typeof invitationLetter>;

export const getInvitationLetter = contract({
  method: 'get',
  path: '/api/invitations/:invitationId/letter',
  summary: 'The letter of an open invitation, to print or to use on the patient’s own phone at the clinic.',
  status: 200,
  params: z.object({ invitationId: z.uuid() }),
  output: invitationLetter,
});
