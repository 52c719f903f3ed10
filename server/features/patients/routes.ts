import {
  changePatient,
  enrolPatient,
  getPatient,
  listClinicians,
  listPatients,
  movePatient,
  openChart,
  reinvitePatient,
} from '#shared/patients/contract.ts';
import { importPatients, previewImport } from '#shared/patients/import-contract.ts';
import { route } from '../../http/route.ts';
import { change, reinvite } from './changing.ts';
import { giveReason } from './door.ts';
import { enrol } from './enrolment.ts';
import { importList, preview } from './importing.ts';
import { patientsFor } from './list.ts';
import { move } from './moving.ts';
import { cliniciansOf } from './queries.ts';
import { openRecord } from './record.ts';

export const patientRoutes = [
  route(listPatients, {
    access: { permission: 'patient:list' },
    audit: 'patients.listed',
    handler: ({ query, tx, site, actor, now }) => patientsFor(tx, site, actor, query, now),
  }),
  route(enrolPatient, {
    access: { permission: 'patient:write' },
    audit: 'patient.enrolled',
    handler: ({ body, tx, site, actor, now }) => enrol(tx, site, actor, body, now),
  }),
  route(getPatient, {
    access: { permission: 'patient:read' },
    audit: 'patient.opened',
    handler: ({ params, tx, site, actor, now }) => openRecord(tx, site, actor, params.patientId, now),
  }),
  route(openChart, {
    access: { permission: 'patient:read' },
    audit: 'chart.opened-outside-team',
    handler: ({ params, body, tx, actor, now }) => giveReason(tx, actor, { ...params, ...body }, now),
  }),
  route(changePatient, {
    access: { permission: 'patient:write' },
    audit: 'patient.changed',
    handler: ({ params, body, tx, site, actor, now }) => change(tx, site, actor, { ...params, ...body }, now),
  }),
  route(movePatient, {
    access: { permission: 'patient:write' },
    audit: 'patient.moved',
    handler: ({ params, body, tx, site, actor, now }) => move(tx, site, actor, { ...params, ...body }, now),
  }),
  route(reinvitePatient, {
    access: { permission: 'patient:invite' },
    audit: 'patient.invited',
    handler: ({ params, body, tx, site, actor, now }) =>
      reinvite(tx, site, actor, { ...params, ...body }, now),
  }),
  route(listClinicians, {
    access: { permission: 'patient:write' },
    audit: { none: 'Names and titles of colleagues.' },
    handler: async ({ tx, actor }) => ({ clinicians: await cliniciansOf(tx, actor.clinicId) }),
  }),
  route(previewImport, {
    access: { permission: 'patient:write' },
    audit: { none: 'Reads what was sent, and keeps none of it.' },
    handler: ({ body, tx, actor, now }) => preview(tx, actor, body.text, now),
  }),
  route(importPatients, {
    access: { permission: 'patient:write' },
    audit: 'patient.enrolled',
    handler: ({ body, tx, site, actor, now }) => importList(tx, site, actor, body, now),
  }),
];
