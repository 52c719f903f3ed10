import { and, eq } from 'drizzle-orm';
import { isClinician, isStaff, type Role } from '#shared/access/permissions.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { isGuardedRole, mayLead } from '#shared/people/two-person-acts.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { personRoles } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { announcePersonChange } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { releaseClaimsOf } from '../triage/leaving.ts';
import { endSessions } from './access.ts';
import { askForAct } from './asking.ts';
import { staffMemberOf } from './queries.ts';
import { describeOne } from './staff-view.ts';
import { refuseOwnEnd, takeTurn } from './standing.ts';

const conflict = (why: string): Problem => new Problem('state-conflict', why);

/** Whether somebody may hold a role now; the same question when it is asked for and when it is confirmed. */
export const refuseUnfitGrant = (person: { active: boolean; roles: readonly Role[] }, role: Role): void => {
  if (!person.active) throw conflict('This person’s access has ended. Let them in again first.');
  if (person.roles.includes(role)) throw conflict('They hold this role already.');
  if (role === 'clinical-lead' && !mayLead(person.roles)) {
    throw conflict('A clinical lead is a therapist or clinician on call as well. Give that role first.');
  }
};

/** Gives a role. A session from before somebody worked here is longer than staff may have, and ends. */
export const giveRole = async (
  tx: Tx,
  site: Site,
  person: { clinicId: string; id: string; roles: readonly Role[] },
  role: Role,
  now: Date,
): Promise<void> => {
  const { clinicId, id: personId } = person;
  await tx.insert(personRoles).values({ clinicId, personId, role });
  if (!isStaff(person.roles)) await endSessions(tx, site, { clinicId, personId }, now);
  await announcePersonChange(tx, personId);
};

export const grantRole = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, role, reason }: { personId: string; role: Role; reason: string },
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  const person = await staffMemberOf(tx, clinicId, personId);
  refuseUnfitGrant(person, role);
  const waits = isGuardedRole(role);
  if (waits) {
    await askForAct(tx, actor, { kind: 'grant-role', personId, role, reason }, now);
  } else {
    if (personId === actor.personId) {
      throw conflict('You cannot give yourself a role. Ask another administrator.');
    }
    await giveRole(tx, site, person, role, now);
  }
  const detail = { role, waits, reason };
  await writeAudit(tx, actor, { action: 'person.role-added', subjectId: personId, detail }, now);
  return describeOne(tx, site, clinicId, personId, now);
};

/** Less power needs one person only, and holds at once, also on screens that are open. */
export const removeRole = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, role }: { personId: string; role: Role },
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  const person = await staffMemberOf(tx, clinicId, personId);
  const left = person.roles.filter((held) => held !== role);
  if (left.length === person.roles.length) throw conflict('They do not hold this role.');
  if (role === 'administrator') await refuseOwnEnd(tx, actor, personId, 'administrator role');
  if (left.length === 0) throw conflict('This is their only role. End their access instead.');
  if (left.includes('clinical-lead') && !mayLead(left)) {
    throw conflict(
      'A clinical lead is a therapist or clinician on call as well. Take the lead’s role first.',
    );
  }
  await tx
    .delete(personRoles)
    .where(
      and(eq(personRoles.clinicId, clinicId), eq(personRoles.personId, personId), eq(personRoles.role, role)),
    );
  if (!isClinician(left)) await releaseClaimsOf(tx, { clinicId, personId }, actor.personId, now);
  await writeAudit(tx, actor, { action: 'person.role-removed', subjectId: personId, detail: { role } }, now);
  await announcePersonChange(tx, personId);
  return describeOne(tx, site, clinicId, personId, now);
};
