import {
  askSecondFactorRemoval,
  changeStaff,
  deactivateStaff,
  decideTwoPersonAct,
  getInvitationLetter,
  grantRole,
  inviteStaff,
  listStaff,
  listTwoPersonActs,
  reactivateStaff,
  reinviteStaff,
  removeRole,
} from '#shared/people/contract.ts';
import { route } from '../../http/route.ts';
import { openLetter } from './letter.ts';
import * as roles from './roles.ts';
import * as staff from './staff.ts';
import { deactivate, reactivate } from './standing.ts';
import * as acts from './two-person-acts.ts';

const managing = { permission: 'person:manage' } as const;
const managingProven = { permission: 'person:manage', proof: true } as const;

export const peopleRoutes = [
  route(listStaff, {
    access: managing,
    audit: 'people.listed',
    handler: async ({ tx, site, actor, now }) => ({ people: await staff.listStaffFor(tx, site, actor, now) }),
  }),
  route(inviteStaff, {
    access: managingProven,
    audit: 'person.invited',
    handler: ({ body, tx, site, actor, now }) => staff.inviteStaff(tx, site, actor, body, now),
  }),
  route(changeStaff, {
    access: managingProven,
    audit: 'person.changed',
    handler: ({ params, body, tx, site, actor, now }) =>
      staff.changeStaff(tx, site, actor, { ...params, ...body }, now),
  }),
  route(reinviteStaff, {
    access: managing,
    audit: 'invitation.sent',
    handler: ({ params, body, tx, site, actor, now }) =>
      staff.reinviteStaff(tx, site, actor, { ...params, ...body }, now),
  }),
  route(deactivateStaff, {
    access: managingProven,
    audit: 'person.deactivated',
    handler: ({ params, body, tx, site, actor, now }) =>
      deactivate(tx, site, actor, { ...params, ...body }, now),
  }),
  route(reactivateStaff, {
    access: managingProven,
    audit: 'person.reactivated',
    handler: ({ params, body, tx, site, actor, now }) =>
      reactivate(tx, site, actor, { ...params, ...body }, now),
  }),
  route(grantRole, {
    access: managingProven,
    audit: 'person.role-added',
    handler: ({ params, body, tx, site, actor, now }) =>
      roles.grantRole(tx, site, actor, { ...params, ...body }, now),
  }),
  route(removeRole, {
    access: managingProven,
    audit: 'person.role-removed',
    handler: ({ params, tx, site, actor, now }) => roles.removeRole(tx, site, actor, params, now),
  }),
  route(askSecondFactorRemoval, {
    access: managingProven,
    audit: 'second-factor.removal-asked',
    handler: ({ params, body, tx, site, actor, now }) =>
      acts.askSecondFactorRemoval(tx, site, actor, { ...params, ...body }, now),
  }),
  route(listTwoPersonActs, {
    access: { permission: 'two-person:decide' },
    audit: 'two-person-acts.listed',
    handler: async ({ tx, actor, now }) => ({ acts: await acts.listActsFor(tx, actor, now) }),
  }),
  route(decideTwoPersonAct, {
    access: { permission: 'two-person:decide', proof: true },
    audit: 'two-person-act.decided',
    handler: ({ params, body, tx, site, actor, now }) =>
      acts.decideAct(tx, site, actor, { ...params, ...body }, now),
  }),
  route(getInvitationLetter, {
    access: { permission: 'patient:invite' },
    audit: 'invitation.letter-opened',
    handler: ({ params, tx, site, actor, now }) => openLetter(tx, site, actor, params.invitationId, now),
  }),
];
