import { isDeepStrictEqual } from 'node:util';
import { and, eq, min } from 'drizzle-orm';
import type { InvitationCard } from '#shared/people/contract.ts';
import type { PatientRecord } from '#shared/patients/contract.ts';
import { consequences } from '#shared/patients/states.ts';
import { isClinician } from '#shared/access/permissions.ts';
import { Problem, type FieldError } from '#shared/problems/problems.ts';
import type { PersonActor } from '../../db/actor.ts';
import { checkIns } from '../../db/schema/check-ins.ts';
import { careTeamMembers, operationCards, patients } from '../../db/schema/patients.ts';
import { people } from '../../db/schema/people.ts';
import type { Tx } from '../../db/with-tx.ts';
import type { Site } from '../../http/site.ts';
import { announce, announcePersonChange } from '../../realtime/announce.ts';
import { writeAudit } from '../audit/service.ts';
import { hasWayIn } from '../people/gate.ts';
import { invitationCardsOf, invitePerson } from '../people/inviting.ts';
import { readPhone } from '../people/new-person.ts';
import { holdTurn } from '../people/turns.ts';
import { asKept, recordErrors, refuseAny, surroundingsOf, type RecordFields } from './checking.ts';
import { chartVisibleTo, patientOfClinic, type PatientRow } from './door.ts';
import { recordOf } from './record.ts';
import { lockStoredFields, revisionOf } from './stored.ts';

/** No check-in is from before surgery: then either of the two dates would be wrong. */
const surgeryError = async (tx: Tx, patient: PatientRow, surgeryDate: string): Promise<FieldError[]> => {
  const rows = await tx
    .select({ first: min(checkIns.localDate) })
    .from(checkIns)
    .where(and(eq(checkIns.clinicId, patient.clinicId), eq(checkIns.patientId, patient.id)));
  const first = rows[0]?.first;
  if (!first || surgeryDate <= first) return [];
  const message = `The patient checked in on ${first}, so surgery cannot have been later.`;
  return [{ field: 'operation.surgeryDate', message }];
};

const changedMeanwhile = 'A colleague changed this record in the meantime. Look at it again before you save.';

/**
 * Changes identity, safety facts, operation card and care team: all of it, or nothing where a field is not right.
 * `revision` names the record that was looked at, so that nobody overwrites what they have not seen.
 */
export const change = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { patientId, revision, ...fields }: RecordFields & { patientId: string; revision: string },
  now: Date,
): Promise<PatientRecord> => {
  const { clinicId } = actor;
  const patient = await chartVisibleTo(tx, actor, patientId, now);
  await holdTurn(tx, clinicId, 'address-is-taken');
  const around = await surroundingsOf(tx, clinicId, [fields.identity]);
  const kept = asKept(fields, around.country);
  const stored = await lockStoredFields(tx, actor, patientId);
  if (revisionOf(stored) !== revision) {
    // The same sent again, after an answer that was lost, is the same success.
    if (isDeepStrictEqual(stored, kept)) return recordOf(tx, site, actor, patientId, now);
    throw new Problem('state-conflict', changedMeanwhile);
  }
  const errors = recordErrors(fields, around, now, patient.personId);
  errors.push(...(await surgeryError(tx, patient, fields.operation.surgeryDate)));
  const movesAddress = kept.identity.email !== stored.identity.email.toLowerCase();
  if (movesAddress && (await hasWayIn(site.gate, patient.personId))) {
    errors.push({
      field: 'identity.email',
      message: 'The patient signs in with this address, and changes it under Account.',
    });
  }
  refuseAny(errors);

  const { name, email, ...facts } = kept.identity;
  await tx
    .update(people)
    .set({
      name,
      phone: readPhone(fields.identity.phone, around.country),
      timeZone: facts.timeZone,
      ...(movesAddress ? { email, emailBouncedAt: null } : {}),
    })
    .where(and(eq(people.clinicId, clinicId), eq(people.id, patient.personId)));
  const ofPatient = <T extends typeof operationCards | typeof careTeamMembers>(table: T) =>
    and(eq(table.clinicId, clinicId), eq(table.patientId, patientId));
  await tx
    .update(patients)
    .set(facts)
    .where(and(eq(patients.clinicId, clinicId), eq(patients.id, patientId)));
  await tx.update(operationCards).set(kept.operation).where(ofPatient(operationCards));
  await tx.delete(careTeamMembers).where(ofPatient(careTeamMembers));
  await tx
    .insert(careTeamMembers)
    .values(kept.careTeam.map((member) => ({ clinicId, patientId, ...member })));
  if (movesAddress) await inviteAtNewAddress(tx, site, actor, patient.personId, now);
  await writeAudit(tx, actor, { action: 'patient.changed', subjectId: patientId, patientId }, now);
  await announce(tx, { patient: patientId }, { topic: 'today' });
  await announcePersonChange(tx, patient.personId);
  return recordOf(tx, site, actor, patientId, now);
};

/** A link that was mailed to a wrong address opens nothing any more; the right one gets its own. */
const inviteAtNewAddress = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  personId: string,
  now: Date,
): Promise<void> => {
  const card = (await invitationCardsOf(tx, site, actor.clinicId, [personId], now)).get(personId);
  if (card?.state !== 'open' || !card.byEmail) return;
  await invitePerson(tx, site, actor, { personId, kind: 'patient', byEmail: true }, now);
};

/** A new invitation. Clinicians come through the chart's door; administrators see names and states only. */
export const reinvite = async (
  tx: Tx,
  site: Site,
  actor: PersonActor,
  { patientId, byEmail }: { patientId: string; byEmail: boolean },
  now: Date,
): Promise<InvitationCard> => {
  const patient =
    isClinician(actor.roles) && !actor.roles.includes('administrator')
      ? await chartVisibleTo(tx, actor, patientId, now)
      : await patientOfClinic(tx, actor.clinicId, patientId);
  const { personId, state } = patient;
  if (!consequences[state].signIn) throw new Problem('state-conflict', 'This patient’s record has ended.');
  // Whoever holds an invitation chooses the way in, so an account that has one is opened by its owner alone.
  if (await hasWayIn(site.gate, personId)) {
    throw new Problem(
      'state-conflict',
      'The patient has set up a way in already. Who cannot sign in asks for a new password on the sign-in page.',
    );
  }
  const card = await invitePerson(tx, site, actor, { personId, kind: 'patient', byEmail }, now);
  await writeAudit(
    tx,
    actor,
    { action: 'patient.invited', subjectId: patientId, patientId, detail: { byEmail } },
    now,
  );
  return card;
};
