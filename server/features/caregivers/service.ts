import { and, eq, isNull } from 'drizzle-orm';
import type { CaregiverCard, ClinicCaregiverCard } from '#shared/patients/contract.ts';
import { Problem } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { caregivers } from '../../db/schema/caregivers.ts';
import { invitations } from '../../db/schema/invitations.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { announcePersonChange } from '../../realtime/announce.ts';
import { auditOpening, writeAudit } from '../audit/service.ts';
import { revokeInvitations } from '../people/inviting.ts';
import { chartVisibleTo, patientOfClinic } from '../patients/door.ts';
import { cardForClinic, cardForPatient, cardsForPatient } from './cards.ts';
import { refusePast, type Limits } from './inviting.ts';
import { ownRecord } from './limits.ts';
import { caregiverOf, type CaregiverRow } from './queries.ts';

/** Whom the patient has let in. */
export const listFor = async (
  tx: Tx,
  actor: PersonActor,
  now: Date,
): Promise<{ caregivers: CaregiverCard[] }> => {
  const patientId = ownRecord(actor);
  await auditOpening(tx, actor, { action: 'caregivers.listed', subjectId: patientId, patientId }, now);
  return { caregivers: await cardsForPatient(tx, actor.clinicId, patientId) };
};

const openGrant = ({ clinicId, id }: CaregiverRow) =>
  and(eq(caregivers.clinicId, clinicId), eq(caregivers.id, id), isNull(caregivers.endedAt));

/** What somebody may do, and until when. It holds from their next request on. */
export const changeLimits = async (
  tx: Tx,
  actor: PersonActor,
  { caregiverId, until, ...limits }: Limits & { caregiverId: string },
  now: Date,
): Promise<CaregiverCard> => {
  const { clinicId } = actor;
  const patientId = ownRecord(actor);
  const grant = await caregiverOf(tx, { clinicId, patientId, caregiverId });
  refusePast(await patientOfClinic(tx, clinicId, patientId), until, now);
  const changed = await tx
    .update(caregivers)
    .set({ ...limits, untilDate: until })
    .where(openGrant(grant))
    .returning({ id: caregivers.id });
  if (changed.length === 0) throw new Problem('state-conflict', 'This has ended. Let the person in anew.');
  const { mayCheckIn, mayMessage } = limits;
  await writeAudit(
    tx,
    actor,
    { action: 'caregiver.changed', subjectId: grant.id, patientId, detail: { mayCheckIn, mayMessage } },
    now,
  );
  await announcePersonChange(tx, grant.personId);
  return cardForPatient(tx, grant);
};

/**
 * Whoever has not come yet, and whom nobody else has let in, comes no more: an invitation that brought them as a
 * caregiver opens nothing when there is nobody left to help. One as staff or as a patient stays.
 */
const withdrawInvitation = async (
  tx: Tx,
  site: Site,
  { clinicId, personId }: CaregiverRow,
  now: Date,
): Promise<void> => {
  const othersLeft = await tx.$count(
    caregivers,
    and(eq(caregivers.clinicId, clinicId), eq(caregivers.personId, personId), isNull(caregivers.endedAt)),
  );
  const [open] = await tx
    .select({ kind: invitations.kind })
    .from(invitations)
    .where(
      and(
        eq(invitations.clinicId, clinicId),
        eq(invitations.personId, personId),
        isNull(invitations.acceptedAt),
        isNull(invitations.revokedAt),
      ),
    );
  if (othersLeft === 0 && open?.kind === 'caregiver') {
    await revokeInvitations(tx, site, { clinicId, personId }, now);
  }
};

/** Ends somebody's help at once: their next request finds nothing, and their sockets hear nothing more. */
const end = async (tx: Tx, site: Site, actor: PersonActor, grant: CaregiverRow, now: Date): Promise<void> => {
  const ended = await tx
    .update(caregivers)
    .set({ endedAt: now, endedBy: actor.personId })
    .where(openGrant(grant))
    .returning({ id: caregivers.id });
  // Ending twice is ending once.
  if (ended.length > 0) {
    const { id, patientId } = grant;
    await writeAudit(tx, actor, { action: 'caregiver.ended', subjectId: id, patientId }, now);
    await withdrawInvitation(tx, site, grant, now);
    await announcePersonChange(tx, grant.personId);
  }
};

export const endByPatient = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  caregiverId: string,
  now: Date,
): Promise<CaregiverCard> => {
  const of = { clinicId: actor.clinicId, patientId: ownRecord(actor), caregiverId };
  const grant = await caregiverOf(tx, of);
  await end(tx, site, actor, grant, now);
  return cardForPatient(tx, grant);
};

export const endByClinic = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { patientId, caregiverId }: { patientId: string; caregiverId: string },
  now: Date,
): Promise<ClinicCaregiverCard> => {
  await chartVisibleTo(tx, actor, patientId, now);
  const grant = await caregiverOf(tx, { clinicId: actor.clinicId, patientId, caregiverId });
  await end(tx, site, actor, grant, now);
  return cardForClinic(tx, site, grant, now);
};
