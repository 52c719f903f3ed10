import { and, eq } from 'drizzle-orm';
import { may, type Permission } from '#shared/access/permissions.ts';
import type { StaffPerson } from '#shared/people/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { loadPersonActor } from '../accounts/queries.ts';
import { writeAudit } from '../audit/service.ts';
import { releaseClaimsOf } from '../triage/leaving.ts';
import { endAccess, endSessions } from './access.ts';
import { revokeInvitations } from './inviting.ts';
import { activeHolders, staffMemberOf } from './queries.ts';
import { describeOne } from './staff-view.ts';
import { holdTurn } from './turns.ts';

/**
 * Every act on people waits for its turn, and is judged by what the one who acts may do once it has come:
 * somebody who was deactivated while waiting changes nothing any more.
 */
export const takeTurn = async (
  tx: Tx,
  actor: PersonActor,
  permission: Permission = 'person:manage',
): Promise<void> => {
  await holdTurn(tx, actor.clinicId, 'people-change');
  const standing = await loadPersonActor(tx, actor);
  if (!standing) throw new Problem('not-signed-in');
  if (!may(standing.roles, permission)) throw new Problem('forbidden');
};

/**
 * Nobody takes their own power away. With that the clinic always keeps an administrator who can act: whoever takes
 * it from somebody else has it, since their turn came, and keeps it.
 */
export const refuseOwnEnd = async (
  tx: Tx,
  actor: PersonActor,
  personId: string,
  what: 'access' | 'administrator role',
): Promise<void> => {
  if (personId !== actor.personId) return;
  const others = await activeHolders(tx, actor.clinicId, ['administrator'], [personId]);
  throw new Problem(
    'state-conflict',
    others.length === 0
      ? 'You are the clinic’s last administrator. Give somebody else the role first.'
      : `You cannot end your own ${what}. Ask another administrator.`,
  );
};

type About = { personId: string; reason: string };

export const deactivate = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, reason }: About,
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  const person = await staffMemberOf(tx, clinicId, personId);
  await refuseOwnEnd(tx, actor, personId, 'access');
  if (!person.active) throw new Problem('state-conflict', 'This person’s access has ended already.');
  await tx
    .update(people)
    .set({ active: false, deactivatedAt: now })
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  await revokeInvitations(tx, site, { clinicId, personId }, now);
  await releaseClaimsOf(tx, { clinicId, personId }, actor.personId, now);
  await endAccess(tx, site, { clinicId, personId }, now);
  await writeAudit(tx, actor, { action: 'person.deactivated', subjectId: personId, detail: { reason } }, now);
  return describeOne(tx, site, clinicId, personId, now);
};

export const reactivate = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { personId, reason }: About,
  now: Date,
): Promise<StaffPerson> => {
  await takeTurn(tx, actor);
  const { clinicId } = actor;
  const person = await staffMemberOf(tx, clinicId, personId);
  if (person.active) throw new Problem('state-conflict', 'This person has access already.');
  await tx
    .update(people)
    .set({ active: true, deactivatedAt: null })
    .where(and(eq(people.clinicId, clinicId), eq(people.id, personId)));
  // A sign-in under way while access ended may have left a session that opened nothing until now.
  await endSessions(tx, site, { clinicId, personId }, now);
  await writeAudit(tx, actor, { action: 'person.reactivated', subjectId: personId, detail: { reason } }, now);
  return describeOne(tx, site, clinicId, personId, now);
};
