import { and, eq } from 'drizzle-orm';
import type { z } from 'zod';
import type { changeStaff as changeContract, inviteStaffBody, StaffPerson } from '#shared/people/contract.ts';
import { isGuardedRole, mayLead } from '#shared/people/two-person-acts.ts';
import { Problem, type FieldError } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { twoPersonActs } from '../../db/schema/invitations.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { announcePersonChange } from '../../realtime/announce.ts';
import { normaliseEmail } from '../accounts/service.ts';
import { auditOpening, writeAudit } from '../audit/service.ts';
import { clinicOf } from '../clinic/queries.ts';
import { askForAct } from './asking.ts';
import { hasWayIn } from './gate.ts';
import { invitePerson } from './inviting.ts';
import { addPerson, personIdFor, readPhone } from './new-person.ts';
import { rolesOf, staffMemberOf, staffRows } from './queries.ts';
import { describeOne, describeStaff } from './staff-view.ts';
import { takeTurn } from './standing.ts';

type Details = z.output<NonNullable<(typeof changeContract)['body']>>;
type Invited = z.output<typeof inviteStaffBody>;

export const listStaffFor = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  now: Date,
): Promise<StaffPerson[]> => {
  await auditOpening(tx, actor, { action: 'people.listed', subjectId: actor.clinicId }, now);
  return describeStaff(tx, site, actor.clinicId, now);
};

const withReadPhone = async <D extends Details>(tx: Tx, clinicId: string, details: D): Promise<D> => {
  if (details.phone === null) return details;
  const { country } = await clinicOf(tx, clinicId);
  return { ...details, phone: readPhone(details.phone, country) };
};

const refuseUnfitRoles = ({ roles, reason }: Invited): void => {
  const errors: FieldError[] = [];
  if (roles.includes('clinical-lead') && !mayLead(roles)) {
    errors.push({ field: 'roles', message: 'A clinical lead is a therapist or clinician on call as well.' });
  }
  if (roles.some(isGuardedRole) && reason === undefined) {
    errors.push({ field: 'reason', message: 'Say why; a second person reads it before they confirm.' });
  }
  if (errors.length > 0) throw new Problem('invalid-input', undefined, { errors });
};

/** Whether somebody is on record just as they were invited: the roles held and those asked for are what was sent. */
const isSameInvitation = async (tx: Tx, row: typeof people.$inferSelect, sent: Invited): Promise<boolean> => {
  const held = (await rolesOf(tx, row.clinicId, [row.id])).get(row.id) ?? [];
  const asked = await tx
    .select({ role: twoPersonActs.role })
    .from(twoPersonActs)
    .where(and(eq(twoPersonActs.clinicId, row.clinicId), eq(twoPersonActs.personId, row.id)));
  const roles = new Set([...held, ...asked.flatMap(({ role }) => (role === null ? [] : [role]))]);
  return (
    row.name === sent.name &&
    row.email === normaliseEmail(sent.email) &&
    row.credential === sent.credential &&
    row.phone === sent.phone &&
    row.timeZone === sent.timeZone &&
    roles.size === new Set(sent.roles).size &&
    sent.roles.every((role) => roles.has(role))
  );
};

/** A guarded role is asked for and gives nothing until a second person confirms; the others hold at once. */
export const inviteStaff = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  body: Invited,
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  const sent = await withReadPhone(tx, clinicId, body);
  const personId = personIdFor(clinicId, sent.id);
  const [known] = await staffRows(tx, clinicId, personId);
  if (known) {
    if (!(await isSameInvitation(tx, known, sent))) throw new Problem('id-conflict');
    return describeOne(tx, site, clinicId, personId, now);
  }
  refuseUnfitRoles(sent);
  const { name, credential, phone, timeZone, email } = sent;
  const roles = [...new Set(sent.roles)];
  const atOnce = roles.filter((role) => !isGuardedRole(role));
  await addPerson(tx, actor, { id: personId, name, email, credential, phone, timeZone, roles: atOnce }, now);
  for (const role of roles.filter(isGuardedRole)) {
    await askForAct(tx, actor, { kind: 'grant-role', personId, role, reason: sent.reason ?? '' }, now);
  }
  await invitePerson(tx, site, actor, { personId, kind: 'staff', byEmail: true }, now);
  await writeAudit(tx, actor, { action: 'person.invited', subjectId: personId }, now);
  return describeOne(tx, site, clinicId, personId, now);
};

export const changeStaff = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, ...details }: Details & { personId: string },
  now: Date,
): Promise<StaffPerson> => {
  const { clinicId } = actor;
  await staffMemberOf(tx, clinicId, personId);
  const { name, credential, phone, timeZone } = await withReadPhone(tx, clinicId, details);
  await tx
    .update(people)
    .set({ name, credential, phone, timeZone })
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  await writeAudit(tx, actor, { action: 'person.changed', subjectId: personId }, now);
  await announcePersonChange(tx, personId);
  return describeOne(tx, site, clinicId, personId, now);
};

/** For somebody who has not come yet. Whoever has a way in keeps it: else one person could take it over alone. */
export const reinviteStaff = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, byEmail }: { personId: string; byEmail: boolean },
  now: Date,
): Promise<StaffPerson> => {
  const { clinicId } = actor;
  const person = await staffMemberOf(tx, clinicId, personId);
  if (!person.active) throw new Problem('state-conflict', 'Let this person in again first.');
  if (await hasWayIn(site.gate, personId)) {
    throw new Problem(
      'state-conflict',
      'This person has signed in before. They can choose a new password by e-mail; for a lost second factor, ask for its removal.',
    );
  }
  await invitePerson(tx, site, actor, { personId, kind: 'staff', byEmail }, now);
  await writeAudit(tx, actor, { action: 'invitation.sent', subjectId: personId }, now);
  return describeOne(tx, site, clinicId, personId, now);
};
