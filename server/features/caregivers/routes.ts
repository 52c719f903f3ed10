import {
  changeCaregiver,
  clinicEndCaregiver,
  clinicInviteCaregiver,
  endCaregiver,
  inviteCaregiver,
  listCaregivers,
} from '#shared/caregivers/contract.ts';
import { route } from '../../http/route.ts';
import { inviteByClinic, inviteByPatient } from './inviting.ts';
import { changeLimits, endByClinic, endByPatient, listFor } from './service.ts';

export const caregiverRoutes = [
  route(listCaregivers, {
    access: { permission: 'caregiver:manage' },
    audit: 'caregivers.listed',
    handler: ({ tx, actor, now }) => listFor(tx, actor, now),
  }),
  route(inviteCaregiver, {
    access: { permission: 'caregiver:manage', proof: true },
    audit: 'caregiver.invited',
    handler: ({ body, tx, site, actor, now }) => inviteByPatient(tx, site, actor, body, now),
  }),
  route(changeCaregiver, {
    access: { permission: 'caregiver:manage', proof: true },
    audit: 'caregiver.changed',
    handler: ({ params, body, tx, actor, now }) => changeLimits(tx, actor, { ...params, ...body }, now),
  }),
  // Without a fresh proof: nothing stands between a patient and ending somebody's access.
  route(endCaregiver, {
    access: { permission: 'caregiver:manage' },
    audit: 'caregiver.ended',
    handler: ({ params, tx, site, actor, now }) => endByPatient(tx, site, actor, params.caregiverId, now),
  }),
  route(clinicInviteCaregiver, {
    access: { permission: 'patient:write' },
    audit: 'caregiver.invited',
    handler: ({ params, body, tx, site, actor, now }) =>
      inviteByClinic(tx, site, actor, { ...params, ...body }, now),
  }),
  route(clinicEndCaregiver, {
    access: { permission: 'patient:write' },
    audit: 'caregiver.ended',
    handler: ({ params, tx, site, actor, now }) => endByClinic(tx, site, actor, params, now),
  }),
];
